using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Engine.Models;

/// <summary>Volatility processes and residuals from a window of shocks, a factor at a time.</summary>
internal static class FilteredHistoryEstimation
{
    /// <summary>The law of <paramref name="model"/>.</summary>
    /// <exception cref="CalibrationException">There are too few days to fit a process to.</exception>
    public static FilteredHistoryLaw Of(ModelSettings model, ShockWindow window, int[] moving)
    {
        var (days, isFitted) = (window.Days.Count, model.Volatility == VolatilityFilter.Garch);
        if (isFitted && days < GarchFit.FewestDays)
            throw new CalibrationException("observations", $"The model '{model.Name}' fits a GARCH process to the shocks of {days} days; it needs {GarchFit.FewestDays}.");
        var residuals = new double[moving.Length * days];
        var (processes, variances, fits) = (new GarchParameters[moving.Length], new double[moving.Length], isFitted ? new GarchFit[moving.Length] : []);
        Parallel.For(0, moving.Length, row =>
        {
            var shocks = window.Row(moving[row]);
            ConditionalVariance filtered;
            if (isFitted)
            {
                fits[row] = GarchFit.Of(shocks);
                (processes[row], filtered) = (fits[row].Parameters with { Mean = 0 }, fits[row].Variance); // moves of the past are used as they are, their mean is not
            }
            else
            {
                (processes[row], filtered) = (EwmaVariance.AsProcess(model.Lambda), EwmaVariance.Of(shocks, model.Lambda));
            }
            _ = StandardizedResiduals.Write(shocks, filtered, residuals.AsSpan(row * days, days));
            variances[row] = filtered.Forecast;
        });
        return new(days, residuals, processes, variances, fits, residuals.Length == 0 ? 0 : residuals.Max(Math.Abs));
    }
}
