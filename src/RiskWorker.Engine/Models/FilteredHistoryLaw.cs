using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Engine.Models;

/// <summary>
/// Filtered historical simulation (Barone-Adesi, Giannopoulos and Vosper 1999): a past day drawn with equal chances gives all factors their
/// standardised residuals of that day, each scaled to the factor's own volatility, which every day of a path updates.
/// </summary>
/// <param name="Days">Days of residuals.</param>
/// <param name="Residuals">A row a moving factor in the order of the plan, <paramref name="Days"/> apart, oldest first: mean 0, variance 1.</param>
/// <param name="Processes">What updates each factor's variance; with exponential weights omega is 0, alpha 1 - lambda and beta lambda.</param>
/// <param name="Variances">Variance of each factor's next day.</param>
/// <param name="Fits">What was fitted, where it was; empty with exponential weights.</param>
/// <param name="Furthest">The largest residual, in standard deviations.</param>
public sealed record FilteredHistoryLaw(int Days, double[] Residuals, GarchParameters[] Processes, double[] Variances, GarchFit[] Fits, double Furthest) : ScenarioLaw
{
    /// <inheritdoc/>
    public override bool GivesShocks => true;

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [3, Days, .. Residuals, .. Variances, .. Processes.SelectMany(p => new[] { p.Omega, p.Alpha, p.Beta })];

    /// <inheritdoc/>
    public override double Reach(int days) => Math.Max(Ordinary, 1.01 * Furthest);

    /// <inheritdoc/>
    public override IEnumerable<ModelParameter> Parameters(CalibratedModel model)
    {
        yield return new("days of residuals", Days);
        for (var row = 0; row < Variances.Length; row++)
        {
            var name = model.Factors[model.Moving[row]].Name;
            yield return new($"volatility of {name}, the next day", Math.Sqrt(Variances[row]), Note: Fits.Length == 0 ? null : Note(Fits[row]));
            if (Fits.Length == 0) continue;
            yield return new($"alpha of {name}", Processes[row].Alpha);
            yield return new($"beta of {name}", Processes[row].Beta);
        }
    }

    private static string? Note(GarchFit fit)
    {
        if (!fit.IsConverged) return "the search for the likelihood's maximum ended early";
        if (fit.Bounds.HasFlag(GarchBounds.NoReaction)) return "constant: the history shows no reaction to the day before";
        return fit.Bounds.HasFlag(GarchBounds.NoReversion) ? "at the bound: shocks to volatility do not fade" : null;
    }
}
