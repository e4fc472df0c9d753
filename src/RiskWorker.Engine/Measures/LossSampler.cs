using System.Diagnostics.CodeAnalysis;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Measures;

/// <summary>
/// Draws a run's losses look by look: a pilot fixes how much of each tail is kept, later looks add only the scenarios that
/// are new, and a tail that turns out too short is drawn again with a lower cutoff.
/// </summary>
public sealed class LossSampler
{
    /// <summary>Scenarios of the pilot; a run of fewer uses its own.</summary>
    public const int PilotScenarios = 16_384;

    private readonly RevaluationPlan _plan;
    private readonly BlockEvaluator _evaluator;
    private readonly TailDemand _demand;
    private readonly Action<long>? _drawn;
    private readonly CancellationToken _cancellation;
    private readonly double[][] _pilot;
    private readonly double[] _scratch;
    private readonly int _pilotCount;
    private readonly HistogramEdges[] _edges;
    private readonly double[] _cutoffs;
    private readonly double _mass;
    private TailReduction _reduction;
    private TailRecord _whole;
    private int _wholeBlocks;
    private long _known;

    /// <summary>Draws the pilot.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="threads">Threads to use.</param>
    /// <param name="demand">How deep the measures look.</param>
    /// <param name="firstLook">Scenarios of the first look, N0.</param>
    /// <param name="drawn">Told after each block how many scenarios of the look that is under way are drawn; called from many threads.</param>
    /// <param name="cancellation">Stops the run.</param>
    public LossSampler(RevaluationPlan plan, int threads, TailDemand demand, int firstLook, Action<long>? drawn, CancellationToken cancellation)
    {
        (_plan, _demand, _drawn, _cancellation) = (plan, demand, drawn, cancellation);
        _evaluator = new(plan, threads);
        _pilotCount = Math.Min(PilotScenarios, firstLook);
        _pilot = Evaluate(BlockRange.From(0, _pilotCount), new LossSampleReduction(plan.Rows.Count, _pilotCount));
        _edges = [.. _pilot.Select(losses => HistogramEdges.Holding(losses))];
        _scratch = new double[_pilotCount];
        var needed = (double)demand.DeepestRank(firstLook) / firstLook;
        _mass = needed + (6 * Math.Sqrt(needed / _pilotCount));
        _cutoffs = [.. _pilot.Select(losses => CutoffAt(losses, _mass))];
        Restart();
    }

    /// <summary>Edges of each series' histogram.</summary>
    public IReadOnlyList<HistogramEdges> Edges => _edges;

    /// <summary>The tails of the first <paramref name="scenarios"/> scenarios; never fewer than at the look before.</summary>
    public (TailRecord Record, IReadOnlyList<SampledLoss> Series) Look(int scenarios)
    {
        while (true)
        {
            var record = Draw(scenarios);
            var series = _plan.Rows.Select((_, row) => new SampledLoss(scenarios, record.SortedTail(row), _cutoffs[row], record.EqualTo(row))).ToArray();
            if (!LowerCutoffs(series, _demand.DeepestRank(scenarios))) return (record, series);
        }
    }

    private TailRecord Draw(int scenarios)
    {
        _known = (long)_wholeBlocks * Blocks.Size;
        var whole = BlockRange.Whole(_wholeBlocks, scenarios);
        _reduction.Merge(_whole, Evaluate(whole, _reduction));
        _wholeBlocks = Math.Max(_wholeBlocks, whole.End);
        if (scenarios % Blocks.Size == 0) return _whole;
        var record = _reduction.Empty();
        _reduction.Merge(record, _whole);
        _reduction.Merge(record, Evaluate(BlockRange.From(_wholeBlocks, scenarios), _reduction));
        return record;
    }

    private TRecord Evaluate<TRecord>(BlockRange range, Reduction<TRecord> reduction) =>
        _evaluator.Evaluate(range, reduction, _drawn is null ? null : width => _drawn(Interlocked.Add(ref _known, width)), _cancellation);

    private bool LowerCutoffs(SampledLoss[] series, int deepest)
    {
        var lowered = false;
        for (var row = 0; row < series.Length; row++)
        {
            if (series[row].Known >= deepest) continue;
            var reached = _pilot[row].Count(loss => loss >= _cutoffs[row]);
            _cutoffs[row] = CutoffAt(_pilot[row], 2.0 * reached / _pilotCount);
            lowered = true;
        }
        if (lowered) Restart();
        return lowered;
    }

    // The pilot's whole blocks are the run's first blocks: they are reduced from memory instead of drawn twice.
    [MemberNotNull(nameof(_reduction), nameof(_whole))]
    private void Restart()
    {
        _reduction = new(_cutoffs, _edges, _mass);
        _whole = _reduction.Empty();
        _wholeBlocks = _pilotCount / Blocks.Size;
        var losses = new double[_plan.Rows.Count * Blocks.Size];
        for (var block = 0; block < _wholeBlocks; block++)
        {
            for (var row = 0; row < _pilot.Length; row++) _pilot[row].AsSpan(block * Blocks.Size, Blocks.Size).CopyTo(losses.AsSpan(row * Blocks.Size));
            _reduction.Accumulate(_whole, new(block, Blocks.Size, losses));
        }
    }

    // Nothing needs to be left out where the mass is nearly all of the sample.
    private double CutoffAt(double[] losses, double mass)
    {
        var rank = (int)Math.Ceiling(mass * losses.Length);
        if (rank >= losses.Length) return double.NegativeInfinity;
        losses.CopyTo(_scratch, 0);
        return OrderStatistic.Largest(_scratch, rank);
    }
}
