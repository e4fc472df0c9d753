using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Engine.Runs;

/// <summary>The models that run beside the one of record, on the same lines, draws and scenarios.</summary>
internal static class Challengers
{
    /// <summary>Runs them one after the other; one that cannot be calibrated is a finding, and has no figures.</summary>
    /// <param name="settings">The models, and how to simulate.</param>
    /// <param name="lines">What they are run on.</param>
    /// <param name="calibration">Calibrates them.</param>
    /// <param name="findings">Where findings go.</param>
    public static IReadOnlyList<ModelResult> Run(RunSettings settings, ModelLines lines, ModelCalibration calibration, List<Finding> findings)
    {
        var results = new List<ModelResult>();
        var failed = new FindingList(settings.Checks);
        foreach (var model in settings.Challengers)
        {
            try
            {
                var calibrated = model.Kind == ModelKind.Stressed ? StressedSpan.Find(lines, model, calibration, settings.Simulation) : calibration.Of(model);
                results.Add(Result(model, ModelRun.Of(Named(lines, model.Name), calibrated, [], settings.Simulation with { Precision = null })));
            }
            catch (CalibrationException refusal)
            {
                failed.Add(FindingCodes.ModelFailed, model.Name, $"The model '{model.Name}' has no figures: {refusal.Message}");
                results.Add(new() { Name = model.Name, Kind = model.Kind });
            }
        }
        findings.AddRange(failed.Ordered());
        return results;
    }

    private static ModelLines Named(ModelLines lines, string model) => lines with { Progress = lines.Progress is { } progress ? new NamedProgress(progress, model) : null };

    private static ModelResult Result(ModelSettings settings, ModelRun run) => new()
    {
        Name = settings.Name,
        Kind = settings.Kind,
        Calibration = run.Calibration,
        Simulation = run.Outcome.Simulation,
        Nodes = [.. NodeResults.Measured(run)],
    };

    private sealed class NamedProgress(IProgress<RunProgress> progress, string model) : IProgress<RunProgress>
    {
        public void Report(RunProgress value) => progress.Report(value with { Phase = $"{value.Phase} {model}" });
    }
}
