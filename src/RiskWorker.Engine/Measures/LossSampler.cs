using System.Diagnostics.CodeAnalysis;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Surfaces;
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

    /// <summary>Scenarios of it that are revalued fully to check surfaces on, where there are any.</summary>
    public const int CheckedScenarios = Blocks.Size;

    private readonly RevaluationPlan _plan;
    private readonly SimulationWorkspace _workspace;
    private readonly int _number;
    private readonly BlockEvaluator _evaluator;
    private readonly SurfaceSet? _surfaces;
    private readonly bool _isTailExact;
    private readonly TailDemand _demand;
    private readonly Action<int>? _drawn;
    private readonly CancellationToken _cancellation;
    private readonly LossSample _pilot;
    private readonly int _pilotCount;
    private readonly HistogramEdges[] _edges;
    private readonly double[] _cutoffs;
    private readonly double _mass;
    private readonly double[][]? _probes;
    private TailReduction _reduction;
    private TailRecord[] _records;
    private int _pilotDrawn;
    private int _wholeBlocks;
    private long _known;

    /// <summary>Draws the pilot, with a workspace of its own.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="threads">Threads to use.</param>
    /// <param name="demand">How deep the measures look.</param>
    /// <param name="firstLook">Scenarios of the first look, N0.</param>
    /// <param name="drawn">Told after each block how many scenarios of the look that is under way are drawn; called from many threads.</param>
    /// <param name="cancellation">Stops the run.</param>
    public LossSampler(RevaluationPlan plan, int threads, TailDemand demand, int firstLook, Action<long>? drawn, CancellationToken cancellation)
        : this(plan, new SimulationWorkspace(threads), demand, new() { Scenarios = firstLook, Revaluation = RevaluationKind.Full }, drawn, cancellation)
    {
    }

    /// <summary>Draws the pilot.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="workspace">Threads and buffers, this sampler's until another one begins on it.</param>
    /// <param name="demand">How deep the measures look.</param>
    /// <param name="settings">Scenarios of the first look, N0, and how to revalue.</param>
    /// <param name="drawn">Told after each block how many scenarios of the look that is under way are drawn; called from many threads.</param>
    /// <param name="cancellation">Stops the run.</param>
    /// <param name="probes">For each series losses that the others are counted against, as many for each; null for none. By surface the counts are only as exact as these.</param>
    public LossSampler(
        RevaluationPlan plan, SimulationWorkspace workspace, TailDemand demand, SimulationSettings settings, Action<long>? drawn, CancellationToken cancellation, double[][]? probes = null)
    {
        _probes = probes;
        var firstLook = settings.Scenarios;
        (_plan, _workspace, _demand, _cancellation) = (plan, workspace, demand, cancellation);
        _number = workspace.BeginSampler();
        _surfaces = SurfacesFor(settings);
        _isTailExact = settings.ExactTail;
        _evaluator = new(plan, workspace, _surfaces);
        _drawn = drawn is null ? null : width => drawn(Interlocked.Add(ref _known, width));
        _pilotCount = Math.Min(PilotScenarios, firstLook);
        _pilot = workspace.Pilot.Reset(plan.Rows.Count, _pilotCount);
        DrawPilot(_surfaces is null ? _pilotCount : Math.Min(CheckedScenarios, _pilotCount), bySurface: false);
        if (_evaluator.BoundFaults > 0) (_surfaces, _evaluator, AreSurfacesRefused) = (null, new(plan, workspace), true);
        DrawPilot(_pilotCount, bySurface: _surfaces is not null);
        var needed = (double)demand.DeepestRank(firstLook) / firstLook;
        _mass = needed + (6 * Math.Sqrt(needed / _pilotCount));
        (_edges, _cutoffs) = (new HistogramEdges[plan.Rows.Count], new double[plan.Rows.Count]);
        ForEachPilotRow(Enumerable.Range(0, plan.Rows.Count), (row, losses) => (_edges[row], _cutoffs[row]) = (HistogramEdges.Holding(losses), CutoffAt(losses, _mass)));
        Restart();
    }

    /// <summary>Scenarios that are revalued fully whatever their loss: all of the pilot, or with surfaces as many as these are checked on.</summary>
    public int FullyRevalued => _surfaces is null ? _pilotCount : Math.Min(CheckedScenarios, _pilotCount);

    /// <summary>The surfaces in use, or null.</summary>
    public SurfaceSet? Surfaces => _surfaces;

    /// <summary>Whether surfaces were built and then refused, since the pilot lay outside their bound: everything is then revalued fully.</summary>
    public bool AreSurfacesRefused { get; }

    /// <summary>Edges of each series' histogram.</summary>
    public IReadOnlyList<HistogramEdges> Edges => _edges;

    // Draws the part of the pilot up to `end` that is not there yet. Every thread adds to the one sample, each its own blocks. By surface a
    // pilot fixes cutoffs and edges as well, and costs a fraction; its blocks are then drawn once more, their tails exact.
    private void DrawPilot(int end, bool bySurface)
    {
        if (end == _pilotDrawn) return;
        _evaluator.EvaluateInto(BlockRange.From(_pilotDrawn / Blocks.Size, end), new LossSampleReduction(_plan.Rows.Count, _pilotCount, bySurface), (_, _) => _pilot, null, _drawn, _cancellation);
        if (bySurface) _pilot.ExactBlocks = _pilotDrawn / Blocks.Size;
        _pilotDrawn = end;
    }

    /// <summary>The tails of the first <paramref name="scenarios"/> scenarios; never fewer than at the look before. What is returned is the caller's: later looks leave it as it is.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Fewer scenarios than the pilot's, or than at the look before.</exception>
    /// <exception cref="InvalidOperationException">Another sampler has begun on the workspace.</exception>
    public (TailRecord Record, IReadOnlyList<SampledLoss> Series) Look(int scenarios)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(scenarios, Math.Max(_pilotCount, _wholeBlocks * Blocks.Size));
        while (true)
        {
            Draw(scenarios);
            var (record, series) = Tails(scenarios);
            if (!LowerCutoffs(series, _demand.DeepestRank(scenarios))) return (record, series);
        }
    }

    // Whole blocks are kept from look to look, a record a thread; the short last one stands apart, since a later look draws it anew.
    // The pilot's blocks are reduced from memory instead of being drawn twice.
    private void Draw(int scenarios)
    {
        _workspace.RequireSampler(_number);
        var range = BlockRange.From(_wholeBlocks, scenarios);
        var (end, last) = (scenarios / Blocks.Size, _records[^1]);
        last.Reset(_plan.Rows.Count, _reduction.ProbeCount);
        MakeRoom(end - range.First, last);
        _known = (long)Math.Max(_wholeBlocks, Math.Min(_pilot.ExactBlocks, _pilotCount / Blocks.Size)) * Blocks.Size;
        try
        {
            _evaluator.EvaluateInto(range, _reduction, (worker, block) => block < end ? _records[worker] : last, _pilot, _drawn, _cancellation);
        }
        catch
        {
            Restart(); // the records hold who knows which blocks
            throw;
        }
        _wholeBlocks = end;
    }

    private void MakeRoom(int wholeBlocks, TailRecord last)
    {
        var workers = Math.Min(_workspace.Threads, wholeBlocks);
        for (var worker = 0; worker < workers; worker++) _reduction.MakeRoom(_records[worker], (wholeBlocks / workers) + 1);
        _reduction.MakeRoom(last, 1);
    }

    private (TailRecord Record, SampledLoss[] Series) Tails(int scenarios)
    {
        var (record, series, ranks) = (_reduction.Empty(), new SampledLoss[_plan.Rows.Count], _demand.RanksOf(scenarios));
        _workspace.ForEach(series.Length, (_, buffers, row, _) =>
        {
            record.EnsureTail(row, _records.Sum(part => part.TailOf(row).Count));
            foreach (var part in _records) TailReduction.MergeRow(record, part, row);
            series[row] = new(ranks, record.SortTail(row, buffers.Order), _cutoffs[row], record.EqualTo(row));
        }, _cancellation);
        foreach (var part in _records) TailReduction.MergeSums(record, part);
        return (record, series);
    }

    private bool LowerCutoffs(SampledLoss[] series, int deepest)
    {
        var shallow = Enumerable.Range(0, series.Length).Where(row => series[row].Known < deepest).ToArray();
        if (shallow.Length == 0) return false;
        ForEachPilotRow(shallow, (row, losses) =>
        {
            var reached = 0;
            foreach (var loss in losses) reached += loss >= _cutoffs[row] ? 1 : 0;
            _cutoffs[row] = CutoffAt(losses, 2.0 * reached / _pilotCount);
        });
        Restart();
        return true;
    }

    // A run that draws little beyond its pilot is done before surfaces would pay; a book that ages is another one at every horizon and has none.
    private SurfaceSet? SurfacesFor(SimulationSettings settings)
    {
        if (settings.Revaluation == RevaluationKind.Full || settings.Scenarios <= 2 * PilotScenarios || _plan.Aged.Count > 0) return null;
        var surfaces = new SurfaceBuilder(_plan, settings.SurfaceError).Build(_workspace, _cancellation);
        return surfaces.Count > 0 ? surfaces : null;
    }

    [MemberNotNull(nameof(_reduction), nameof(_records))]
    private void Restart()
    {
        _reduction = new(_cutoffs, _edges, _mass, _isTailExact, _probes);
        _records = _workspace.EmptyRecords(_plan.Rows.Count, _reduction.ProbeCount);
        _wholeBlocks = 0;
    }

    /// <summary>Gives copies of the pilot's losses of some rows, which may be reordered, to <paramref name="work"/>, over the threads.</summary>
    private void ForEachPilotRow(IEnumerable<int> rows, Action<int, Span<double>> work)
    {
        var all = rows.ToArray();
        _workspace.ForEach(all.Length, (_, buffers, item, _) =>
        {
            var losses = buffers.Values(_pilotCount);
            _pilot.CopyRow(all[item], losses);
            work(all[item], losses);
        }, _cancellation);
    }

    // Nothing needs to be left out where the mass is nearly all of the sample.
    private static double CutoffAt(Span<double> losses, double mass)
    {
        var rank = (int)Math.Ceiling(mass * losses.Length);
        return rank >= losses.Length ? double.NegativeInfinity : OrderStatistic.Largest(losses, rank);
    }
}
