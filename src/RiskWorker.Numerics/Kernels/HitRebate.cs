using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// E[e^(-rτ); τ ≤ T] of the first time τ at which the level has fallen by the gap a: what one unit paid at the hit is worth. In units of
/// w = σ√T, with m the drift away from the barrier and l² = m² + 2rT, it is e^(-a(m+l)) Φ(l - a) + e^(-a(m-l)) Φ(-l - a)
/// (Reiner and Rubinstein 1991).
/// </summary>
/// <remarks>
/// Both tails have the weight e^(-rT) e^(-(a+m)²/2), and e^(-a(m+l)) is taken as e^(-2arT/(l-m)) where m is negative, so that nothing
/// large cancels. A negative rate may make l² negative: the two terms are then the two halves of weight·2 Re g(a + i√(-l²)), g the
/// <see cref="ScaledNormalTail"/> of a complex argument, (2/√(2π)) ∫ e^(-as-s²/2) cos(√(-l²) s) ds from 0 on. That integral is taken by
/// Gauss-Legendre with 28 points up to where its integrand is e^(-40), scenario by scenario: within 1e-15 of 2g(a) (measured at 6,000
/// points) for -l² up to 4. Since -l² is at most -2rT, -rT up to 2 is always in reach; beyond it the value is NaN.
/// </remarks>
internal static class HitRebate
{
    private const double LargestNegative = 4.0;
    private const double TwoOverRootTwoPi = 0.7978845608028654;
    private const int CosineTerms = 26;

    // The positive half of the points in (-1, 1) and their weights; mpmath at 50 digits.

    private static readonly double[] Points =
    [
        0.05507928988403427, 0.16456928213338076, 0.2720616276351781, 0.3762515160890787, 0.4758742249551183,
        0.5697204718114017, 0.656651094038865, 0.7356108780136318, 0.8056413709171791, 0.8658925225743951,
        0.9156330263921321, 0.9542592806289382, 0.9813031653708727, 0.9964424975739544,
    ];

    private static readonly double[] Weights =
    [
        0.1100470130164752, 0.10871119225829413, 0.10605576592284642, 0.10211296757806076, 0.09693065799792992,
        0.09057174439303284, 0.08311341722890121, 0.07464621423456878, 0.0652729239669996, 0.05510734567571675,
        0.04427293475900423, 0.03290142778230438, 0.02113211259277126, 0.009124282593094517,
    ];

    /// <param name="gap">a: the logarithm from the barrier to the level, over w; positive.</param>
    /// <param name="drift">m: (rT - qT)/w - w/2, positive where it leads away from the barrier.</param>
    /// <param name="discount">rT.</param>
    /// <param name="weight">e^(-rT) e^(-(a+m)²/2).</param>
    public static double Value(double gap, double drift, double discount, double weight)
    {
        double square = Square(drift, discount);
        if (square < 0.0)
            return weight * Oscillating(gap, -square);
        (double root, double exponent) = Parts(gap, drift, discount);
        double near = root - gap;
        double value = WeightedTail.Level(Exponential.Of(exponent), near);
        return WeightedTail.Add(WeightedTail.Add(value, weight, near), weight, -root - gap);
    }

    /// <summary>l² = m² + 2rT.</summary>
    public static double Square(double drift, double discount) => Math.FusedMultiplyAdd(drift, drift, 2.0 * discount);

    /// <summary>l and the exponent of the first term; where l² is negative what they give is not the value.</summary>
    public static (double Root, double Exponent) Parts(double gap, double drift, double discount)
    {
        double square = Square(drift, discount), root = Math.Sqrt(square < 0.0 ? 0.0 : square);
        return (root, drift < 0.0 ? -2.0 * discount / (root - drift) * gap : -(drift + root) * gap);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static (Vector512<double> Root, Vector512<double> Exponent) Parts(Vector512<double> gap, Vector512<double> drift, Vector512<double> discount)
    {
        Vector512<double> zero = Vector512<double>.Zero, square = Vector512.FusedMultiplyAdd(drift, drift, Vector512.Create(2.0) * discount);
        Vector512<double> root = Vector512.Sqrt(Vector512.ConditionalSelect(Vector512.LessThan(square, zero), zero, square));
        Vector512<double> toward = Vector512.Create(-2.0) * discount / (root - drift) * gap;
        return (root, Vector512.ConditionalSelect(Vector512.LessThan(drift, zero), toward, -(drift + root) * gap));
    }

    /// <summary>Puts the value where l² is negative, scenario by scenario.</summary>
    public static void Mend(ReadOnlySpan<double> gap, ReadOnlySpan<double> drift, ReadOnlySpan<double> discount, ReadOnlySpan<double> weight, Span<double> value)
    {
        for (int s = 0; s < value.Length; s++)
        {
            double square = Square(drift[s], discount[s]);
            if (square < 0.0)
                value[s] = weight[s] * Oscillating(gap[s], -square);
        }
    }

    private static double Oscillating(double gap, double square)
    {
        if (!(square <= LargestNegative))
            return double.NaN;
        double half = 40.0 / (gap + Math.Sqrt(Math.FusedMultiplyAdd(gap, gap, 80.0)));
        double sum = 0.0;
        for (int i = 0; i < Points.Length; i++)
        {
            double both = Integrand(Math.FusedMultiplyAdd(half, Points[i], half), gap, square) + Integrand(Math.FusedMultiplyAdd(half, -Points[i], half), gap, square);
            sum = Math.FusedMultiplyAdd(Weights[i], both, sum);
        }

        return TwoOverRootTwoPi * half * sum;
    }

    private static double Integrand(double s, double gap, double square) =>
        Exponential.Of(-Math.FusedMultiplyAdd(0.5, s, gap) * s) * CosineOfRoot(square * s * s);

    // cos √q by its series in q; the integrand's exponential outweighs what it cancels.
    private static double CosineOfRoot(double q)
    {
        double value = 1.0;
        for (int k = CosineTerms; k > 0; k--)
            value = Math.FusedMultiplyAdd(-q / (2 * k * ((2 * k) - 1)), value, 1.0);
        return value;
    }
}
