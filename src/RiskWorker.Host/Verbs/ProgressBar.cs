using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>Progress as a bar that appears once a second has passed and leaves nothing behind. Safe for many threads.</summary>
/// <param name="console">Draws the bar.</param>
/// <param name="clock">Times it.</param>
public sealed class ProgressBar(IAnsiConsole console, TimeProvider clock) : IProgress<WorkProgress>
{
    private static readonly TimeSpan s_patience = TimeSpan.FromSeconds(1);
    private static readonly TimeSpan s_refresh = TimeSpan.FromMilliseconds(100);
    private readonly Lock _gate = new();
    private WorkProgress _latest = new("starting", 0);

    /// <inheritdoc/>
    public void Report(WorkProgress value)
    {
        lock (_gate) _latest = value;
    }

    /// <summary>Returns when <paramref name="work"/> has ended, however it ended.</summary>
    public async Task ShowUntilAsync(Task work)
    {
        await Task.WhenAny(work, Task.Delay(s_patience, clock));
        if (work.IsCompleted) return;
        await console.Progress().AutoClear(true)
            .Columns(new TaskDescriptionColumn { Alignment = Justify.Left }, new ProgressBarColumn(), new PercentageColumn(), new ElapsedTimeColumn())
            .StartAsync(async bars =>
            {
                var bar = bars.AddTask("starting", maxValue: 1);
                while (!work.IsCompleted)
                {
                    Draw(bar);
                    await Task.WhenAny(work, Task.Delay(s_refresh, clock));
                }
            });
    }

    private void Draw(ProgressTask bar)
    {
        WorkProgress latest;
        lock (_gate) latest = _latest;
        bar.Description = Markup.Escape(Printable.Of(latest.Detail is null ? latest.Phase : $"{latest.Phase}  {latest.Detail}", 40));
        bar.Value = latest.Fraction;
    }
}
