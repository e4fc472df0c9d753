using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// From standard normals to levels: x = scale·z + drift, then S = S₀eˣ for a lognormal shock or S = S₀ + x for a normal one.
/// Elementwise; a NaN stays one; allocates nothing.
/// </summary>
public static class LogNormalMoves
{
    /// <summary>x = scale·z + drift in one rounding.</summary>
    public static double LogReturn(double z, double scale, double drift) => Math.FusedMultiplyAdd(scale, z, drift);

    /// <summary>S = S₀eˣ.</summary>
    public static double Spot(double x, double spot0) => spot0 * Exponential.Of(x);

    /// <summary>S = S₀ + (scale·z + drift).</summary>
    public static double Level(double z, double scale, double drift, double level0) =>
        level0 + Math.FusedMultiplyAdd(scale, z, drift);

    /// <summary>x[s] = scale·z[s] + drift.</summary>
    /// <param name="z">Correlated standard normals.</param>
    /// <param name="scale">σ√h with σ a business day and h in business days.</param>
    /// <param name="drift">Expected log-return over the horizon.</param>
    /// <param name="x">As long as <paramref name="z"/>; may be the same memory.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(LogReturn))]
    public static void LogReturns(ReadOnlySpan<double> z, double scale, double drift, Span<double> x)
    {
        Require(z, x, nameof(x));
        ref double from = ref MemoryMarshal.GetReference(z);
        ref double to = ref MemoryMarshal.GetReference(x);
        Vector512<double> scales = Vector512.Create(scale), drifts = Vector512.Create(drift);
        nuint s = 0, length = (nuint)z.Length;
        for (; s + 8 <= length; s += 8)
            Vector512.FusedMultiplyAdd(scales, Vector512.LoadUnsafe(ref from, s), drifts).StoreUnsafe(ref to, s);
        for (; s < length; s++)
            Unsafe.Add(ref to, s) = LogReturn(Unsafe.Add(ref from, s), scale, drift);
    }

    /// <summary>spots[s] = spot0·e^x[s].</summary>
    /// <param name="x">Log-returns.</param>
    /// <param name="spot0">Level today.</param>
    /// <param name="spots">As long as <paramref name="x"/>; may be the same memory.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Spot))]
    public static void Spots(ReadOnlySpan<double> x, double spot0, Span<double> spots)
    {
        Require(x, spots, nameof(spots));
        ref double from = ref MemoryMarshal.GetReference(x);
        ref double to = ref MemoryMarshal.GetReference(spots);
        Vector512<double> today = Vector512.Create(spot0);
        nuint s = 0, length = (nuint)x.Length;
        for (; s + 8 <= length; s += 8)
            (today * Exponential.Of(Vector512.LoadUnsafe(ref from, s))).StoreUnsafe(ref to, s);
        for (; s < length; s++)
            Unsafe.Add(ref to, s) = Spot(Unsafe.Add(ref from, s), spot0);
    }

    /// <summary>levels[s] = level0 + (scale·z[s] + drift), for factors that move by differences.</summary>
    /// <param name="z">Correlated standard normals.</param>
    /// <param name="scale">σ√h in the factor's own unit.</param>
    /// <param name="drift">Expected change over the horizon.</param>
    /// <param name="level0">Level today.</param>
    /// <param name="levels">As long as <paramref name="z"/>; may be the same memory.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Level))]
    public static void Levels(ReadOnlySpan<double> z, double scale, double drift, double level0, Span<double> levels)
    {
        Require(z, levels, nameof(levels));
        ref double from = ref MemoryMarshal.GetReference(z);
        ref double to = ref MemoryMarshal.GetReference(levels);
        Vector512<double> scales = Vector512.Create(scale), drifts = Vector512.Create(drift), today = Vector512.Create(level0);
        nuint s = 0, length = (nuint)z.Length;
        for (; s + 8 <= length; s += 8)
            (today + Vector512.FusedMultiplyAdd(scales, Vector512.LoadUnsafe(ref from, s), drifts)).StoreUnsafe(ref to, s);
        for (; s < length; s++)
            Unsafe.Add(ref to, s) = Level(Unsafe.Add(ref from, s), scale, drift, level0);
    }

    private static void Require(ReadOnlySpan<double> source, ReadOnlySpan<double> destination, string name)
    {
        Spans.RequireLength(source.Length, destination.Length, name);
        Spans.RequireSameOrApart(source, destination, name);
    }
}
