using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The standard normal distribution function Φ(x). Relative error below 5.3 ulp (measured at 200,000 points) on the whole line, the far
/// lower tail down to subnormal results included; Φ(0) is ½ exactly, and Φ(x) is 1 - Φ(-x) for positive x.
/// </summary>
/// <remarks>
/// Φ(-t) = e^(-t²/2) times <see cref="ScaledNormalTail"/>. The square is carried in two pieces: rounded to one double it
/// could cost 250 ulp at t = 38.
/// </remarks>
public readonly struct NormalCdf : IUnaryKernel
{
    /// <inheritdoc/>
    public static double Of(double x)
    {
        double t = Math.Abs(x);
        t = t > ScaledNormalTail.Highest ? ScaledNormalTail.Highest : t;
        double lower = GaussianFactor.Of(t) * ScaledNormalTail.Of(t);
        double value = x > 0.0 ? 1.0 - lower : lower;
        return double.IsNaN(x) ? x : value;
    }

    /// <inheritdoc/>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Of(Vector512<double> x)
    {
        Vector512<double> highest = Vector512.Create(ScaledNormalTail.Highest);
        Vector512<double> t = Vector512.Abs(x);
        t = Vector512.ConditionalSelect(Vector512.GreaterThan(t, highest), highest, t);
        Vector512<double> lower = GaussianFactor.Of(t) * ScaledNormalTail.Of(t);
        Vector512<double> upper = Vector512.Create(1.0) - lower;
        Vector512<double> value = Vector512.ConditionalSelect(Vector512.GreaterThan(x, Vector512<double>.Zero), upper, lower);
        return Vector512.ConditionalSelect(Vector512.Equals(x, x), value, x);
    }

    /// <summary>Φ of each element; see <see cref="UnaryKernel.Apply"/>.</summary>
    [ScalarTwin(nameof(Of))]
    public static void Of(ReadOnlySpan<double> source, Span<double> destination) =>
        UnaryKernel.Apply<NormalCdf>(source, destination);
}
