using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Reductions;

/// <summary>
/// Sorts tails: worst loss first, ties by scenario number; 0 and -0 are one loss. Keeps its buffers, so one thread sorts
/// series after series without an allocation.
/// </summary>
/// <remarks>
/// A loss is turned into a whole number of the same order. The upper bits of what its keys span are sorted in two passes by
/// counting (radix sort; Knuth, The Art of Computer Programming, volume 3, section 5.2.5); entries that agree in them,
/// mostly none or few, are sorted by comparing.
/// </remarks>
internal sealed class TailOrder
{
    private const ulong Sign = 1UL << 63;
    private const int DigitBits = 11;
    private const int Digits = 1 << DigitBits;

    // Below it two passes over the counts cost more than they save.
    private const int FewestToCount = 256;

    private readonly int[] _counts = new int[2 * Digits];
    private ulong[] _keys = [];
    private ulong[] _otherKeys = [];
    private TailEntry[] _other = [];

    /// <summary>Sorts <paramref name="tail"/>, whose losses are numbers and whose scenarios differ.</summary>
    public void Sort(Span<TailEntry> tail)
    {
        MakeRoom(tail.Length);
        var keys = _keys.AsSpan(0, tail.Length);
        for (var i = 0; i < tail.Length; i++) keys[i] = KeyOf(tail[i].Loss);
        if (tail.Length < FewestToCount) Compare(keys, tail);
        else Count(keys, tail);
    }

    // A fourth to spare: the next series may have a few more.
    private void MakeRoom(int count)
    {
        if (_keys.Length >= count) return;
        var room = count + (count / 4);
        Room.For(ref _keys, room);
        Room.For(ref _otherKeys, room);
        Room.For(ref _other, room);
    }

    // The bits of numbers of one sign are ordered as their sizes are; adding 0 makes 0 of -0.
    private static ulong KeyOf(double loss)
    {
        var bits = BitConverter.DoubleToUInt64Bits(loss + 0.0);
        return (bits & Sign) == 0 ? ~bits ^ Sign : bits;
    }

    private void Count(Span<ulong> keys, Span<TailEntry> tail)
    {
        var (lowest, highest) = (ulong.MaxValue, 0UL);
        foreach (var key in keys) (lowest, highest) = (Math.Min(lowest, key), Math.Max(highest, key));
        var shift = Math.Max(0, 64 - (int)ulong.LeadingZeroCount(highest - lowest) - (2 * DigitBits));
        Array.Clear(_counts);
        Span<int> lower = _counts.AsSpan(0, Digits), upper = _counts.AsSpan(Digits, Digits);
        foreach (var key in keys)
        {
            var digits = (key - lowest) >> shift;
            lower[(int)(digits % Digits)]++;
            upper[(int)(digits / Digits)]++;
        }
        Span<ulong> otherKeys = _otherKeys.AsSpan(0, keys.Length);
        Span<TailEntry> other = _other.AsSpan(0, tail.Length);
        Distribute(keys, tail, otherKeys, other, lower, lowest, shift);
        Distribute(otherKeys, other, keys, tail, upper, lowest, shift + DigitBits);
        for (var first = 0; first < keys.Length;)
        {
            var (end, digits) = (first + 1, (keys[first] - lowest) >> shift);
            while (end < keys.Length && (keys[end] - lowest) >> shift == digits) end++;
            if (end - first > 1) Compare(keys[first..end], tail[first..end]);
            first = end;
        }
    }

    private static void Distribute(ReadOnlySpan<ulong> keys, ReadOnlySpan<TailEntry> tail, Span<ulong> toKeys, Span<TailEntry> to, Span<int> counts, ulong lowest, int shift)
    {
        var before = 0;
        foreach (ref var count in counts) (count, before) = (before, before + count);
        for (var i = 0; i < keys.Length; i++)
        {
            var place = counts[(int)(((keys[i] - lowest) >> shift) % Digits)]++;
            (toKeys[place], to[place]) = (keys[i], tail[i]);
        }
    }

    private static void Compare(Span<ulong> keys, Span<TailEntry> tail)
    {
        keys.Sort(tail);
        for (var first = 0; first < keys.Length;)
        {
            var end = first + 1;
            while (end < keys.Length && keys[end] == keys[first]) end++;
            if (end - first > 1) tail[first..end].Sort(static (a, b) => a.Scenario.CompareTo(b.Scenario));
            first = end;
        }
    }
}
