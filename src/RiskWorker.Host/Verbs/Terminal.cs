using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>Where verbs print: results to the output, everything else to the error stream.</summary>
/// <param name="output">Takes results alone.</param>
/// <param name="error">Takes progress, log lines and messages.</param>
/// <param name="isInteractive">Whether a person watches the error stream, so that a progress bar makes sense.</param>
/// <param name="clock">Times progress.</param>
public sealed class Terminal(TextWriter output, TextWriter error, bool isInteractive, TimeProvider clock)
{
    private const int NarrowestWidth = 80;

    /// <summary>Takes results alone.</summary>
    public TextWriter Output { get; } = output;

    /// <summary>Takes progress, log lines and messages.</summary>
    public TextWriter Error { get; } = error;

    /// <summary>Time as the process sees it.</summary>
    public TimeProvider Clock { get; } = clock;

    /// <summary>The terminal of this process.</summary>
    public static Terminal OfProcess(TimeProvider clock)
    {
        var watched = !Console.IsErrorRedirected && Environment.GetEnvironmentVariable("TERM") is not ("dumb" or "" or null);
        return new(Console.Out, Console.Error, watched, clock);
    }

    /// <summary>A console for tables on the output: at least 80 columns, coloured only on a terminal.</summary>
    public IAnsiConsole Tables()
    {
        var console = On(Output);
        console.Profile.Width = Math.Max(NarrowestWidth, console.Profile.Width);
        return console;
    }

    /// <summary>
    /// Does <paramref name="work"/> and shows how far it is: on a terminal a bar once a second has passed, elsewhere plain lines.
    /// </summary>
    public async Task<T> WithProgressAsync<T>(Func<IProgress<UseCases.WorkProgress>, Task<T>> work)
    {
        if (!isInteractive) return await work(new ProgressLines(Error, Clock));
        var bar = new ProgressBar(On(Error), Clock);
        var running = Task.Run(() => work(bar));
        await bar.ShowUntilAsync(running);
        return await running;
    }

    private static IAnsiConsole On(TextWriter writer)
    {
        var target = new AnsiConsoleOutput(writer);
        return AnsiConsole.Create(new() { Out = target, Ansi = target.IsTerminal ? AnsiSupport.Detect : AnsiSupport.No });
    }
}
