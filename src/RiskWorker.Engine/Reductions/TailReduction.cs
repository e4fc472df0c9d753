using RiskWorker.Engine.Simulation;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Reductions;

/// <summary>Equal bins over the losses of a series, with a count below and one above.</summary>
/// <param name="Low">Lower end of the first bin.</param>
/// <param name="High">Upper end of the last bin; above <paramref name="Low"/>.</param>
public readonly record struct HistogramEdges(double Low, double High)
{
    /// <summary>Number of bins.</summary>
    public const int Bins = 256;

    /// <summary>Width of a bin.</summary>
    public double Width => (High - Low) / Bins;

    /// <summary>Edges that hold all of <paramref name="losses"/>; a constant sample gets a bin around it.</summary>
    public static HistogramEdges Holding(ReadOnlySpan<double> losses)
    {
        var (low, high) = (double.PositiveInfinity, double.NegativeInfinity);
        foreach (var loss in losses) (low, high) = (Math.Min(low, loss), Math.Max(high, loss));
        var room = Math.Max((high - low) / (2 * Bins), Math.Max(Math.Abs(low) * 1e-12, 1e-12));
        return new(low - room, high + room);
    }
}

/// <summary>Keeps every scenario beyond a cutoff, and counts and sums of the rest.</summary>
public sealed class TailReduction : Reduction<TailRecord>
{
    private readonly double[] _cutoffs;
    private readonly HistogramEdges[] _edges;
    private readonly double _mass;
    private readonly double[] _exactFrom;
    private readonly double[][]? _probes;

    /// <summary>Takes a cutoff and the histogram's edges for each series of the plan.</summary>
    /// <param name="cutoffs">Cutoffs.</param>
    /// <param name="edges">Edges.</param>
    /// <param name="mass">Share of losses expected beyond a cutoff: room is made for that many.</param>
    /// <param name="isTailExact">Whether losses from the cutoff on must be those of full revaluation.</param>
    /// <param name="probes">For each series losses that the others are counted against, as many for each; null for none.</param>
    public TailReduction(double[] cutoffs, HistogramEdges[] edges, double mass = 0, bool isTailExact = true, double[][]? probes = null)
    {
        (_cutoffs, _edges, _mass, _probes) = (cutoffs, edges, mass, probes);
        _exactFrom = isTailExact ? cutoffs : [.. cutoffs.Select(_ => double.PositiveInfinity)];
    }

    /// <inheritdoc/>
    public override double[] ExactFrom => _exactFrom;

    /// <summary>Probes of each series.</summary>
    internal int ProbeCount => _probes is [var first, ..] ? first.Length : 0;

    /// <inheritdoc/>
    public override TailRecord Empty(int blocks = 0)
    {
        var record = new TailRecord(blocks);
        record.Reset(_cutoffs.Length, ProbeCount);
        MakeRoom(record, blocks);
        return record;
    }

    /// <summary>Makes room in <paramref name="record"/> for the tails of about <paramref name="blocks"/> more blocks.</summary>
    internal void MakeRoom(TailRecord record, int blocks)
    {
        var more = (int)Math.Ceiling(Math.Min(1, 1.2 * _mass) * blocks * Blocks.Size);
        for (var row = 0; row < _cutoffs.Length; row++) record.TailOf(row).EnsureCapacity(record.TailOf(row).Count + more);
    }

    /// <inheritdoc/>
    public override void Accumulate(TailRecord record, in LossBlock block)
    {
        Span<int> beyond = stackalloc int[Blocks.Size];
        var rows = _cutoffs.Length;
        var sums = record.BlockSums;
        for (var row = 0; row < rows; row++)
        {
            var losses = block.Row(row);
            sums[row] = LaneSum.Of(losses);
            if (!double.IsFinite(sums[row])) throw new NotFiniteNumberException($"A loss of series {row} among scenarios {block.FirstScenario} to {block.FirstScenario + block.Width - 1} is not a finite number.", sums[row]);
            sums[rows + row] = LaneSum.OfSquares(losses);
            Histogram.Accumulate(losses, _edges[row].Low, 1 / _edges[row].Width, record.HistogramOf(row));
            var count = Selection.Greater(losses, _cutoffs[row], beyond, out var equal);
            record.Equal[row] += equal;
            var tail = record.TailOf(row);
            foreach (var place in beyond[..count]) tail.Add(new(losses[place], block.FirstScenario + place));
            for (var k = 0; k < ProbeCount; k++)
            {
                var above = Selection.Greater(losses, _probes![row][k], beyond, out var same);
                record.Probes[(row * ProbeCount) + k] = record.Probes[(row * ProbeCount) + k].Plus(above, same);
            }
        }
        record.Sums.Add(block.Index, sums);
        record.Count += block.Width;
        record.Revalued += block.Revalued;
    }

    /// <inheritdoc/>
    public override void Merge(TailRecord record, TailRecord from)
    {
        for (var row = 0; row < _cutoffs.Length; row++) MergeRow(record, from, row);
        MergeSums(record, from);
    }

    /// <summary>The part of <see cref="Merge"/> that concerns one series alone; several threads may merge a series each.</summary>
    internal static void MergeRow(TailRecord record, TailRecord from, int row)
    {
        record.TailOf(row).AddRange(from.TailOf(row));
        record.Equal[row] += from.Equal[row];
        AddTo(record.HistogramOf(row), from.HistogramOf(row));
    }

    /// <summary>The part of <see cref="Merge"/> that concerns all series together.</summary>
    internal static void MergeSums(TailRecord record, TailRecord from)
    {
        record.Sums.Merge(from.Sums);
        record.Count += from.Count;
        record.Revalued += from.Revalued;
        for (var i = 0; i < record.Probes.Length; i++) record.Probes[i] = record.Probes[i].Plus(from.Probes[i].Beyond, from.Probes[i].Equal);
    }

    private static void AddTo(long[] counts, long[] more)
    {
        for (var i = 0; i < counts.Length; i++) counts[i] += more[i];
    }
}
