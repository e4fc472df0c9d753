using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Surfaces;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Runs blocks of a plan over this machine's cores and reduces them to a record. Which core takes which block,
/// and in which order, changes no bit of the record's contents once it is read through its own queries.
/// </summary>
public sealed class BlockEvaluator
{
    private readonly RevaluationPlan _plan;
    private readonly SimulationWorkspace _workspace;
    private readonly SurfaceSet? _surfaces;
    private long _boundFaults;

    /// <summary>Takes the plan and the number of threads, at least 1.</summary>
    public BlockEvaluator(RevaluationPlan plan, int threads)
        : this(plan, new SimulationWorkspace(threads))
    {
    }

    /// <summary>Takes the plan, and the threads and buffers to use.</summary>
    /// <param name="plan">The plan.</param>
    /// <param name="workspace">Threads and buffers.</param>
    /// <param name="surfaces">
    /// Surfaces of the plan, or null to revalue everything fully. With them a reduction that names thresholds gets losses by surface below
    /// them; any other gets full revaluation, against which the surfaces are checked in passing.
    /// </param>
    public BlockEvaluator(RevaluationPlan plan, SimulationWorkspace workspace, SurfaceSet? surfaces = null) => (_plan, _workspace, _surfaces) = (plan, workspace, surfaces);

    /// <summary>Losses by surface that lay further from full revaluation than their bound, so far.</summary>
    public long BoundFaults => Volatile.Read(ref _boundFaults);

    /// <summary>Evaluates <paramref name="range"/>.</summary>
    /// <param name="range">The blocks.</param>
    /// <param name="reduction">What to keep of them.</param>
    /// <param name="blockDone">Told the width of each block when it is done; called from many threads.</param>
    /// <param name="cancellation">Stops between tiles.</param>
    public TRecord Evaluate<TRecord>(BlockRange range, Reduction<TRecord> reduction, Action<int>? blockDone, CancellationToken cancellation)
    {
        var total = reduction.Empty(range.Count);
        if (range.Count == 0) return total;
        var workers = Math.Min(_workspace.Threads, range.Count);
        var records = Enumerable.Range(0, workers).Select(_ => reduction.Empty((range.Count / workers) + 1)).ToArray();
        EvaluateInto(range, reduction, (worker, _) => records[worker], null, blockDone, cancellation);
        foreach (var record in records) reduction.Merge(total, record);
        return total;
    }

    /// <summary>Adds the blocks of <paramref name="range"/> to records that the caller keeps.</summary>
    /// <param name="range">The blocks.</param>
    /// <param name="reduction">What to keep of them.</param>
    /// <param name="recordOf">The record for a thread and a block; two threads never write to one record at once, unless it can bear that.</param>
    /// <param name="known">Blocks drawn before, which are taken from it instead of being drawn again; or null.</param>
    /// <param name="blockDrawn">Told the width of each block that was drawn; called from many threads.</param>
    /// <param name="cancellation">Stops between tiles; the records then hold a part of the range.</param>
    internal void EvaluateInto<TRecord>(
        BlockRange range, Reduction<TRecord> reduction, Func<int, int, TRecord> recordOf, LossSample? known, Action<int>? blockDrawn, CancellationToken cancellation) =>
        _workspace.ForEach(range.Count, (worker, buffers, item, stop) =>
        {
            var block = range.First + item;
            var width = range.WidthOf(block);
            if (known is not null && block < known.ExactBlocks && known.Holds(block, width))
            {
                reduction.Accumulate(recordOf(worker, block), known.Block(block, width));
                return;
            }
            var losses = buffers.BlockOf(_plan.Rows.Count);
            var revalued = Fill(buffers, losses, block, width, reduction.ExactFrom, stop);
            reduction.Accumulate(recordOf(worker, block), new(block, width, losses, revalued));
            blockDrawn?.Invoke(width);
        }, cancellation);

    private long Fill(WorkerBuffers buffers, double[] losses, int block, int width, double[]? exactFrom, CancellationToken cancellation)
    {
        var (tile, surfaceTile, before) = (buffers.TileOf(_plan), _surfaces is null ? null : buffers.SurfaceTileOf(_plan, _surfaces), 0L);
        if (surfaceTile is not null)
        {
            before = surfaceTile.Revalued;
            surfaceTile.Begin();
        }
        for (var offset = 0; offset < width; offset += ScenarioTile.Width)
        {
            cancellation.ThrowIfCancellationRequested();
            var (first, lanes) = (((long)block * Blocks.Size) + offset, Math.Min(ScenarioTile.Width, width - offset));
            if (surfaceTile is null) tile.Evaluate(first, lanes, losses, offset, Blocks.Size);
            else if (exactFrom is not null) surfaceTile.Evaluate(first, lanes, losses, offset, exactFrom);
            else if (surfaceTile.Check(first, lanes, losses, offset) is var faults and > 0) Interlocked.Add(ref _boundFaults, faults);
        }
        if (surfaceTile is null || exactFrom is null) return 0;
        surfaceTile.Finish(losses);
        return surfaceTile.Revalued - before;
    }
}
