using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// level·Φ(d) in two parts that a formula sums apart: the level itself where d is positive, and ∓weight·g(|d|) with
/// weight = level·e^(-d²/2) and <see cref="ScaledNormalTail"/> g. The terms of one formula mostly share one weight.
/// </summary>
internal static class WeightedTail
{
    /// <summary>Below this a deviation σ√T counts as this: far below any that matters, and its inverse still squares to a finite number.</summary>
    public const double SmallestDeviation = 1e-100;

    // Past |d| = 37.5 the tail is below 1e-307 of its level; the exponential of -708 is the last that is a normal number.
    private const double HighestD = 37.5;
    private const double LowestExponent = -708.0;

    public static double NotNegative(double value) => value < 0.0 ? 0.0 : value;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> NotNegative(Vector512<double> value) =>
        Vector512.ConditionalSelect(Vector512.LessThan(value, Vector512<double>.Zero), Vector512<double>.Zero, value);

    public static double Deviation(double deviation) => deviation < SmallestDeviation ? SmallestDeviation : deviation;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Deviation(Vector512<double> deviation)
    {
        Vector512<double> smallest = Vector512.Create(SmallestDeviation);
        return Vector512.ConditionalSelect(Vector512.LessThan(deviation, smallest), smallest, deviation);
    }

    /// <summary>e^exponent for an exponent of 709 at most; what lies below -708 counts as -708.</summary>
    public static double Gaussian(double exponent) => Exponential.OfNormal(exponent < LowestExponent ? LowestExponent : exponent);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Gaussian(Vector512<double> exponent)
    {
        Vector512<double> lowest = Vector512.Create(LowestExponent);
        return Exponential.OfNormal(Vector512.ConditionalSelect(Vector512.LessThan(exponent, lowest), lowest, exponent));
    }

    /// <summary>The first part.</summary>
    public static double Level(double level, double d) => d > 0.0 ? level : 0.0;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Level(Vector512<double> level, Vector512<double> d) =>
        Vector512.ConditionalSelect(Vector512.GreaterThan(d, Vector512<double>.Zero), level, Vector512<double>.Zero);

    /// <summary>sum plus the second part.</summary>
    public static double Add(double sum, double weight, double d)
    {
        double t = Math.Abs(d);
        t = t > HighestD ? HighestD : t;
        return Math.FusedMultiplyAdd(d > 0.0 ? -weight : weight, ScaledNormalTail.Of(t), sum);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Add(Vector512<double> sum, Vector512<double> weight, Vector512<double> d)
    {
        Vector512<double> highest = Vector512.Create(HighestD), t = Vector512.Abs(d);
        t = Vector512.ConditionalSelect(Vector512.GreaterThan(t, highest), highest, t);
        Vector512<double> signed = Vector512.ConditionalSelect(Vector512.GreaterThan(d, Vector512<double>.Zero), -weight, weight);
        return Vector512.FusedMultiplyAdd(signed, ScaledNormalTail.Of(t), sum);
    }
}
