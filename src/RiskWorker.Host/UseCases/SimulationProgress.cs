using RiskWorker.Engine.Runs;

namespace RiskWorker.Host.UseCases;

/// <summary>How far a calculation has come, as progress of the use case that runs it.</summary>
internal sealed class SimulationProgress(IProgress<WorkProgress> progress) : IProgress<RunProgress>
{
    public void Report(RunProgress value) => progress.Report(new(value.Phase, Math.Min(1, (double)value.Done / value.Planned), $"{value.Planned:N0} scenarios"));
}
