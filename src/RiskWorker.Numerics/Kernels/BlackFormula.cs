using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// asset·Φ(d₁) - strike·Φ(d₂), never below zero, every argument carrying the option's sign. Both tails share one exponential, because
/// asset·φ(d₁) = strike·φ(d₂): what d₁ and d₂ round by together then drops out to first order.
/// </summary>
internal static class BlackFormula
{
    public static double Value(double asset, double strike, double d1, double d2)
    {
        double weight = asset * WeightedTail.Gaussian(-0.5 * d1 * d1);
        double levels = WeightedTail.Level(asset, d1) - WeightedTail.Level(strike, d2);
        return WeightedTail.NotNegative(WeightedTail.Add(WeightedTail.Add(levels, weight, d1), -weight, d2));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Value(Vector512<double> asset, Vector512<double> strike, Vector512<double> d1, Vector512<double> d2)
    {
        Vector512<double> weight = asset * WeightedTail.Gaussian(Vector512.Create(-0.5) * d1 * d1);
        Vector512<double> levels = WeightedTail.Level(asset, d1) - WeightedTail.Level(strike, d2);
        return WeightedTail.NotNegative(WeightedTail.Add(WeightedTail.Add(levels, weight, d1), -weight, d2));
    }
}
