using System.Runtime.InteropServices;

namespace RiskWorker.Engine.Reductions;

/// <summary>Losses counted against one of them.</summary>
/// <param name="Beyond">How many are larger.</param>
/// <param name="Equal">How many are as large.</param>
public readonly record struct ProbeCount(long Beyond, long Equal)
{
    internal ProbeCount Plus(long beyond, long equal) => new(Beyond + beyond, Equal + equal);
}

/// <summary>A scenario whose loss lies beyond the cutoff.</summary>
public readonly record struct TailEntry(double Loss, long Scenario);

/// <summary>
/// What the tail reduction keeps of a set of blocks: per series the count, sums on the fixed tree, a histogram,
/// the scenarios beyond the cutoff, and how many losses equal it. 16 bytes a kept scenario; never the whole vector.
/// </summary>
public sealed class TailRecord
{
    private List<TailEntry>[] _tails = [];
    private long[][] _histograms = [];

    internal TailRecord(int blocks = 0) => Sums = new(blocks);

    /// <summary>Scenarios seen.</summary>
    public long Count { get; internal set; }

    /// <summary>Scenarios that were revalued fully where surfaces are in use, each counted once for every node and horizon.</summary>
    public long Revalued { get; internal set; }

    /// <summary>Sums of losses, then of their squares, series by series.</summary>
    public SumTree Sums { get; }

    /// <summary>Where the sums of the block at hand are formed.</summary>
    internal double[] BlockSums { get; private set; } = [];

    /// <summary>Losses equal to the cutoff, by series: counted, not kept.</summary>
    internal long[] Equal { get; private set; } = [];

    /// <summary>How many losses lie beyond each probe, and how many equal it: probe by probe, series by series.</summary>
    internal ProbeCount[] Probes { get; private set; } = [];

    /// <summary>Forgets every block and turns to <paramref name="rows"/> series of <paramref name="probes"/> probes each; the memory stays.</summary>
    internal void Reset(int rows, int probes = 0)
    {
        if (Probes.Length != rows * probes) Probes = new ProbeCount[rows * probes];
        Array.Clear(Probes);
        if (_tails.Length != rows)
        {
            (_tails, _histograms) = (_tails[..Math.Min(rows, _tails.Length)], _histograms[..Math.Min(rows, _histograms.Length)]);
            _tails = [.. _tails, .. Enumerable.Range(0, rows - _tails.Length).Select(_ => new List<TailEntry>())];
            _histograms = [.. _histograms, .. Enumerable.Range(0, rows - _histograms.Length).Select(_ => new long[HistogramEdges.Bins + 2])];
            (Equal, BlockSums) = (new long[rows], new double[2 * rows]);
        }
        foreach (var tail in _tails) tail.Clear();
        foreach (var histogram in _histograms) Array.Clear(histogram);
        Array.Clear(Equal);
        Sums.Clear();
        (Count, Revalued) = (0, 0);
    }

    internal List<TailEntry> TailOf(int row) => _tails[row];

    /// <summary>Makes room for a tail of <paramref name="count"/> entries.</summary>
    internal void EnsureTail(int row, int count) => _tails[row].EnsureCapacity(count);

    /// <summary>Puts the tail of series <paramref name="row"/> into its order where it stands, which changes no answer of the record.</summary>
    internal ReadOnlySpan<TailEntry> SortTail(int row, TailOrder order)
    {
        var tail = CollectionsMarshal.AsSpan(_tails[row]);
        order.Sort(tail);
        return tail;
    }

    internal long[] HistogramOf(int row) => _histograms[row];

    /// <summary>The tail of series <paramref name="row"/>, worst first, ties by scenario number.</summary>
    public TailEntry[] SortedTail(int row)
    {
        var tail = _tails[row].ToArray();
        new TailOrder().Sort(tail);
        return tail;
    }

    /// <summary>How many losses of series <paramref name="row"/> equal its cutoff.</summary>
    public long EqualTo(int row) => Equal[row];

    /// <summary>The losses of series <paramref name="row"/> counted against probe number <paramref name="probe"/> of <paramref name="of"/>.</summary>
    public ProbeCount ProbeOf(int row, int probe, int of) => Probes[(row * of) + probe];

    /// <summary>Counts of series <paramref name="row"/>: below, the bins, above.</summary>
    public IReadOnlyList<long> Histogram(int row) => _histograms[row];
}
