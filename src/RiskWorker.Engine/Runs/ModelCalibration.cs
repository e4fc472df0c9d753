using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Runs;

/// <summary>Calibrates the models of a run on one table of shocks.</summary>
internal sealed class ModelCalibration(Snapshot snapshot, int longest)
{
    private readonly ShockTable _table = ShockTable.From(snapshot);

    /// <summary>The last days that a span of <paramref name="days"/> complete days may have, oldest first.</summary>
    /// <exception cref="CalibrationException">The history is shorter than one span.</exception>
    public IReadOnlyList<DateOnly> LastDays(ModelSettings model, int days)
    {
        // A historical span needs the days that its longest moves begin on.
        var needed = model.Kind == ModelKind.Historical ? days + longest - 1 : days;
        var complete = ShockWindow.Newest(_table, int.MaxValue).Days;
        if (complete.Count < needed)
            throw new CalibrationException("observations", $"The history has {complete.Count} complete days of shocks, fewer than the span of {needed} days that a stressed model searches for.");
        return [.. complete.Skip(needed - 1)];
    }

    /// <summary>What days that proxies fill do to the factors they fill; none where the model uses no complete days.</summary>
    public IReadOnlyList<FillEffect> FillEffects(ModelSettings model)
    {
        if (_table.Factors.Count == 0 || model.Covariance == CovarianceEstimator.Given) return [];
        return Calibration.FillEffects.Of(_table, ShockWindow.Newest(_table, model.Window));
    }

    /// <summary>Calibrates <paramref name="model"/>; a stressed one to the newest span.</summary>
    /// <param name="model">The model.</param>
    /// <param name="lastDay">Shocks after it are left out; null where none is.</param>
    /// <param name="isAroundMean">Whether covariances are taken around the mean instead of zero.</param>
    /// <exception cref="CalibrationException">The data cannot be used.</exception>
    public CalibratedModel Of(ModelSettings model, DateOnly? lastDay = null, bool isAroundMean = false)
    {
        var calibrated = model.Kind == ModelKind.Stressed ? model.Stressed! with { Window = model.Span } : model;
        return Calibrator.Calibrate(snapshot, _table, calibrated, longest, lastDay, isAroundMean);
    }
}
