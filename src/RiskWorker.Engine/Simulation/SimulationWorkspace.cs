using System.Runtime.ExceptionServices;
using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// The threads and the buffers of evaluations that follow one another: days of a history, looks of a run. What an
/// evaluation returns never lies in these buffers, so a workspace may be used again at once; it holds no figures, and
/// none depends on what it was used for before.
/// </summary>
/// <remarks>
/// It serves one evaluation at a time and one sampler at a time: a second evaluation while one is under way is refused,
/// and so is a look of a sampler after another one has begun on the same workspace. The memory lives as long as the object.
/// </remarks>
public sealed class SimulationWorkspace
{
    private readonly WorkerBuffers[] _workers;
    private readonly TailRecord[] _records;
    private int _busy;
    private int _sampler;

    /// <summary>A workspace for <paramref name="threads"/> threads, at least 1; buffers are made when they are first needed.</summary>
    public SimulationWorkspace(int threads)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(threads, 1);
        _workers = [.. Enumerable.Range(0, threads).Select(_ => new WorkerBuffers())];
        _records = [.. Enumerable.Range(0, threads + 1).Select(_ => new TailRecord())];
    }

    /// <summary>Threads that share the work, the caller's among them.</summary>
    public int Threads => _workers.Length;

    /// <summary>The losses of the pilot.</summary>
    internal LossSample Pilot { get; } = new();

    /// <summary>Gives the pilot and the records to a new sampler, whose number is returned.</summary>
    internal int BeginSampler() => Interlocked.Increment(ref _sampler);

    /// <summary>Refuses a sampler whose buffers have gone to a later one.</summary>
    internal void RequireSampler(int number)
    {
        if (number != Volatile.Read(ref _sampler)) throw new InvalidOperationException("The workspace has gone to a later sampler; each needs its own as long as it looks.");
    }

    /// <summary>An empty record of <paramref name="rows"/> series for each thread, and one more: always the same objects.</summary>
    internal TailRecord[] EmptyRecords(int rows, int probes = 0)
    {
        foreach (var record in _records) record.Reset(rows, probes);
        return _records;
    }

    /// <summary>Does items 0 to <paramref name="count"/> - 1 over the threads, each item on one of them, in no fixed order.</summary>
    /// <param name="count">Number of items.</param>
    /// <param name="work">Does one item, with the thread's number, its buffers and a token that also a failure of another thread cancels.</param>
    /// <param name="cancellation">Stops between items; the work itself looks at its token as often as it needs to.</param>
    /// <exception cref="InvalidOperationException">An evaluation is under way.</exception>
    internal void ForEach(int count, WorkItem work, CancellationToken cancellation)
    {
        if (count == 0) return;
        if (Interlocked.Exchange(ref _busy, 1) != 0) throw new InvalidOperationException("The workspace is in use; it serves one evaluation at a time.");
        try
        {
            Share(count, work, cancellation);
        }
        finally
        {
            Volatile.Write(ref _busy, 0);
        }
    }

    private void Share(int count, WorkItem work, CancellationToken cancellation)
    {
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        var (next, faults) = (-1, new Exception?[Math.Min(Threads, count)]);
        var (gate, inside, closed) = (new object(), 0, false);
        for (var i = 1; i < faults.Length; i++)
        {
            var worker = i;
            _ = Task.Factory.StartNew(() => Join(worker), CancellationToken.None, TaskCreationOptions.LongRunning, TaskScheduler.Default);
        }
        Work(0);
        lock (gate)
        {
            closed = true;
            while (inside > 0) Monitor.Wait(gate);
        }
        // Of several failures the one that is not a mere stop says what happened.
        if ((Array.Find(faults, f => f is not null and not OperationCanceledException) ?? Array.Find(faults, f => f is not null)) is { } fault) ExceptionDispatchInfo.Throw(fault);

        // A busy machine may start a thread only when there is nothing left to do: nobody waits for that one.
        void Join(int worker)
        {
            lock (gate)
            {
                if (closed) return;
                inside++;
            }
            try
            {
                Work(worker);
            }
            finally
            {
                lock (gate)
                {
                    inside--;
                    Monitor.Pulse(gate);
                }
            }
        }

        void Work(int worker)
        {
            try
            {
                for (var item = Interlocked.Increment(ref next); item < count; item = Interlocked.Increment(ref next))
                {
                    stop.Token.ThrowIfCancellationRequested();
                    work(worker, _workers[worker], item, stop.Token);
                }
            }
            catch (Exception e)
            {
                faults[worker] = e;
                stop.Cancel();
            }
        }
    }
}

/// <summary>One item of work on a thread of a <see cref="SimulationWorkspace"/>.</summary>
/// <param name="worker">Number of the thread, from 0.</param>
/// <param name="buffers">Its buffers.</param>
/// <param name="item">Number of the item.</param>
/// <param name="stop">Cancelled when the evaluation ends early.</param>
internal delegate void WorkItem(int worker, WorkerBuffers buffers, int item, CancellationToken stop);
