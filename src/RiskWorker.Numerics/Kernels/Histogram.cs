using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Counts over equal bins with one count below and one above them.</summary>
public static class Histogram
{
    // Adding 2^52 to a whole number below it leaves the number in the low bits.
    private const double TwoTo52 = 4503599627370496.0;

    /// <summary>
    /// The count that a value belongs to: 0 below <paramref name="low"/>, bins + 1 from the upper end on, else
    /// 1 + floor((value - low)·inverseWidth).
    /// </summary>
    /// <exception cref="ArgumentException">The value is NaN.</exception>
    public static int BinOf(double value, double low, double inverseWidth, int bins)
    {
        if (double.IsNaN(value))
            throw new ArgumentException("A value is NaN; it has no bin.", nameof(value));
        double position = Math.Floor((value - low) * inverseWidth);
        position = position < bins ? position : bins;
        return value >= low ? 1 + (int)position : 0;
    }

    /// <summary>Adds one to the count of each value's bin; allocates nothing.</summary>
    /// <param name="values">The values.</param>
    /// <param name="low">Lower end of the first bin; it belongs to the bin, as each bin's lower end does.</param>
    /// <param name="inverseWidth">Bins per unit, positive and finite.</param>
    /// <param name="counts">Bins + 2 counts: below, the bins, above.</param>
    /// <exception cref="ArgumentException">A value is NaN (counts before it have been added), there is no bin, or an edge is not finite.</exception>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(BinOf))]
    public static void Accumulate(ReadOnlySpan<double> values, double low, double inverseWidth, Span<long> counts)
    {
        int bins = counts.Length - 2;
        Require(low, inverseWidth, bins);
        ref double from = ref MemoryMarshal.GetReference(values);
        ref long to = ref MemoryMarshal.GetReference(counts);
        Vector512<double> lows = Vector512.Create(low), scale = Vector512.Create(inverseWidth), last = Vector512.Create((double)bins);
        Span<ulong> binsOfLanes = stackalloc ulong[Vector512<ulong>.Count];
        ref ulong bin = ref MemoryMarshal.GetReference(binsOfLanes);
        int i = 0;
        for (; i + 8 <= values.Length; i += 8)
        {
            Vector512<double> value = Vector512.LoadUnsafe(ref from, (nuint)i);
            if (!Vector512.EqualsAll(value, value))
                break;
            Vector512<double> position = Vector512.Floor((value - lows) * scale);
            position = Vector512.ConditionalSelect(Vector512.LessThan(position, last), position, last);
            position = Vector512.ConditionalSelect(
                Vector512.GreaterThanOrEqual(value, lows), position + Vector512.Create(1.0 + TwoTo52), Vector512.Create(TwoTo52));
            (position.AsUInt64() & Vector512.Create(0xFFFFFFFFUL)).StoreUnsafe(ref bin);
            for (nuint lane = 0; lane < 8; lane++)
                Unsafe.Add(ref to, (nuint)Unsafe.Add(ref bin, lane))++;
        }

        for (; i < values.Length; i++)
            counts[BinOf(values[i], low, inverseWidth, bins)]++;
    }

    private static void Require(double low, double inverseWidth, int bins)
    {
        if (bins < 1)
            throw new ArgumentException($"There are {bins} bins; there must be at least 1, and two counts more.", nameof(bins));
        if (!double.IsFinite(low))
            throw new ArgumentException($"The lower end is {low}; it must be finite.", nameof(low));
        if (!(inverseWidth > 0.0 && double.IsFinite(inverseWidth)))
            throw new ArgumentException($"The inverse width is {inverseWidth}; it must be positive and finite.", nameof(inverseWidth));
    }
}
