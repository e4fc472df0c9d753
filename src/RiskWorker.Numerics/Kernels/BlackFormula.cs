using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// asset·Φ(d₁) - strike·Φ(d₂), never below zero, every argument carrying the option's sign. Both tails share one exponential, because
/// asset·φ(d₁) = strike·φ(d₂): what d₁ and d₂ round by together then drops out to first order.
/// </summary>
internal static class BlackFormula
{
    /// <summary>Rows that the form over rows takes.</summary>
    public const int Rows = 7;

    /// <summary>The three rows of exponents that it begins with: of the asset, of the strike, and -d₁²/2; the factors stand outside.</summary>
    public const int Asset = 0, Strike = 1, Gaussian = 2;

    /// <summary>The rows of d₁ and d₂.</summary>
    public const int D1 = 3, D2 = 4;

    private const int Weights = 5;

    /// <summary>-d₁²/2.</summary>
    public static double Exponent(double d1) => -0.5 * d1 * d1;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Exponent(Vector512<double> d1) => Vector512.Create(-0.5) * d1 * d1;

    public static double Value(double asset, double strike, double d1, double d2)
    {
        double weight = asset * Exponential.Of(Exponent(d1));
        double levels = WeightedTail.Level(asset, d1) - WeightedTail.Level(strike, d2);
        return WeightedTail.NotNegative(WeightedTail.Add(WeightedTail.Add(levels, weight, d1), -weight, d2));
    }

    /// <summary>Values from the first five rows, asset = factor·e^row (times the spot, where one is given), strike = factor·e^row.</summary>
    public static void Values(in Workbench bench, double assetFactor, ReadOnlySpan<double> spot, double strikeFactor)
    {
        bench.Exponentials(Asset, 3);
        if (spot.IsEmpty)
            LevelsAndWeights(bench, assetFactor, strikeFactor);
        else
            LevelsAndWeights(bench, assetFactor, spot, strikeFactor);
        bench.AddTails(Workbench.Result, Weights, D1, 2);
        NotNegative(bench);
    }

    [MethodImpl(Workbench.Loop)]
    private static void LevelsAndWeights(in Workbench bench, double assetFactor, ReadOnlySpan<double> spot, double strikeFactor)
    {
        Vector512<double> a = Vector512.Create(assetFactor), k = Vector512.Create(strikeFactor);
        ref double levels = ref MemoryMarshal.GetReference(spot);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
            LevelAndWeight(bench, s, a * bench.Load(Asset, s) * Vector512.LoadUnsafe(ref levels, s), k * bench.Load(Strike, s));
    }

    [MethodImpl(Workbench.Loop)]
    private static void LevelsAndWeights(in Workbench bench, double assetFactor, double strikeFactor)
    {
        Vector512<double> a = Vector512.Create(assetFactor), k = Vector512.Create(strikeFactor);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
            LevelAndWeight(bench, s, a * bench.Load(Asset, s), k * bench.Load(Strike, s));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void LevelAndWeight(in Workbench bench, nuint s, Vector512<double> asset, Vector512<double> strike)
    {
        Vector512<double> weight = asset * bench.Load(Gaussian, s);
        bench.Store(Weights, s, weight);
        bench.Store(Weights + 1, s, -weight);
        bench.Store(Workbench.Result, s, WeightedTail.Level(asset, bench.Load(D1, s)) - WeightedTail.Level(strike, bench.Load(D2, s)));
    }

    [MethodImpl(Workbench.Loop)]
    private static void NotNegative(in Workbench bench)
    {
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
            bench.Store(Workbench.Result, s, WeightedTail.NotNegative(bench.Load(Workbench.Result, s)));
    }
}
