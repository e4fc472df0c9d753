using RiskWorker.Domain.Books;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Backtesting.WalkForward;
using RiskWorker.Engine.Simulation;
using RiskWorker.Numerics;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>
/// The days of a walk-forward, side by side over the cores; each is kept when it is done, so that one that was stopped goes on where it was,
/// with the same bits.
/// </summary>
internal sealed class WalkForward(RiskStore store, SnapshotReader reader, Snapshot span, BookTree tree, int threads)
{
    private const int KeptTogether = 16;

    private readonly List<(string Key, DayForecast Day)> _pending = [];

    /// <summary>The forecasts of the profits of <paramref name="dates"/>; a day that has no positions, or too little history, has none.</summary>
    /// <param name="dates">Days of profit, ascending.</param>
    /// <param name="positions">Which positions.</param>
    /// <param name="confidences">Confidences, ascending.</param>
    /// <param name="progress">Told how many days are done.</param>
    /// <param name="cancellation">Stops between days; what is done stays.</param>
    public IReadOnlyList<DayForecast> Days(
        IReadOnlyList<DateOnly> dates, BacktestPositions positions, IReadOnlyList<Confidence> confidences, IProgress<WorkProgress> progress, CancellationToken cancellation)
    {
        var all = BacktestDays.Of(span.Observations);
        var today = positions == BacktestPositions.Today ? reader.Held(reader.PositionDates[^1]) : default;
        var day = new WalkForwardDay(span, tree, confidences);
        var (found, next, done) = (new DayForecast?[dates.Count], -1, 0);
        try
        {
            Parallel.For(0, Math.Min(threads, dates.Count), new ParallelOptions { MaxDegreeOfParallelism = threads, CancellationToken = cancellation }, _ =>
            {
                var workspace = new SimulationWorkspace(1);
                for (var i = Interlocked.Increment(ref next); i < dates.Count; i = Interlocked.Increment(ref next))
                {
                    cancellation.ThrowIfCancellationRequested();
                    var at = Array.BinarySearch(all, dates[i]);
                    if (at > 0) found[i] = Day(day, all[at - 1], dates[i], positions == BacktestPositions.Today ? today : reader.Held(all[at - 1]), workspace, cancellation);
                    progress.Report(new("walk forward", (double)Interlocked.Increment(ref done) / dates.Count, $"{dates[i]:yyyy-MM-dd}"));
                }
            });
        }
        finally
        {
            Keep(0);
        }
        return [.. found.OfType<DayForecast>()];
    }

    /// <summary>What was known at a close, with the positions to hold.</summary>
    public static Snapshot Known(Snapshot span, DateOnly close, IReadOnlyList<Position> positions) => span with
    {
        AsOf = close,
        Observations = span.Observations.UpTo(close),
        Adjustments = [.. span.Adjustments.Where(a => a.Date <= close)],
        Positions = positions,
        ProfitAndLoss = [],
        CountedRuns = [],
        EarlierPositions = [],
    };

    private DayForecast? Day(WalkForwardDay day, DateOnly close, DateOnly next, (IReadOnlyList<Position> Positions, string Hash) held, SimulationWorkspace workspace, CancellationToken cancellation)
    {
        if (held.Positions.Count == 0) return null;
        var key = SnapshotHash.OfText($"walk-forward\n{NumericsEpoch.Current}\n{span.Hash.Root}\n{held.Hash}\n{close:yyyy-MM-dd}\n{next:yyyy-MM-dd}\n");
        if (store.WalkForward.Find(key) is { } known) return known;
        if (day.Of(Known(span, close, held.Positions), next, workspace, cancellation) is not { } forecast) return null;
        lock (_pending) _pending.Add((key, forecast));
        Keep(KeptTogether);
        return forecast;
    }

    private void Keep(int least)
    {
        (string, DayForecast)[] ready;
        lock (_pending)
        {
            if (_pending.Count == 0 || _pending.Count < least) return;
            ready = [.. _pending];
            _pending.Clear();
        }
        store.WalkForward.Keep(ready);
    }
}
