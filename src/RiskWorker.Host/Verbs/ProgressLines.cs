using System.Globalization;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary>Progress as plain lines: one when a phase begins, and one every ten seconds of a long one. Safe for many threads.</summary>
/// <param name="writer">Takes the lines.</param>
/// <param name="clock">Times them.</param>
public sealed class ProgressLines(TextWriter writer, TimeProvider clock) : IProgress<WorkProgress>
{
    private static readonly TimeSpan s_pause = TimeSpan.FromSeconds(10);
    private readonly Lock _gate = new();
    private string? _phase;
    private long _written;

    /// <inheritdoc/>
    public void Report(WorkProgress value)
    {
        lock (_gate)
        {
            if (value.Phase == _phase && clock.GetElapsedTime(_written) < s_pause) return;
            (_phase, _written) = (value.Phase, clock.GetTimestamp());
            var detail = value.Detail is null ? "" : "  " + Printable.Of(value.Detail);
            writer.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{clock.GetUtcNow():yyyy-MM-dd'T'HH:mm:ss'Z'}  {value.Phase} {value.Fraction:P0}{detail}"));
        }
    }
}
