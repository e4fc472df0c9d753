using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>Replaces the positions of each date in the file whose digest differs from the stored one; other dates stay.</summary>
internal sealed class PositionWriter : IRowWriter<PositionRow>
{
    private readonly BulkStatement _insert;
    private readonly HashSet<DateOnly> _replaced = [];
    private readonly IsoText _iso = new();
    private readonly long _added, _changed, _removed, _unchanged;
    private long _row;

    public PositionWriter(SqliteConnection connection, PositionDigests digests)
    {
        _insert = new(connection, "INSERT INTO position (as_of, row, book, instrument, quantity, trade, market_value) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7)");
        var stored = connection.Query("SELECT as_of, rows, digest FROM position_date", r => (AsOf: r.GetString(0), Rows: r.GetInt64(1), Digest: r.GetString(2)))
            .ToDictionary(d => d.AsOf, StringComparer.Ordinal);
        foreach (var (date, (rows, sum)) in digests.ByDate)
        {
            var (asOf, digest) = (Iso.Of(date), sum.ToString("x32", CultureInfo.InvariantCulture));
            var known = stored.TryGetValue(asOf, out var before);
            if (known && before.Rows == rows && before.Digest == digest)
            {
                _unchanged += rows;
                continue;
            }
            _replaced.Add(date);
            if (!known) _added += rows;
            else
            {
                // Rows have no key of their own: of a date that differs, as many as both have count as changed.
                var both = Math.Min(rows, before.Rows);
                (_changed, _added, _removed) = (_changed + both, _added + rows - both, _removed + before.Rows - both);
                connection.Run("DELETE FROM position WHERE as_of = ?1", asOf);
            }
            connection.Run("INSERT INTO position_date (as_of, rows, digest) VALUES (?1, ?2, ?3) ON CONFLICT DO UPDATE SET rows = ?2, digest = ?3", asOf, rows, digest);
        }
    }

    public void Write(in PositionRow row)
    {
        _row++;
        if (!_replaced.Contains(row.AsOf)) return;
        _insert.Set(0, _iso.Of(row.AsOf)).Set(1, _row).Set(2, row.Book).Set(3, row.Instrument)
            .Set(4, row.Quantity.Text).Set(5, row.Trade).Set(6, row.MarketValue?.Text).Run();
    }

    public RowCounts Finish() => new(_added, _changed, _removed, _unchanged);

    public void Dispose() => _insert.Dispose();
}
