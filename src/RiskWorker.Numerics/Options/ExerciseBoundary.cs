using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Options;

/// <summary>
/// The price below which an American put of strike 1 is exercised, over its whole life, and what the right to exercise early
/// is worth: ∫ r e^(-ru) Φ(-d₋) - q S e^(-qu) Φ(-d₊) du over the life (Kim 1990).
/// </summary>
internal sealed class ExerciseBoundary
{
    private readonly ExerciseTerms terms;
    private readonly double[] logBoundary = new double[ExerciseGrid.OfValue.Points];

    private ExerciseBoundary(
        ExerciseEquation equation, double logStart, double years, double volatility, double rate, double carryYield)
    {
        Lowest = Exponential.Of(logStart + equation.Logarithms[0]);
        terms = new ExerciseTerms(ExerciseGrid.OfValue, years, volatility, rate, carryYield);
        equation.Interpolate(ExerciseGrid.OfValue, logBoundary);
        for (int j = 0; j < logBoundary.Length; j++)
            logBoundary[j] += logStart;
    }

    /// <summary>
    /// The boundary of a put of which there is one: a positive rate, or none with a negative carry yield. Null where the
    /// equation cannot be solved.
    /// </summary>
    public static ExerciseBoundary? Find(double years, double volatility, double rate, double carryYield)
    {
        double logStart = carryYield > rate ? Logarithm.Of(rate / carryYield) : 0.0;
        var equation = new ExerciseEquation(years, volatility, rate, carryYield, logStart);
        return equation.IsSolved ? new ExerciseBoundary(equation, logStart, years, volatility, rate, carryYield) : null;
    }

    /// <summary>The boundary today: at or below it the put is exercised.</summary>
    public double Lowest { get; }

    /// <summary>What the right to exercise before expiry is worth, above the boundary.</summary>
    public double Premium(double spot, double logSpot)
    {
        int points = logBoundary.Length;
        Span<double> lower = stackalloc double[points], upper = stackalloc double[points];
        for (int j = 0; j < points; j++)
        {
            lower[j] = -Math.FusedMultiplyAdd(logSpot - logBoundary[j], terms.Inverse[j], terms.Drift[j]);
            upper[j] = lower[j] - terms.Deviation[j];
        }

        NormalCdf.Of(lower, lower);
        NormalCdf.Of(upper, upper);
        double strikeSide = 0.0, spotSide = 0.0;
        for (int j = 0; j < points; j++)
        {
            strikeSide = Math.FusedMultiplyAdd(terms.Interest[j], lower[j], strikeSide);
            spotSide = Math.FusedMultiplyAdd(terms.Yield[j], upper[j], spotSide);
        }

        return Math.FusedMultiplyAdd(-spot, spotSide, strikeSide);
    }
}
