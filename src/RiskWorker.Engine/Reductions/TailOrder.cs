namespace RiskWorker.Engine.Reductions;

/// <summary>The order of a tail: worst loss first, ties by scenario number; 0 and -0 are one loss.</summary>
internal static class TailOrder
{
    private const ulong Sign = 1UL << 63;

    /// <summary>Sorts <paramref name="tail"/>, whose losses are numbers and whose scenarios differ; allocates nothing.</summary>
    /// <param name="tail">The entries, in any order.</param>
    /// <param name="keys">Room for as many keys.</param>
    /// <remarks>By whole-number keys, which the sort compares without a call; runs of equal losses are then put right.</remarks>
    public static void Sort(Span<TailEntry> tail, Span<ulong> keys)
    {
        keys = keys[..tail.Length];
        for (var i = 0; i < tail.Length; i++) keys[i] = KeyOf(tail[i].Loss);
        keys.Sort(tail);
        for (var first = 0; first < tail.Length;)
        {
            var end = first + 1;
            while (end < tail.Length && keys[end] == keys[first]) end++;
            if (end - first > 1) tail[first..end].Sort(static (a, b) => a.Scenario.CompareTo(b.Scenario));
            first = end;
        }
    }

    // The bits of floating-point numbers of one sign are ordered as their sizes are; adding 0 makes 0 of -0.
    private static ulong KeyOf(double loss)
    {
        var bits = BitConverter.DoubleToUInt64Bits(loss + 0.0);
        return (bits & Sign) == 0 ? ~bits ^ Sign : bits;
    }
}
