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

            return CopulaTerm(nu, factors, each, dayWeights.MeanLogOnePlus(joint, nu, room)) - halfLogDeterminant;
        }

        return DegreesOfFreedomSearch.Maximise(nu => dayWeights.Effective * At(nu), dayWeights.Effective * AtNormal(), dayWeights.Effective);
    }

    /// <summary>
    /// By the mean of the likelihoods of pairs of factors, where the whole correlation is singular (composite likelihood: Varin, Reid and Firth 2011).
    /// </summary>
    /// <remarks>The mean counts n days: its interval is that of pairs which all tell the same, and wide where they do not.</remarks>
    /// <param name="scores">A row a factor, row-major: normal scores.</param>
    /// <param name="factors">Rows, at least 2.</param>
    /// <param name="pairs">Two different factors and their correlation, strictly between -1 and 1; at least one pair.</param>
    /// <param name="weights">One a day, 0 or more; none at all means equal ones.</param>
    /// <exception cref="ArgumentException">A score is not finite, a pair faulty, or a length wrong.</exception>
    public static DegreesOfFreedomFit FitPairs(
        ReadOnlySpan<double> scores, int factors, ReadOnlySpan<(int First, int Second, double Correlation)> pairs, ReadOnlySpan<double> weights = default)
    {
        int days = DaysOf(scores, factors);
        RequirePairs(pairs, factors);
        double[] normals = scores.ToArray(), variates = new double[scores.Length], joint = new double[days], room = new double[days], means = new double[pairs.Length];
        (int First, int Second, double Correlation)[] held = pairs.ToArray();
        var dayWeights = DayWeights.Of(weights, days);
        double AtNormal()
        {
            for (int i = 0; i < held.Length; i++)
            {
                (ReadOnlySpan<double> x, ReadOnlySpan<double> y, double r) = (Row(normals, held[i].First, days), Row(normals, held[i].Second, days), held[i].Correlation);
                double spread = 1.0 - (r * r);
                for (int t = 0; t < days; t++)
                    joint[t] = PairSquare(x[t], y[t], r, spread) - Math.FusedMultiplyAdd(x[t], x[t], y[t] * y[t]);
                means[i] = -0.5 * (dayWeights.Mean(joint) + Logarithm.Of(spread));
            }

            return LaneSum.Of(means) / means.Length;
        }

        double[] own = new double[factors];
        double At(double nu)
        {
            MarginMap.OfNormalScore(nu).Of(normals, variates);
            for (int j = 0; j < factors; j++)
            {
                joint.AsSpan().Clear();
                Elementwise.AddSquare(Row(variates, j, days), 1.0, joint);
                own[j] = dayWeights.MeanLogOnePlus(joint, nu, room);
            }

            for (int i = 0; i < held.Length; i++)
            {
                (ReadOnlySpan<double> x, ReadOnlySpan<double> y, double r) = (Row(variates, held[i].First, days), Row(variates, held[i].Second, days), held[i].Correlation);
                double spread = 1.0 - (r * r);
                for (int t = 0; t < days; t++)
                    joint[t] = PairSquare(x[t], y[t], r, spread);
                double each = own[held[i].First] + own[held[i].Second];
                means[i] = CopulaTerm(nu, 2, each, dayWeights.MeanLogOnePlus(joint, nu, room)) - (0.5 * Logarithm.Of(spread));
            }

            return LaneSum.Of(means) / means.Length;
        }

        return DegreesOfFreedomSearch.Maximise(nu => dayWeights.Effective * At(nu), dayWeights.Effective * AtNormal(), dayWeights.Effective);
    }

    /// <summary>The mean log-density but for -½ ln det: Γ functions, the margins' sum and the joint term.</summary>
    private static double CopulaTerm(double nu, int dimension, double margins, double joint)
    {
        double half = LogGamma.Of(0.5 * nu), halfStep = LogGamma.HalfStep(0.5 * nu);
        double constant = LogGamma.Of(0.5 * (nu + dimension)) - half - (dimension * halfStep);
        return Math.FusedMultiplyAdd(0.5 * (nu + 1.0), margins, Math.FusedMultiplyAdd(-0.5 * (nu + dimension), joint, constant));
    }

    // x² + (y - r x)²/(1 - r²): the quadratic form of a pair without cancellation.
    private static double PairSquare(double x, double y, double r, double spread)
    {
        double rest = Math.FusedMultiplyAdd(-r, x, y);
        return Math.FusedMultiplyAdd(x, x, rest * rest / spread);
    }

    private static ReadOnlySpan<double> Row(double[] rows, int row, int days) => rows.AsSpan(row * days, days);

    private static int DaysOf(ReadOnlySpan<double> scores, int factors)
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

    private static void RequirePairs(ReadOnlySpan<(int First, int Second, double Correlation)> pairs, int factors)
    {
        if (pairs.IsEmpty)
            throw new ArgumentException("There are no pairs; there must be at least one.", nameof(pairs));
        for (int i = 0; i < pairs.Length; i++)
        {
            (int first, int second, double r) = pairs[i];
            if (first < 0 || first >= factors || second < 0 || second >= factors || first == second)
                throw new ArgumentException($"Pair {i} has the factors {first} and {second}; they must be two different ones of 0 to {factors - 1}.", nameof(pairs));
            if (!(Math.Abs(r) < 1.0))
                throw new ArgumentException($"Pair {i} has the correlation {r}; it must lie strictly between -1 and 1.", nameof(pairs));
        }
    }
}
