using System.Globalization;
using System.Text;
using Microsoft.Data.Sqlite;
using SQLitePCL;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// A query over the millions of rows of a feed, straight on SQLite's own interface: an ADO.NET reader costs more than the row that it reads.
/// Numbers are read from their bytes, and texts that repeat (<see cref="Name"/>) are one string each.
/// </summary>
internal sealed class BulkQuery : IDisposable
{
    private const int LongestOnStack = 256;

    private readonly sqlite3 _database;
    private readonly sqlite3_stmt _statement;
    private readonly HashSet<string> _names = new(StringComparer.Ordinal);
    private readonly HashSet<string>.AlternateLookup<ReadOnlySpan<char>> _pool;

    /// <summary>Prepares <paramref name="sql"/> with its text parameters <c>?1</c>, <c>?2</c>, …</summary>
    public BulkQuery(SqliteConnection connection, string sql, params ReadOnlySpan<string> texts)
    {
        _database = connection.Handle!;
        _pool = _names.GetAlternateLookup<ReadOnlySpan<char>>();
        Check(raw.sqlite3_prepare_v2(_database, sql, out _statement));
        for (var i = 0; i < texts.Length; i++) Check(raw.sqlite3_bind_text(_statement, i + 1, texts[i]));
    }

    /// <summary>Goes to the next row; false after the last.</summary>
    public bool Next()
    {
        var result = raw.sqlite3_step(_statement);
        if (result == raw.SQLITE_ROW) return true;
        if (result != raw.SQLITE_DONE) Check(result);
        return false;
    }

    /// <summary>The text in <paramref name="column"/>, or null.</summary>
    public string? Text(int column)
    {
        var utf8 = Utf8(column);
        return utf8.IsEmpty && IsNull(column) ? null : Encoding.UTF8.GetString(utf8);
    }

    /// <summary>The text in <paramref name="column"/>, which is not null, as the string that equal texts of this query share.</summary>
    public string Name(int column)
    {
        var utf8 = Utf8(column);
        if (utf8.Length > LongestOnStack) return Encoding.UTF8.GetString(utf8);
        Span<char> text = stackalloc char[LongestOnStack];
        text = text[..Encoding.UTF8.GetChars(utf8, text)];
        if (_pool.TryGetValue(text, out var known)) return known;
        var name = text.ToString();
        _names.Add(name);
        return name;
    }

    /// <summary>The number typed in <paramref name="column"/>, or null.</summary>
    public double? Number(int column)
    {
        var utf8 = Utf8(column);
        return utf8.IsEmpty && IsNull(column) ? null : double.Parse(utf8, NumberStyles.Float, CultureInfo.InvariantCulture);
    }

    public void Dispose() => _statement.Dispose();

    private ReadOnlySpan<byte> Utf8(int column) => raw.sqlite3_column_blob(_statement, column);

    private bool IsNull(int column) => raw.sqlite3_column_type(_statement, column) == raw.SQLITE_NULL;

    private void Check(int result)
    {
        if (result != raw.SQLITE_OK) SqliteException.ThrowExceptionForRC(result, _database);
    }
}
