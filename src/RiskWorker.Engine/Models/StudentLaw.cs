using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Optimisation;

namespace RiskWorker.Engine.Models;

/// <summary>
/// Student-t shocks: a normal vector times the root of a mixing variable that all factors share, in the scale that keeps the covariance
/// (McNeil, Frey and Embrechts, Quantitative Risk Management, 2015, section 6.2). With margins of their own it is the t copula of the
/// same vector, and days are drawn one by one.
/// </summary>
/// <remarks>
/// The mixing variable is cut at its upper 1e-7 quantile: the expectation of the exponential of a Student-t shock is infinite, so the log-drift of
/// half the variance is a convention, and a short position's loss would have no mean without the cut.
/// </remarks>
/// <param name="DegreesOfFreedom">Of the vector, or of the copula.</param>
/// <param name="Margins">Degrees of freedom of each moving factor, in the order of the plan's rows; null where all share the vector's.</param>
/// <param name="Fit">How well the data tell the degrees of freedom; null where they were given.</param>
/// <param name="Method">How they were fitted.</param>
public sealed record StudentLaw(double DegreesOfFreedom, double[]? Margins, DegreesOfFreedomFit? Fit, string? Method) : ScenarioLaw
{
    // A scenario in 200,000 lies beyond on either side.
    private const double BeyondTables = 5e-6;

    /// <inheritdoc/>
    public override bool GivesShocks => false;

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [2, DegreesOfFreedom, .. Margins ?? []];

    /// <inheritdoc/>
    public override double Reach(int days)
    {
        var law = new StudentT(Margins is null ? DegreesOfFreedom : Margins.Min());
        return Math.Max(Ordinary, law.UpperQuantile(BeyondTables) * law.UnitScale);
    }

    /// <inheritdoc/>
    public override IEnumerable<ModelParameter> Parameters(CalibratedModel model)
    {
        var mixing = new MixingQuantile(DegreesOfFreedom);
        var name = Margins is null ? "degrees of freedom" : "degrees of freedom of the copula";
        yield return Fit is null
            ? new(name, DegreesOfFreedom, Note: "given")
            : new(name, DegreesOfFreedom, Fit.IntervalLow, Fit.IntervalHigh, Note(Fit));
        yield return new("mixing variable cut at", mixing.Cap, Note: "its upper 1e-7 quantile");
        if (Margins is null)
        {
            yield return new("share of the variance that the cut leaves", mixing.Mean / mixing.UncutMean);
            yield break;
        }
        for (var row = 0; row < Margins.Length; row++)
            yield return new($"degrees of freedom of {model.Factors[model.Moving[row]].Name}", Margins[row], Note: Margins[row] >= MostFitted ? "not told from a normal law" : null);
    }

    private const double MostFitted = 200;

    private string Note(DegreesOfFreedomFit fit)
    {
        if (fit.AtUpperEnd) return $"{Method}; the data cannot be told from normal ones";
        return fit.AtLowerEnd ? $"{Method}; at the lower end of the range: the tails ask for less" : Method!;
    }
}
