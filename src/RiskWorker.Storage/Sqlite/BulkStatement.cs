using System.Text;
using Microsoft.Data.Sqlite;
using SQLitePCL;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// A prepared statement without result rows for the millions of rows of a feed, straight on SQLite's own interface:
/// an ADO.NET command costs more than the insert that it runs.
/// </summary>
internal sealed class BulkStatement : IDisposable
{
    private static readonly object s_nothing = new();

    private readonly sqlite3 _database;
    private readonly sqlite3_stmt _statement;
    private readonly object?[] _bound;
    private byte[] _utf8 = new byte[1024];

    public BulkStatement(SqliteConnection connection, string sql)
    {
        _database = connection.Handle!;
        Check(raw.sqlite3_prepare_v2(_database, sql, out _statement));
        _bound = new object?[raw.sqlite3_bind_parameter_count(_statement)];
        Array.Fill(_bound, s_nothing);
    }

    /// <summary>Sets parameter <paramref name="index"/>, counted from 0. What it was set to last stays: books and dates repeat from row to row.</summary>
    public BulkStatement Set(int index, string? text)
    {
        if (ReferenceEquals(text, _bound[index])) return this;
        _bound[index] = text;
        if (text is null)
        {
            Check(raw.sqlite3_bind_null(_statement, index + 1));
            return this;
        }
        if (_utf8.Length < Encoding.UTF8.GetMaxByteCount(text.Length)) _utf8 = new byte[Encoding.UTF8.GetMaxByteCount(text.Length)];
        Check(raw.sqlite3_bind_text(_statement, index + 1, _utf8.AsSpan(0, Encoding.UTF8.GetBytes(text, _utf8))));
        return this;
    }

    /// <summary>Sets parameter <paramref name="index"/>, counted from 0.</summary>
    public BulkStatement Set(int index, long value)
    {
        _bound[index] = s_nothing;
        Check(raw.sqlite3_bind_int64(_statement, index + 1, value));
        return this;
    }

    /// <summary>Runs it and returns the number of rows changed.</summary>
    public int Run()
    {
        var result = raw.sqlite3_step(_statement);
        if (result != raw.SQLITE_DONE) Check(result);
        Check(raw.sqlite3_reset(_statement));
        return raw.sqlite3_changes(_database);
    }

    public void Dispose() => _statement.Dispose();

    private void Check(int result)
    {
        if (result != raw.SQLITE_OK) SqliteException.ThrowExceptionForRC(result, _database);
    }
}
