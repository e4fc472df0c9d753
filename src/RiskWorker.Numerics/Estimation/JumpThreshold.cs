using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Which days of a series are jumps: those beyond c deviations of its diffusion (the threshold estimator of Mancini 2009, Scandinavian
/// Journal of Statistics 36, 270-296, with a threshold that is constant over the days). The deviation begins as that of the bipower variation, which jumps
/// hardly move (Barndorff-Nielsen and Shephard 2004, Journal of Financial Econometrics 2, 1-37), and is then the root mean square of
/// the days within the threshold, over what the threshold cuts off a normal's, until the days stay the same.
/// </summary>
/// <remarks>
/// The wider the deviation, the more days lie within and the larger their mean square: the iteration moves one way and ends.
/// A series whose volatility drifts has calm and wild spells, not jumps, beyond a constant threshold: divide by a filter's deviations first.
/// </remarks>
public static class JumpThreshold
{
    /// <summary>The least c: below it, days of a plain normal would count as jumps one in a hundred and more often.</summary>
    public const double Lowest = 2.5;

    /// <summary>Days below which nothing is estimated.</summary>
    public const int FewestDays = 20;

    private const double HalfPi = 1.5707963267948966;

    /// <summary>Marks the jump days of a series of zero mean.</summary>
    /// <param name="values">Finite numbers, at least <see cref="FewestDays"/>, in the order of the days.</param>
    /// <param name="c">Deviations from 0 beyond which a day is a jump; at least <see cref="Lowest"/>, usually 3 to 5.</param>
    /// <param name="jumps">As long as <paramref name="values"/>.</param>
    /// <returns>The threshold's deviation: an estimate of the diffusion's, if its days are normal.</returns>
    /// <exception cref="ArgumentException">There are too few days, a value is not finite, lengths differ, or c is too low.</exception>
    public static double Mark(ReadOnlySpan<double> values, double c, Span<bool> jumps)
    {
        Series.RequireFinite(values, FewestDays, nameof(values));
        if (!(c >= Lowest && c < double.PositiveInfinity)) throw new ArgumentOutOfRangeException(nameof(c), c, $"The threshold is in deviations, at least {Lowest}.");
        if (jumps.Length != values.Length) throw new ArgumentException($"jumps has {jumps.Length} elements; it must have {values.Length}.", nameof(jumps));
        var kept = KeptVariance(c);
        var deviation = Bipower(values);
        // Half the days at rest leave no bipower variation; all days together are the widest start there is.
        if (deviation == 0) deviation = Math.Sqrt(Series.MeanSquare(values, 0));
        jumps.Clear();
        for (var round = 0; round <= values.Length; round++)
        {
            var hasChanged = false;
            var (count, squares) = (0, 0.0);
            for (var t = 0; t < values.Length; t++)
            {
                var isJump = Math.Abs(values[t]) > c * deviation;
                hasChanged |= isJump != jumps[t];
                jumps[t] = isJump;
                if (!isJump) (count, squares) = (count + 1, Math.FusedMultiplyAdd(values[t], values[t], squares));
            }
            if (round > 0 && !hasChanged || count == 0 || squares == 0) break;
            deviation = Math.Sqrt(squares / count / kept);
        }
        return deviation;
    }

    /// <summary>The deviation that the products of neighbouring days show: √(π/2 · mean of |x_t||x_{t-1}|).</summary>
    public static double Bipower(ReadOnlySpan<double> values)
    {
        Series.RequireFinite(values, 2, nameof(values));
        var sum = 0.0;
        for (var t = 1; t < values.Length; t++) sum = Math.FusedMultiplyAdd(Math.Abs(values[t]), Math.Abs(values[t - 1]), sum);
        return Math.Sqrt(HalfPi * sum / (values.Length - 1));
    }

    /// <summary>E[z² given |z| ≤ c] = 1 - 2c φ(c)/(2Φ(c) - 1).</summary>
    private static double KeptVariance(double c) => 1 - (2 * c * NormalDensity.Of(c) / (1 - (2 * NormalCdf.Of(-c))));
}
