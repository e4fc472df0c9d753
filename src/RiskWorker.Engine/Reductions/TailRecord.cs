namespace RiskWorker.Engine.Reductions;

/// <summary>A scenario whose loss lies beyond the cutoff.</summary>
public readonly record struct TailEntry(double Loss, long Scenario);

/// <summary>
/// What the tail reduction keeps of a set of blocks: per series the count, sums on the fixed tree, a histogram,
/// the scenarios beyond the cutoff, and how many losses equal it. 16 bytes a kept scenario; never the whole vector.
/// </summary>
public sealed class TailRecord
{
    private readonly List<TailEntry>[] _tails;
    private readonly long[][] _histograms;

    internal TailRecord(int rows, int bins, int blocks, int tail)
    {
        _tails = [.. Enumerable.Range(0, rows).Select(_ => new List<TailEntry>(tail))];
        _histograms = [.. Enumerable.Range(0, rows).Select(_ => new long[bins + 2])];
        Equal = new long[rows];
        Sums = new(blocks);
        BlockSums = new double[2 * rows];
    }

    /// <summary>Scenarios seen.</summary>
    public long Count { get; internal set; }

    /// <summary>Sums of losses, then of their squares, series by series.</summary>
    public SumTree Sums { get; }

    /// <summary>Where the sums of the block at hand are formed.</summary>
    internal double[] BlockSums { get; }

    /// <summary>Losses equal to the cutoff, by series: counted, not kept.</summary>
    internal long[] Equal { get; }

    internal List<TailEntry> TailOf(int row) => _tails[row];

    internal long[] HistogramOf(int row) => _histograms[row];

    /// <summary>The tail of series <paramref name="row"/>, worst first, ties by scenario number.</summary>
    public TailEntry[] SortedTail(int row)
    {
        var tail = _tails[row].ToArray();
        Array.Sort(tail, static (a, b) => a.Loss != b.Loss ? b.Loss.CompareTo(a.Loss) : a.Scenario.CompareTo(b.Scenario));
        return tail;
    }

    /// <summary>How many losses of series <paramref name="row"/> equal its cutoff.</summary>
    public long EqualTo(int row) => Equal[row];

    /// <summary>Counts of series <paramref name="row"/>: below, the bins, above.</summary>
    public IReadOnlyList<long> Histogram(int row) => _histograms[row];
}
