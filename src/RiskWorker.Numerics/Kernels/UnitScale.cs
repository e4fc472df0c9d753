using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Maps an interval to [-1, 1], where polynomials live; elementwise, one fused multiply-add; allocates nothing.</summary>
public static class UnitScale
{
    /// <summary>scale·x + offset.</summary>
    public static double Of(double x, double scale, double offset) => Math.FusedMultiplyAdd(scale, x, offset);

    /// <summary>z[s] = scale·x[s] + offset.</summary>
    /// <param name="x">Where.</param>
    /// <param name="scale">2 over the interval's length.</param>
    /// <param name="offset">Minus its middle times <paramref name="scale"/>.</param>
    /// <param name="z">As long as <paramref name="x"/>.</param>
    /// <returns>Whether every z lies in [-1, 1]; false where one is NaN.</returns>
    [ScalarTwin(nameof(Of))]
    public static bool Apply(ReadOnlySpan<double> x, double scale, double offset, Span<double> z)
    {
        Spans.RequireLength(x.Length, z.Length, nameof(z));
        ref double from = ref MemoryMarshal.GetReference(x);
        ref double to = ref MemoryMarshal.GetReference(z);
        Vector512<double> scales = Vector512.Create(scale), offsets = Vector512.Create(offset), one = Vector512<double>.One, inside = Vector512<double>.AllBitsSet;
        nuint s = 0, length = (nuint)x.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> scaled = Vector512.FusedMultiplyAdd(scales, Vector512.LoadUnsafe(ref from, s), offsets);
            inside &= Vector512.LessThanOrEqual(Vector512.Abs(scaled), one);
            scaled.StoreUnsafe(ref to, s);
        }

        bool all = Vector512.EqualsAll(inside.AsInt64(), Vector512<long>.AllBitsSet);
        for (int i = (int)s; i < x.Length; i++)
        {
            z[i] = Of(x[i], scale, offset);
            all &= Math.Abs(z[i]) <= 1.0;
        }

        return all;
    }
}
