using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>Everything of the feed but the positions, as one load left it, with its leaves.</summary>
internal sealed class FeedState
{
    private readonly ProfitAndLoss[] _profit;
    private readonly SnapshotLeaf[] _observationLeaves;
    private readonly Dictionary<DateOnly, SnapshotLeaf> _profitLeaves, _adjustmentLeaves;
    private readonly SnapshotLeaf _covarianceLeaf;
    private readonly SnapshotLeaf[] _wholeLeaves;

    public FeedState(SqliteConnection connection, long load)
    {
        Load = load;
        var instruments = InstrumentRows.Read(connection);
        var instrumentLeaf = Task.Run(() => SnapshotLeaves.Instruments(instruments));
        Reference = ReferenceData.Read(connection, instruments);
        Observations = ReadObservations(connection, Reference.Factors);
        PositionDates = [.. connection.Query("SELECT as_of FROM position_date ORDER BY as_of", r => Iso.Date(r.GetString(0)))];
        _profit = [.. connection.Query("SELECT date, book, actual, hypothetical FROM pnl", r => new ProfitAndLoss(Iso.Date(r.GetString(0)), r.GetString(1), r.Number(2), r.Number(3)))
            .OrderBy(p => p.Date).ThenBy(p => p.Book, StringComparer.Ordinal)];
        _observationLeaves = SnapshotLeaves.Observations(Observations);
        _profitLeaves = SnapshotLeaves.Profit(_profit);
        _adjustmentLeaves = SnapshotLeaves.Adjustments(Reference.Adjustments);
        _covarianceLeaf = SnapshotLeaves.Covariance(Reference.Covariance);
        _wholeLeaves =
        [
            .. SnapshotLeaves.Reference(Reference),
            instrumentLeaf.GetAwaiter().GetResult(),
        ];
    }

    /// <summary>Number of the load.</summary>
    public long Load { get; }

    public ReferenceData Reference { get; }

    /// <summary>All observations of the listed factors.</summary>
    public ObservationHistory Observations { get; }

    /// <summary>Dates with positions, ascending.</summary>
    public DateOnly[] PositionDates { get; }

    /// <summary>Rows of profit from <paramref name="from"/> to <paramref name="to"/>, both included.</summary>
    public ArraySegment<ProfitAndLoss> Profit(DateOnly from, DateOnly to)
    {
        var (first, end) = (FirstProfitAt(from), FirstProfitAt(to.AddDays(1)));
        return new(_profit, first, Math.Max(0, end - first));
    }

    /// <summary>Leaves of what a run at <paramref name="asOf"/> reads beside positions and runs.</summary>
    public IEnumerable<SnapshotLeaf> Leaves(DateOnly asOf, int observations, IEnumerable<ProfitAndLoss> profit, bool withCovariance)
    {
        foreach (var leaf in _wholeLeaves) yield return leaf;
        for (var i = 0; i < observations; i++) yield return _observationLeaves[i];
        foreach (var (date, leaf) in _adjustmentLeaves) if (date <= asOf) yield return leaf;
        if (withCovariance) yield return _covarianceLeaf;
        DateOnly? last = null;
        foreach (var row in profit)
        {
            if (row.Date != last) yield return _profitLeaves[row.Date];
            last = row.Date;
        }
    }

    private int FirstProfitAt(DateOnly date)
    {
        var (low, high) = (0, _profit.Length);
        while (low < high)
        {
            var middle = (low + high) >>> 1;
            if (_profit[middle].Date < date) low = middle + 1;
            else high = middle;
        }
        return low;
    }

    private static ObservationHistory ReadObservations(SqliteConnection connection, IReadOnlyList<Factor> factors)
    {
        var names = factors.ToDictionary(f => f.Name, f => f.Name, StringComparer.Ordinal);
        var (lastText, lastDate) = ("", default(DateOnly));
        var rows = new List<Observation>();
        using var query = new BulkQuery(connection, "SELECT date, factor, value FROM observation ORDER BY date");
        while (query.Next())
        {
            if (!names.TryGetValue(query.Name(1), out var name)) continue;
            var date = query.Name(0);
            if (date != lastText) (lastText, lastDate) = (date, Iso.Date(date));
            rows.Add(new(lastDate, name, query.Number(2)!.Value));
        }
        return ObservationHistory.From(names.Keys, rows);
    }
}
