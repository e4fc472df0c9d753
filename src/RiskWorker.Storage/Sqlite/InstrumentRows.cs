using Microsoft.Data.Sqlite;

namespace RiskWorker.Storage.Sqlite;

/// <summary>Instruments as they are stored, each as name, kind, currency, terms, issuer, lot and daily volume.</summary>
internal static class InstrumentRows
{
    public static List<string?[]> Read(SqliteConnection connection)
    {
        var rows = new List<string?[]>();
        using var query = new BulkQuery(connection, "SELECT instrument, kind, currency, terms, issuer, lot, daily_volume FROM instrument");
        while (query.Next()) rows.Add([query.Text(0), query.Name(1), query.Name(2), query.Text(3), query.Text(4), query.Text(5), query.Text(6)]);
        return rows;
    }
}
