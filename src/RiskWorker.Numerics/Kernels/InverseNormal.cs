using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The standard normal quantile Φ⁻¹(p). Relative error below ERR_PPF (measured) on (0, 1), tails included;
/// 0 gives -infinity, 1 infinity, and a p outside [0, 1] NaN.
/// </summary>
/// <remarks>
/// Wichura's AS 241 (<see cref="NormalQuantileRationals"/>): a rational function of q = p - ½ where |q| ≤ 0.425, else one of
/// r = √(-ln min(p, 1-p)). The vector form evaluates both and selects; it enters the far tail (r > 5, p below 1.4e-11)
/// only if a lane is there, which cannot change what the other lanes get.
/// </remarks>
public readonly struct InverseNormal : IUnaryKernel
{
    private const double CenterHalfWidth = 0.425;
    private const double CenterSquare = 0.180625;
    private const double TailShift = 1.6;
    private const double FarTailStart = 5.0;

    /// <inheritdoc/>
    public static double Of(double x)
    {
        double q = x - 0.5;
        bool center = Math.Abs(q) <= CenterHalfWidth;
        double mass = q < 0.0 ? x : 1.0 - x;
        double r = Math.Sqrt(-Logarithm.Of(mass));
        (double numerator, double denominator) = center
            ? NormalQuantileRationals.Center(Math.FusedMultiplyAdd(-q, q, CenterSquare))
            : r > FarTailStart
                ? NormalQuantileRationals.FarTail(r - FarTailStart)
                : NormalQuantileRationals.Tail(r - TailShift);
        double ratio = numerator / denominator;
        double value = center ? q * ratio : q < 0.0 ? -ratio : ratio;
        return AtEnds(x, value);
    }

    /// <inheritdoc/>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Of(Vector512<double> x)
    {
        Vector512<double> q = x - Vector512.Create(0.5);
        Vector512<double> center = Vector512.LessThanOrEqual(Vector512.Abs(q), Vector512.Create(CenterHalfWidth));
        Vector512<double> lower = Vector512.LessThan(q, Vector512<double>.Zero);
        Vector512<double> mass = Vector512.ConditionalSelect(lower, x, Vector512.Create(1.0) - x);
        Vector512<double> r = Vector512.Sqrt(-Logarithm.Of(mass));
        (Vector512<double> numerator, Vector512<double> denominator) = NormalQuantileRationals.Tail(r - Vector512.Create(TailShift));
        Vector512<double> far = Vector512.GreaterThan(r, Vector512.Create(FarTailStart));
        if (Vector512.GreaterThanAny(r, Vector512.Create(FarTailStart)))
        {
            (Vector512<double> farNumerator, Vector512<double> farDenominator) =
                NormalQuantileRationals.FarTail(r - Vector512.Create(FarTailStart));
            numerator = Vector512.ConditionalSelect(far, farNumerator, numerator);
            denominator = Vector512.ConditionalSelect(far, farDenominator, denominator);
        }

        (Vector512<double> centerNumerator, Vector512<double> centerDenominator) =
            NormalQuantileRationals.Center(Vector512.FusedMultiplyAdd(-q, q, Vector512.Create(CenterSquare)));
        Vector512<double> ratio = Vector512.ConditionalSelect(center, centerNumerator, numerator)
            / Vector512.ConditionalSelect(center, centerDenominator, denominator);
        Vector512<double> value = Vector512.ConditionalSelect(center, q * ratio, Vector512.ConditionalSelect(lower, -ratio, ratio));
        return AtEnds(x, value);
    }

    /// <summary>Φ⁻¹ of each element; see <see cref="UnaryKernel.Apply"/>.</summary>
    [ScalarTwin(nameof(Of))]
    public static void Of(ReadOnlySpan<double> source, Span<double> destination) =>
        UnaryKernel.Apply<InverseNormal>(source, destination);

    private static double AtEnds(double p, double value)
    {
        value = p > 0.0 ? value : double.NegativeInfinity;
        value = p < 1.0 ? value : double.PositiveInfinity;
        value = p < 0.0 || p > 1.0 ? double.NaN : value;
        return double.IsNaN(p) ? p : value;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> AtEnds(Vector512<double> p, Vector512<double> value)
    {
        Vector512<double> zero = Vector512<double>.Zero, one = Vector512.Create(1.0);
        if (Vector512.GreaterThanAll(p, zero) && Vector512.LessThanAll(p, one))
            return value;
        value = Vector512.ConditionalSelect(Vector512.GreaterThan(p, zero), value, Vector512.Create(double.NegativeInfinity));
        value = Vector512.ConditionalSelect(Vector512.LessThan(p, one), value, Vector512.Create(double.PositiveInfinity));
        Vector512<double> outside = Vector512.LessThan(p, zero) | Vector512.GreaterThan(p, one);
        value = Vector512.ConditionalSelect(outside, Vector512.Create(double.NaN), value);
        return Vector512.ConditionalSelect(Vector512.Equals(p, p), value, p);
    }
}
