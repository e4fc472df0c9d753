using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Storage.Feed;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>Adds rows of profit; one that differs in a value replaces the stored one, which goes to the corrections. What the file leaves out stays.</summary>
internal sealed class ProfitWriter(SqliteConnection connection, long load) : IRowWriter<ProfitRow>
{
    private readonly Statement _insert = new(connection, "INSERT INTO pnl (date, book, actual, hypothetical) VALUES (?1, ?2, ?3, ?4) ON CONFLICT DO NOTHING", 4);
    private long _added, _changed, _unchanged;

    public void Write(in ProfitRow row)
    {
        var date = Iso.Of(row.Date);
        if (_insert.Set(0, date).Set(1, row.Book).Set(2, row.Actual?.Text).Set(3, row.Hypothetical?.Text).Run() == 1)
        {
            _added++;
            return;
        }
        var (actual, hypothetical) = connection.Query("SELECT actual, hypothetical FROM pnl WHERE date = ?1 AND book = ?2", r => (r.Text(0), r.Text(1)), date, row.Book)[0];
        var (newActual, newHypothetical) = (Newer(actual, row.Actual), Newer(hypothetical, row.Hypothetical));
        if (newActual == actual && newHypothetical == hypothetical)
        {
            _unchanged++;
            return;
        }
        connection.Run("UPDATE pnl SET actual = ?3, hypothetical = ?4 WHERE date = ?1 AND book = ?2", date, row.Book, newActual, newHypothetical);
        connection.Run("INSERT INTO pnl_correction (date, book, old_actual, new_actual, old_hypothetical, new_hypothetical, load) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7)",
            date, row.Book, actual, newActual, hypothetical, newHypothetical, load);
        _changed++;
    }

    public RowCounts Finish() => new(_added, _changed, 0, _unchanged);

    public void Dispose() => _insert.Dispose();

    /// <summary>What was read; the stored text where both are the same number.</summary>
    private static string? Newer(string? stored, TypedNumber? read) =>
        stored is not null && read is { } number && double.Parse(stored, CultureInfo.InvariantCulture) == number.Value ? stored : read?.Text;
}
