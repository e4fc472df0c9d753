using System.Runtime.ExceptionServices;
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
    private readonly int _threads;

    /// <summary>Takes the plan and the number of threads, at least 1.</summary>
    public BlockEvaluator(RevaluationPlan plan, int threads)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(threads, 1);
        (_plan, _threads) = (plan, threads);
    }

    /// <summary>Evaluates <paramref name="range"/>.</summary>
    /// <param name="range">The blocks.</param>
    /// <param name="reduction">What to keep of them.</param>
    /// <param name="blockDone">Told the width of each block when it is done; called from many threads.</param>
    /// <param name="cancellation">Stops between tiles.</param>
    public TRecord Evaluate<TRecord>(BlockRange range, Reduction<TRecord> reduction, Action<int>? blockDone, CancellationToken cancellation)
    {
        var total = reduction.Empty();
        if (range.Count == 0) return total;
        var gate = new Lock();
        var options = new ParallelOptions { MaxDegreeOfParallelism = _threads, CancellationToken = cancellation };
        try
        {
            Parallel.For(range.First, range.End, options,
                () => (Tile: new ScenarioTile(_plan), Losses: new double[_plan.Rows.Count * Blocks.Size], Record: reduction.Empty()),
                (block, _, worker) =>
                {
                    var width = range.WidthOf(block);
                    Fill(worker.Tile, worker.Losses, block, width, cancellation);
                    reduction.Accumulate(worker.Record, new(block, width, worker.Losses));
                    blockDone?.Invoke(width);
                    return worker;
                },
                worker =>
                {
                    lock (gate) reduction.Merge(total, worker.Record);
                });
        }
        catch (AggregateException e) when (e.InnerExceptions.Count > 0)
        {
            ExceptionDispatchInfo.Throw(e.InnerExceptions[0]);
        }
        return total;
    }

    private static void Fill(ScenarioTile tile, double[] losses, int block, int width, CancellationToken cancellation)
    {
        for (var offset = 0; offset < width; offset += ScenarioTile.Width)
        {
            cancellation.ThrowIfCancellationRequested();
            tile.Evaluate(((long)block * Blocks.Size) + offset, Math.Min(ScenarioTile.Width, width - offset), losses, offset, Blocks.Size);
        }
    }
}
