using Microsoft.Data.Sqlite;

namespace RiskWorker.Storage.Sqlite.Writers;

/// <summary>A table of the store and how a file replaces it.</summary>
/// <param name="Name">Name of the table.</param>
/// <param name="Keys">How many of the columns, from the first on, identify a row.</param>
/// <param name="Columns">The columns, in the order of the rows' cells.</param>
/// <param name="KeepsMissing">Whether stored rows that the file leaves out stay.</param>
internal sealed record TableShape(string Name, int Keys, IReadOnlyList<string> Columns, bool KeepsMissing = false);

/// <summary>Makes a small table equal to a file, touching only the rows that differ.</summary>
internal sealed class TableWriter : IRowWriter<string?[]>
{
    private readonly SqliteConnection _connection;
    private readonly TableShape _shape;
    private readonly Dictionary<string, string?[]> _stored;
    private readonly HashSet<string> _seen = new(StringComparer.Ordinal);
    private readonly BulkStatement _upsert;
    private long _added, _changed, _unchanged;

    public TableWriter(SqliteConnection connection, TableShape shape)
    {
        (_connection, _shape) = (connection, shape);
        var columns = shape.Columns.Select(c => $"\"{c}\"").ToArray();
        _stored = connection.Query($"SELECT {string.Join(", ", columns)} FROM {shape.Name}", Cells).ToDictionary(Key, StringComparer.Ordinal);
        _upsert = new(connection, $"INSERT OR REPLACE INTO {shape.Name} ({string.Join(", ", columns)}) VALUES ({Marks(columns.Length)})");
    }

    public void Write(in string?[] row)
    {
        var key = Key(row);
        if (!_seen.Add(key)) return;
        if (!_stored.TryGetValue(key, out var stored)) _added++;
        else if (stored.AsSpan().SequenceEqual(row))
        {
            _unchanged++;
            return;
        }
        else _changed++;
        for (var i = 0; i < row.Length; i++) _upsert.Set(i, row[i]);
        _upsert.Run();
    }

    public RowCounts Finish()
    {
        var removed = _shape.KeepsMissing ? [] : _stored.Where(s => !_seen.Contains(s.Key)).Select(s => s.Value).ToArray();
        var condition = string.Join(" AND ", _shape.Columns.Take(_shape.Keys).Select((c, i) => $"\"{c}\" = ?{i + 1}"));
        foreach (var row in removed) _connection.Run($"DELETE FROM {_shape.Name} WHERE {condition}", [.. row.Take(_shape.Keys)]);
        return new(_added, _changed, removed.Length, _unchanged);
    }

    public void Dispose() => _upsert.Dispose();

    // Keys are names and dates, which hold no control characters, so the separator cannot be part of one.
    private string Key(string?[] row) => _shape.Keys == 1 ? row[0]! : string.Join('\u001f', row.AsSpan(0, _shape.Keys));

    private string?[] Cells(SqliteDataReader row)
    {
        var cells = new string?[_shape.Columns.Count];
        for (var i = 0; i < cells.Length; i++) cells[i] = row.Text(i);
        return cells;
    }

    private static string Marks(int count) => string.Join(", ", Enumerable.Range(1, count).Select(i => $"?{i}"));
}
