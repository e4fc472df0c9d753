using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Runs blocks of a plan over this machine's cores and reduces them to a record. Which core takes which block,
/// and in which order, changes no bit of the record's contents once it is read through its own queries.
/// </summary>
public sealed class BlockEvaluator
{
    private readonly RevaluationPlan _plan;
    private readonly SimulationWorkspace _workspace;

    /// <summary>Takes the plan and the number of threads, at least 1.</summary>
    public BlockEvaluator(RevaluationPlan plan, int threads)
        : this(plan, new SimulationWorkspace(threads))
    {
    }

    /// <summary>Takes the plan, and the threads and buffers to use.</summary>
    public BlockEvaluator(RevaluationPlan plan, SimulationWorkspace workspace) => (_plan, _workspace) = (plan, workspace);

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
            if (known is not null && known.Holds(block, width))
            {
                reduction.Accumulate(recordOf(worker, block), known.Block(block, width));
                return;
            }
            var losses = buffers.BlockOf(_plan.Rows.Count);
            Fill(buffers.TileOf(_plan), losses, block, width, stop);
            reduction.Accumulate(recordOf(worker, block), new(block, width, losses));
            blockDrawn?.Invoke(width);
        }, cancellation);

    private static void Fill(ScenarioTile tile, double[] losses, int block, int width, CancellationToken cancellation)
    {
        for (var offset = 0; offset < width; offset += ScenarioTile.Width)
        {
            cancellation.ThrowIfCancellationRequested();
            tile.Evaluate(((long)block * Blocks.Size) + offset, Math.Min(ScenarioTile.Width, width - offset), losses, offset, Blocks.Size);
        }
    }
}
