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
        var total = reduction.Empty(range.Count);
        var workers = Math.Min(_threads, range.Count);
        if (workers == 0) return total;
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        var (next, gate) = (range.First - 1, new Lock());
        var tasks = Enumerable.Range(0, workers).Select(_ => Task.Factory.StartNew(Work, CancellationToken.None, TaskCreationOptions.LongRunning, TaskScheduler.Default)).ToArray();
        try
        {
            Task.WaitAll(tasks, CancellationToken.None);
        }
        catch (AggregateException e)
        {
            // Of several failures the one that is not a mere stop says what happened.
            ExceptionDispatchInfo.Throw(e.InnerExceptions.FirstOrDefault(f => f is not OperationCanceledException) ?? e.InnerExceptions[0]);
        }
        return total;

        void Work()
        {
            var tile = new ScenarioTile(_plan);
            var losses = new double[_plan.Rows.Count * Blocks.Size];
            var record = reduction.Empty((range.Count / workers) + 1);
            try
            {
                for (var block = Interlocked.Increment(ref next); block < range.End; block = Interlocked.Increment(ref next))
                {
                    var width = range.WidthOf(block);
                    Fill(tile, losses, block, width, stop.Token);
                    reduction.Accumulate(record, new(block, width, losses));
                    blockDone?.Invoke(width);
                }
            }
            catch
            {
                stop.Cancel();
                throw;
            }
            lock (gate) reduction.Merge(total, record);
        }
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
