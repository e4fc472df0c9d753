using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.LinearAlgebra;
using RiskWorker.Numerics.Optimisation;

namespace RiskWorker.Numerics.Statistics;

/// <summary>
/// Degrees of freedom of a t copula, given its correlation and the margins' own distribution functions: inference functions for margins
/// (Joe 1997; McNeil, Frey and Embrechts, Quantitative Risk Management, 2015, section 7.5). The pseudo-observations u are held as normal
/// scores Φ⁻¹(u), which keep the digits of both tails.
/// </summary>
/// <remarks>Fixed search, sums in a fixed order, own arithmetic: the bits depend on the data alone.</remarks>
public static class CopulaLikelihood
{
    /// <summary>Normal scores beyond this on either side count as this.</summary>
    public const double HighestScore = 8.0;

    /// <summary>The normal scores of a factor's shocks under its own t margin: Φ⁻¹(F_m(x √(m/(m-2)))).</summary>
    /// <param name="standardised">Shocks over the factor's standard deviation.</param>
    /// <param name="margin">The margin's degrees of freedom m, more than 2.</param>
    /// <param name="scores">As long as <paramref name="standardised"/>.</param>
    /// <exception cref="ArgumentException">A shock is not finite, or the spans differ in length.</exception>
    public static void NormalScores(ReadOnlySpan<double> standardised, double margin, Span<double> scores)
    {
        Spans.RequireLength(standardised.Length, scores.Length, nameof(scores));
        var distribution = new StudentT(margin);
        double scale = distribution.UnitScale;
        for (int t = 0; t < scores.Length; t++)
        {
            double x = standardised[t];
            if (!double.IsFinite(x))
                throw new ArgumentException($"The shock of day {t} is {x}; it must be finite.", nameof(standardised));
            double score = Math.Min(-InverseNormal.Of(distribution.Upper(Math.Abs(x) / scale)), HighestScore);
            scores[t] = x < 0.0 ? -score : score;
        }
    }

    /// <summary>By the likelihood of the whole copula: needs a correlation of full rank.</summary>
    /// <param name="scores">A row a factor, row-major: normal scores.</param>
    /// <param name="correlation">The factor of the correlation matrix, n × n, of rank n.</param>
    /// <param name="weights">One a day, 0 or more; none at all means equal ones.</param>
    /// <exception cref="ArgumentException">A score is not finite, the correlation singular, or a length wrong.</exception>
    public static DegreesOfFreedomFit Fit(ReadOnlySpan<double> scores, PivotedCholesky correlation, ReadOnlySpan<double> weights = default)
    {
        ArgumentNullException.ThrowIfNull(correlation);
        int factors = correlation.Order.Length, days = DaysOf(scores, factors);
        double[] normals = scores.ToArray(), variates = new double[scores.Length], own = new double[days], joint = new double[days], room = new double[days];
        var dayWeights = DayWeights.Of(weights, days);
        double halfLogDeterminant = 0.5 * MahalanobisDistances.LogDeterminant(correlation);
        double AtNormal()
        {
            MahalanobisDistances.Of(correlation, normals, joint);
            own.AsSpan().Clear();
            for (int j = 0; j < factors; j++)
                Elementwise.AddSquare(normals.AsSpan(j * days, days), 1.0, own);
            Elementwise.Subtract(own, joint);
            return (-0.5 * dayWeights.Mean(joint)) - halfLogDeterminant;
        }

        double At(double nu)
        {
            MarginMap.OfNormalScore(nu).Of(normals, variates);
            MahalanobisDistances.Of(correlation, variates, joint);
            double each = 0.0;
            for (int j = 0; j < factors; j++)
            {
                own.AsSpan().Clear();
                Elementwise.AddSquare(variates.AsSpan(j * days, days), 1.0, own);
                each += dayWeights.MeanLogOnePlus(own, nu, room);
            }

            return Term(nu, factors, each, dayWeights.MeanLogOnePlus(joint, nu, room)) - halfLogDeterminant;
        }

        return DegreesOfFreedomSearch.Maximise(nu => dayWeights.Effective * At(nu), dayWeights.Effective * AtNormal(), dayWeights.Effective);
    }

    /// <summary>The mean log-density but for -½ ln det: Γ functions, the margins' sum and the joint term.</summary>
    internal static double Term(double nu, int dimension, double margins, double joint)
    {
        double half = LogGamma.Of(0.5 * nu), halfStep = LogGamma.HalfStep(0.5 * nu);
        double constant = LogGamma.Of(0.5 * (nu + dimension)) - half - (dimension * halfStep);
        return Math.FusedMultiplyAdd(0.5 * (nu + 1.0), margins, Math.FusedMultiplyAdd(-0.5 * (nu + dimension), joint, constant));
    }

    /// <summary>Days of rows of scores, which are checked.</summary>
    internal static int DaysOf(ReadOnlySpan<double> scores, int factors)
    {
        if (factors < 2)
            throw new ArgumentException($"There are {factors} factors; a copula has at least 2.", nameof(factors));
        int days = scores.Length / factors;
        if (days * factors != scores.Length)
            throw new ArgumentException($"scores has {scores.Length} elements; it must have a multiple of the {factors} factors.", nameof(scores));
        for (int i = 0; i < scores.Length; i++)
        {
            if (!double.IsFinite(scores[i]))
                throw new ArgumentException($"Factor {i / days} has the score {scores[i]} on day {i % days}; a score must be finite.", nameof(scores));
        }

        return days;
    }
}
