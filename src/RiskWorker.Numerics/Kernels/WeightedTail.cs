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

    /// <summary>Past |d| = 37.5 the tail is below 1e-307 of its level.</summary>
    public const double HighestD = 37.5;

    public static double Deviation(double deviation) => deviation < SmallestDeviation ? SmallestDeviation : deviation;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Deviation(Vector512<double> deviation)
    {
        Vector512<double> smallest = Vector512.Create(SmallestDeviation);
        return Vector512.ConditionalSelect(Vector512.LessThan(deviation, smallest), smallest, deviation);
    }

    public static double NotNegative(double value) => value < 0.0 ? 0.0 : value;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> NotNegative(Vector512<double> value) =>
        Vector512.ConditionalSelect(Vector512.LessThan(value, Vector512<double>.Zero), Vector512<double>.Zero, value);

    /// <summary>The first part.</summary>
    public static double Level(double level, double d) => d > 0.0 ? level : 0.0;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Level(Vector512<double> level, Vector512<double> d) =>
        Vector512.ConditionalSelect(Vector512.GreaterThan(d, Vector512<double>.Zero), level, Vector512<double>.Zero);

    /// <summary>sum plus the second part; <see cref="Workbench.AddTails"/> is the same over rows.</summary>
    public static double Add(double sum, double weight, double d)
    {
        double t = Math.Abs(d);
        t = t > HighestD ? HighestD : t;
        return Math.FusedMultiplyAdd(d > 0.0 ? -weight : weight, ScaledNormalTail.Of(t), sum);
    }
}
