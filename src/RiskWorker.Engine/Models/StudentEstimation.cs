using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.LinearAlgebra;
using RiskWorker.Numerics.Optimisation;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Models;

/// <summary>Degrees of freedom from a window of shocks, each in units of the standard deviation that the estimator gave it.</summary>
/// <remarks>
/// With exponential weights that is the deviation known the evening before: shocks of a calm and of a wild year over one deviation would
/// look fatter-tailed than any day was. All days then count the same.
/// </remarks>
internal static class StudentEstimation
{
    // Fewer days a factor make the covariance too much the sample's own for distances under it to say anything.
    private const int FewestDaysAFactor = 5;

    /// <summary>The law of <paramref name="model"/>.</summary>
    /// <exception cref="CalibrationException">Nothing moves, or there are too few days.</exception>
    public static StudentLaw Of(ModelSettings model, ShockWindow? window, int[] moving, double[] deviations)
    {
        if (model is { DegreesOfFreedom: { } given, Margins: StudentMargins.Common }) return new(given, null, null, null);
        if (moving.Length == 0) return new(model.DegreesOfFreedom ?? Most, model.Margins == StudentMargins.Own ? [] : null, null, null);
        var rows = Standardised(model, window!, moving, deviations);
        return model.Margins == StudentMargins.Common ? Common(rows, moving.Length) : Own(model, rows, moving.Length);
    }

    private const double Most = 200;

    private static StudentLaw Common(double[] rows, int factors)
    {
        if (FullCorrelation(rows, factors) is not { } correlation)
        {
            var composite = StudentLikelihood.FitComposite(rows, factors);
            return new(composite.Nu, null, composite, "profile likelihood of the factors one by one: too few days for all together");
        }
        var distances = new double[rows.Length / factors];
        MahalanobisDistances.Of(correlation, rows, distances);
        var fit = StudentLikelihood.Fit(distances, factors);
        return new(fit.Nu, null, fit, "profile likelihood of all factors together");
    }

    private static StudentLaw Own(ModelSettings model, double[] rows, int factors)
    {
        var days = rows.Length / factors;
        var (margins, scores) = (new double[factors], new double[rows.Length]);
        for (var row = 0; row < factors; row++)
        {
            var shocks = rows.AsSpan(row * days, days);
            margins[row] = StudentLikelihood.FitComposite(shocks, 1).Nu;
            CopulaLikelihood.NormalScores(shocks, margins[row], scores.AsSpan(row * days, days));
        }
        if (model.DegreesOfFreedom is { } given) return new(given, margins, null, null);
        if (factors == 1) return new(margins[0], margins, null, null);
        var (fit, method) = Copula(scores, factors);
        return new(fit.Nu, margins, fit, method);
    }

    private static (DegreesOfFreedomFit Fit, string Method) Copula(double[] scores, int factors) => FullCorrelation(scores, factors) is { } correlation
        ? (CopulaLikelihood.Fit(scores, correlation), "likelihood of the copula, margins first")
        : (CopulaPairLikelihood.Fit(scores, factors, Neighbours(scores, factors)), "likelihood of the copula pair by pair, margins first: too few days for all together");

    // Each factor with the next: as many pairs as factors, whatever their number.
    private static CopulaPair[] Neighbours(double[] scores, int factors)
    {
        var correlation = Correlation(scores, factors);
        return [.. Enumerable.Range(1, factors - 1).Select(i => new CopulaPair(i - 1, i, Math.Clamp(correlation[((i - 1) * factors) + i], -MostCorrelated, MostCorrelated)))];
    }

    private const double MostCorrelated = 0.999;

    private static PivotedCholesky? FullCorrelation(double[] rows, int factors)
    {
        if (rows.Length / factors < FewestDaysAFactor * factors) return null;
        var factor = PivotedCholesky.Factor(Correlation(rows, factors), factors);
        return factor.Rank == factors ? factor : null;
    }

    private static double[] Correlation(double[] rows, int factors)
    {
        var weights = new double[rows.Length / factors];
        Array.Fill(weights, 1.0);
        return MovingCorrelation.Correlation(WeightedGram.Of(rows, factors, weights), factors, [.. Enumerable.Range(0, factors)]);
    }

    private static double[] Standardised(ModelSettings model, ShockWindow window, int[] moving, double[] deviations)
    {
        var days = window.Days.Count;
        if (days < 2) throw new CalibrationException("observations", $"The model '{model.Name}' fits degrees of freedom to the shocks of {days} days; it needs more.");
        var rows = new double[moving.Length * days];
        for (var row = 0; row < moving.Length; row++)
        {
            var shocks = window.Row(moving[row]);
            var standardised = rows.AsSpan(row * days, days);
            if (model.Covariance == CovarianceEstimator.Ewma) _ = StandardizedResiduals.Write(shocks, EwmaVariance.Of(shocks, model.Lambda), standardised);
            else
            {
                for (var t = 0; t < days; t++) standardised[t] = shocks[t] / deviations[moving[row]];
            }
        }
        return rows;
    }
}
