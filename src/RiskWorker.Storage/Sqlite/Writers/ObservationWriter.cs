using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>Adds observations; one that differs in value replaces the stored one, which goes to the corrections. What the file leaves out stays.</summary>
internal sealed class ObservationWriter(SqliteConnection connection, long load) : IRowWriter<ObservationRow>
{
    private readonly BulkStatement _insert = new(connection, "INSERT INTO observation (date, factor, value) VALUES (?1, ?2, ?3) ON CONFLICT DO NOTHING");
    private readonly Statement _stored = new(connection, "SELECT value FROM observation WHERE date = ?1 AND factor = ?2", 2);
    private readonly Statement _update = new(connection, "UPDATE observation SET value = ?3 WHERE date = ?1 AND factor = ?2", 3);
    private readonly Statement _correct = new(connection, "INSERT INTO observation_correction (date, factor, new_value, old_value, load) VALUES (?1, ?2, ?3, ?4, ?5)", 5);
    private readonly IsoText _iso = new();
    private long _added, _changed, _unchanged;

    public void Write(in ObservationRow row)
    {
        var date = _iso.Of(row.Date);
        if (_insert.Set(0, date).Set(1, row.Factor).Set(2, row.Value.Text).Run() == 1)
        {
            _added++;
            return;
        }
        var stored = (string)_stored.Set(0, date).Set(1, row.Factor).Scalar()!;
        if (double.Parse(stored, CultureInfo.InvariantCulture) == row.Value.Value)
        {
            _unchanged++;
            return;
        }
        _update.Set(0, date).Set(1, row.Factor).Set(2, row.Value.Text).Run();
        _correct.Set(0, date).Set(1, row.Factor).Set(2, row.Value.Text).Set(3, stored).Set(4, load).Run();
        _changed++;
    }

    public RowCounts Finish() => new(_added, _changed, 0, _unchanged);

    public void Dispose()
    {
        _insert.Dispose();
        _stored.Dispose();
        _update.Dispose();
        _correct.Dispose();
    }
}
