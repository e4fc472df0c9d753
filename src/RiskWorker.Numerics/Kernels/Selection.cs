using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>The elements that lie beyond a cutoff. Few do: eight at a time are tested, and only hits are looked at singly.</summary>
public static class Selection
{
    /// <summary>Writes the indices of the values above the cutoff, ascending, and counts those equal to it; allocates nothing.</summary>
    /// <param name="values">The values.</param>
    /// <param name="cutoff">Not NaN.</param>
    /// <param name="indices">At least as long as <paramref name="values"/>; what lies beyond the count returned is left as it was.</param>
    /// <param name="equalCount">How many values equal the cutoff.</param>
    /// <returns>How many indices were written.</returns>
    /// <exception cref="ArgumentException">The indices have no room, the cutoff is NaN, or a value is NaN (its index is named).</exception>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(GreaterInTurn))]
    public static int Greater(ReadOnlySpan<double> values, double cutoff, Span<int> indices, out int equalCount)
    {
        Require(values, cutoff, indices);
        ref double from = ref MemoryMarshal.GetReference(values);
        Vector512<double> cutoffs = Vector512.Create(cutoff);
        int count = 0, equal = 0, i = 0;
        for (; i + 8 <= values.Length; i += 8)
        {
            Vector512<double> eight = Vector512.LoadUnsafe(ref from, (nuint)i);
            // Not "below the cutoff": above, equal, or NaN.
            ulong hits = Vector512.LessThan(eight, cutoffs).ExtractMostSignificantBits() ^ 0xFF;
            for (; hits != 0; hits &= hits - 1)
                Take(values, i + BitOperations.TrailingZeroCount(hits), cutoff, indices, ref count, ref equal);
        }

        for (; i < values.Length; i++)
            Take(values, i, cutoff, indices, ref count, ref equal);
        equalCount = equal;
        return count;
    }

    /// <summary>The scalar twin of <see cref="Greater"/>.</summary>
    public static int GreaterInTurn(ReadOnlySpan<double> values, double cutoff, Span<int> indices, out int equalCount)
    {
        Require(values, cutoff, indices);
        int count = 0;
        equalCount = 0;
        for (int i = 0; i < values.Length; i++)
            Take(values, i, cutoff, indices, ref count, ref equalCount);
        return count;
    }

    private static void Take(ReadOnlySpan<double> values, int index, double cutoff, Span<int> indices, ref int count, ref int equal)
    {
        double value = values[index];
        if (double.IsNaN(value))
            throw new ArgumentException($"Value {index} is NaN; only numbers can be ranked.", nameof(values));
        if (value > cutoff)
            indices[count++] = index;
        else if (value == cutoff)
            equal++;
    }

    private static void Require(ReadOnlySpan<double> values, double cutoff, Span<int> indices)
    {
        Spans.RequireRoom(values.Length, indices.Length, nameof(indices));
        if (double.IsNaN(cutoff))
            throw new ArgumentException("The cutoff is NaN; it must be a number.", nameof(cutoff));
    }
}
