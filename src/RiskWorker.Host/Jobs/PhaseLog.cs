using Microsoft.Extensions.Logging;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Jobs;

/// <summary>Progress of a scheduled run as log lines: one when a phase begins. Safe for many threads.</summary>
/// <param name="logger">Takes the lines.</param>
/// <param name="schedule">The schedule that asked for the run.</param>
public sealed class PhaseLog(ILogger logger, string schedule) : IProgress<WorkProgress>
{
    private string? _phase;

    /// <inheritdoc/>
    public void Report(WorkProgress value)
    {
        if (Interlocked.Exchange(ref _phase, value.Phase) != value.Phase) ServiceLog.RunPhase(logger, schedule, value.Phase, value.Detail);
    }
}
