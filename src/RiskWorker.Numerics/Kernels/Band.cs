using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Whether numbers lie in a closed interval; NaN lies in none.</summary>
public static class Band
{
    /// <summary>low ≤ x ≤ high.</summary>
    public static bool Holds(double x, double low, double high) => x >= low && x <= high;

    /// <summary>Whether every x[s] lies in [low, high]; true of no numbers at all.</summary>
    [ScalarTwin(nameof(Holds))]
    public static bool Holds(ReadOnlySpan<double> x, double low, double high)
    {
        ref double from = ref MemoryMarshal.GetReference(x);
        Vector512<double> lows = Vector512.Create(low), highs = Vector512.Create(high), inside = Vector512<double>.AllBitsSet;
        nuint s = 0, length = (nuint)x.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> eight = Vector512.LoadUnsafe(ref from, s);
            inside &= Vector512.GreaterThanOrEqual(eight, lows) & Vector512.LessThanOrEqual(eight, highs);
        }

        bool all = Vector512.EqualsAll(inside.AsInt64(), Vector512<long>.AllBitsSet);
        for (int i = (int)s; i < x.Length; i++)
            all &= Holds(x[i], low, high);
        return all;
    }
}
