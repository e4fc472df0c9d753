using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// Takes snapshots from a store. What does not depend on the as-of date is read and hashed once for each load, so many dates cost little more than one;
/// a load or a run that is stored in between is seen by the next snapshot. It may be used from several threads.
/// </summary>
public sealed class SnapshotReader(RiskStore store)
{
    /// <summary>Observation dates before the as-of date whose runs and profit are read: 250 days are counted, and gaps need a few more.</summary>
    public const int Window = 260;

    /// <summary>The same where models run side by side: they are compared over 500 days too.</summary>
    public const int LongWindow = 515;

    private readonly Lock _gate = new();
    private readonly CountableRuns _runs = new();
    private FeedState? _state;

    /// <summary>Dates with positions, ascending.</summary>
    public IReadOnlyList<DateOnly> PositionDates => Reading(_ => _state!.PositionDates);

    /// <summary>Dates with an observation of a listed factor, ascending.</summary>
    public IReadOnlyList<DateOnly> ObservationDates => Reading(_ => _state!.Observations.Dates.ToArray());

    /// <summary>Names of the books, in ordinal order.</summary>
    public IReadOnlyList<string> Books => Reading(_ => _state!.Reference.Books.Select(b => b.Name).Order(StringComparer.Ordinal).ToArray());

    /// <summary>Holidays of every calendar.</summary>
    public IReadOnlyList<Holiday> Holidays => Reading(_ => _state!.Reference.Holidays);

    /// <summary>
    /// Freezes what a run for <paramref name="asOf"/> reads. A date without positions or observations gives a snapshot without them; the checks say so.
    /// </summary>
    /// <param name="asOf">The date.</param>
    /// <param name="settings">Settings that figures depend on.</param>
    /// <param name="model">Name of the model whose earlier runs are counted.</param>
    /// <exception cref="StoreException">The store cannot be read.</exception>
    public Snapshot Take(DateOnly asOf, RunSettings settings, string model) => Freeze(asOf, settings, model).Snapshot;

    /// <summary>The same with the text of its parts, to be kept with the run.</summary>
    /// <exception cref="StoreException">The store cannot be read.</exception>
    public FrozenSnapshot Freeze(DateOnly asOf, RunSettings settings, string model)
    {
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(model);
        return Reading(connection => Freeze(connection, _state!, asOf, settings, model));
    }

    /// <summary>The positions of a date, and the hash of their text.</summary>
    public (IReadOnlyList<Position> Positions, string Hash) Held(DateOnly date) => Reading(connection =>
    {
        var positions = Positions(connection, date);
        return ((IReadOnlyList<Position>)positions, SnapshotLeaves.Positions(date, positions).Part.Hash);
    });

    /// <summary>
    /// What evidence over a span reads: observations and profit up to its end, and <paramref name="counted"/> in place of the runs that a run would
    /// count. Its hash stands for all of it but those runs.
    /// </summary>
    /// <param name="from">First day of profit.</param>
    /// <param name="to">Last day of profit.</param>
    /// <param name="settings">Settings that figures depend on.</param>
    /// <param name="counted">Runs, oldest first; none for a walk-forward.</param>
    /// <exception cref="StoreException">The store cannot be read.</exception>
    public Snapshot TakeSpan(DateOnly from, DateOnly to, RunSettings settings, IReadOnlyList<CountedRun> counted)
    {
        ArgumentNullException.ThrowIfNull(settings);
        ArgumentNullException.ThrowIfNull(counted);
        return Reading(connection =>
        {
            var state = _state!;
            var observations = state.Observations.UpTo(to);
            var profit = state.Profit(from, to);
            var earlier = WithoutProfit(observations, [.. counted], to, null).Where(day => Array.BinarySearch(state.PositionDates, day) >= 0).Select(day => Dated(connection, day)).ToArray();
            var withCovariance = settings.Model.Covariance == CovarianceEstimator.Given;
            SnapshotLeaf[] leaves = [SnapshotLeaves.AsOf(to, null), SettingsText.Leaf(settings), .. state.Leaves(to, observations.Count, profit, withCovariance)];
            return new Snapshot
            {
                AsOf = to,
                Settings = settings,
                Books = state.Reference.Books,
                Factors = state.Reference.Factors,
                Observations = observations,
                Adjustments = [.. state.Reference.Adjustments.Where(a => a.Date <= to)],
                Holidays = state.Reference.Holidays,
                Instruments = state.Reference.Instruments,
                Positions = [],
                Limits = state.Reference.Limits,
                ProfitAndLoss = profit,
                Covariance = withCovariance ? state.Reference.Covariance : [],
                CountedRuns = counted,
                EarlierPositions = earlier,
                Hash = SnapshotHash.Of(leaves.Select(l => l.Part)),
            };
        });
    }

    private T Reading<T>(Func<SqliteConnection, T> work)
    {
        lock (_gate)
        {
            return store.Read(connection =>
            {
                var load = Convert.ToInt64(connection.Scalar("SELECT max(id) FROM feed_load") ?? 0L, CultureInfo.InvariantCulture);
                if (_state?.Load != load) _state = new(connection, load);
                return work(connection);
            });
        }
    }

    private FrozenSnapshot Freeze(SqliteConnection connection, FeedState state, DateOnly asOf, RunSettings settings, string model)
    {
        _runs.Follow(connection);
        var observations = state.Observations.UpTo(asOf);
        var from = observations.Count == 0 ? asOf : observations.Dates[Math.Max(0, observations.Count - 1 - (settings.Challengers.Count > 0 ? LongWindow : Window))];
        var profit = state.Profit(from, asOf);
        var runs = _runs.Between(connection, model, from, asOf);
        var counted = runs.ConvertAll(r => r.Run);
        var positions = Positions(connection, asOf);
        var before = Array.FindLastIndex(state.PositionDates, date => date < asOf);
        var previous = before < 0 ? null : Dated(connection, state.PositionDates[before]);
        var earlier = WithoutProfit(observations, counted, asOf, previous?.Date)
            .Where(day => Array.BinarySearch(state.PositionDates, day) >= 0).Select(day => Dated(connection, day)).ToArray();
        var withCovariance = settings.Challengers.Append(settings.Model).Any(m => m.Covariance == CovarianceEstimator.Given);
        SnapshotLeaf[] leaves =
        [
            SnapshotLeaves.AsOf(asOf, previous?.Date), SettingsText.Leaf(settings), SnapshotLeaf.Of("model", model),
            .. state.Leaves(asOf, observations.Count, profit, withCovariance),
            SnapshotLeaves.Positions(asOf, positions), .. earlier.Append(previous).OfType<DatedPositions>().DistinctBy(d => d.Date).Select(d => SnapshotLeaves.Positions(d.Date, d.Positions)),
            .. runs.Select(r => r.Leaf),
        ];
        var snapshot = new Snapshot
        {
            AsOf = asOf,
            Settings = settings,
            Books = state.Reference.Books,
            Factors = state.Reference.Factors,
            Observations = observations,
            Adjustments = [.. state.Reference.Adjustments.Where(a => a.Date <= asOf)],
            Holidays = state.Reference.Holidays,
            Instruments = state.Reference.Instruments,
            Positions = positions,
            Previous = previous,
            Limits = state.Reference.Limits,
            ProfitAndLoss = profit,
            Covariance = withCovariance ? state.Reference.Covariance : [],
            FeedWarnings = state.Reference.FeedWarnings,
            CountedRuns = counted,
            EarlierPositions = earlier,
            Hash = SnapshotHash.Of(leaves.Select(l => l.Part)),
        };
        return new(snapshot, leaves);
    }

    /// <summary>
    /// Dates of counted runs where no counted run holds the profit from there to the next observation date; the one that a run at
    /// <paramref name="asOf"/> computes itself, from the positions of <paramref name="previous"/>, is not among them.
    /// </summary>
    internal static IEnumerable<DateOnly> WithoutProfit(ObservationHistory observations, List<CountedRun> counted, DateOnly asOf, DateOnly? previous)
    {
        var profitFrom = counted.ToDictionary(c => c.AsOf, c => c.HypotheticalDate);
        foreach (var run in counted)
        {
            var at = observations.IndexOf(run.AsOf);
            var next = at >= 0 ? at + 1 : ~at;
            if (next == observations.Count) continue;
            var to = observations.Dates[next];
            if (profitFrom.GetValueOrDefault(to) != run.AsOf && !(to == asOf && run.AsOf == previous)) yield return run.AsOf;
        }
    }

    private static DatedPositions Dated(SqliteConnection connection, DateOnly date) => new(date, Positions(connection, date));

    private static Position[] Positions(SqliteConnection connection, DateOnly date)
    {
        var positions = new List<Position>();
        using (var query = new BulkQuery(connection, "SELECT book, instrument, quantity, trade, market_value FROM position WHERE as_of = ?1", Iso.Of(date)))
        {
            while (query.Next()) positions.Add(new(query.Name(0), query.Name(1), query.Number(2)!.Value, query.Text(3), query.Number(4)));
        }
        positions.Sort(Canonical);
        return [.. positions];
    }

    /// <summary>The order of the positions of a date: by book, instrument, trade, then quantity and market value.</summary>
    internal static int Canonical(Position a, Position b)
    {
        var order = string.CompareOrdinal(a.Book, b.Book);
        if (order == 0) order = string.CompareOrdinal(a.Instrument, b.Instrument);
        if (order == 0) order = string.CompareOrdinal(a.Trade, b.Trade);
        if (order == 0) order = a.Quantity.CompareTo(b.Quantity);
        return order != 0 ? order : Nullable.Compare(a.MarketValue, b.MarketValue);
    }
}
