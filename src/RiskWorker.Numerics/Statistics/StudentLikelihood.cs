using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Optimisation;

namespace RiskWorker.Numerics.Statistics;

/// <summary>
/// Degrees of freedom of Student-t shocks with a given covariance, by profile likelihood: the scale matrix is the covariance times (ν-2)/ν,
/// whatever ν is tried (McNeil, Frey and Embrechts, Quantitative Risk Management, 2015, section 6.2).
/// </summary>
/// <remarks>
/// The log-likelihood is the weighted mean over days times the effective number of days, so that equal weights give the plain sum and the
/// interval knows how little a short memory holds. Sums in <see cref="LaneSum"/>'s order, a fixed search: the bits depend on the data alone.
/// </remarks>
public static class StudentLikelihood
{
    /// <summary>From Mahalanobis distances: the p-variate likelihood, but for the constant -½ ln det of the covariance.</summary>
    /// <param name="squaredDistances">x' Σ⁻¹ x of each day under the covariance Σ; see <see cref="LinearAlgebra.MahalanobisDistances"/>.</param>
    /// <param name="dimension">p, at least 1.</param>
    /// <param name="weights">One a day, 0 or more; none at all means equal ones.</param>
    /// <exception cref="ArgumentException">A distance or weight is negative or not finite, or there are none.</exception>
    public static DegreesOfFreedomFit Fit(ReadOnlySpan<double> squaredDistances, int dimension, ReadOnlySpan<double> weights = default)
    {
        if (dimension < 1)
            throw new ArgumentOutOfRangeException(nameof(dimension), dimension, $"There are {dimension} factors; there must be at least 1.");
        for (int t = 0; t < squaredDistances.Length; t++)
        {
            if (!(squaredDistances[t] >= 0.0 && double.IsFinite(squaredDistances[t])))
                throw new ArgumentException($"The squared distance of day {t} is {squaredDistances[t]}; it must be 0 or more and finite.", nameof(squaredDistances));
        }

        return Fit(squaredDistances.ToArray(), 1, dimension, DayWeights.Of(weights, squaredDistances.Length));
    }

    /// <summary>
    /// From standardised shocks of factors, one at a time: the mean over factors of the univariate log-likelihoods, where the covariance is
    /// singular and has no distances (composite likelihood: Varin, Reid and Firth 2011). With one factor it is that factor's own likelihood.
    /// </summary>
    /// <remarks>
    /// The mean counts n days, not n times the factors: its interval is that of factors which all move as one, and wide where they do not.
    /// </remarks>
    /// <param name="rows">A row a factor, row-major: shocks over the factor's standard deviation.</param>
    /// <param name="factors">Rows, at least 1.</param>
    /// <param name="weights">One a day, 0 or more; none at all means equal ones.</param>
    /// <exception cref="ArgumentException">A shock is not finite, a weight negative or not finite, or the rows have no common length.</exception>
    public static DegreesOfFreedomFit FitComposite(ReadOnlySpan<double> rows, int factors, ReadOnlySpan<double> weights = default)
    {
        if (factors < 1)
            throw new ArgumentOutOfRangeException(nameof(factors), factors, $"There are {factors} factors; there must be at least 1.");
        int days = rows.Length / factors;
        if (days * factors != rows.Length)
            throw new ArgumentException($"rows has {rows.Length} elements; it must have a multiple of the {factors} factors.", nameof(rows));
        double[] squares = new double[rows.Length];
        for (int i = 0; i < squares.Length; i++)
        {
            squares[i] = rows[i] * rows[i];
            if (!double.IsFinite(squares[i]))
                throw new ArgumentException($"Factor {i / days} has {rows[i]} on day {i % days}; a shock must be finite and its square too.", nameof(rows));
        }

        return Fit(squares, factors, 1, DayWeights.Of(weights, days));
    }

    private static DegreesOfFreedomFit Fit(double[] squares, int count, int dimension, DayWeights weights)
    {
        int days = weights.Count;
        double[] room = new double[days], means = new double[count];
        double AtNormal()
        {
            for (int j = 0; j < count; j++)
            {
                squares.AsSpan(j * days, days).CopyTo(room);
                means[j] = weights.Mean(room);
            }

            return -(dimension * LogGamma.HalfLogTwoPi) - (0.5 * LaneSum.Of(means) / count);
        }

        double At(double nu)
        {
            for (int j = 0; j < count; j++)
                means[j] = weights.MeanLogOnePlus(squares.AsSpan(j * days, days), nu - 2.0, room);
            double constant = LogGamma.Of(0.5 * (nu + dimension)) - LogGamma.Of(0.5 * nu) - (0.5 * dimension * Logarithm.Of((nu - 2.0) * Math.PI));
            return Math.FusedMultiplyAdd(-0.5 * (nu + dimension), LaneSum.Of(means) / count, constant);
        }

        return DegreesOfFreedomSearch.Maximise(nu => weights.Effective * At(nu), weights.Effective * AtNormal(), weights.Effective);
    }
}
