using System.Globalization;
using Microsoft.Data.Sqlite;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A prepared statement whose parameters are <c>?1</c>, <c>?2</c>, …</summary>
internal sealed class Statement : IDisposable
{
    private readonly SqliteCommand _command;

    public Statement(SqliteConnection connection, string sql, int parameters = 0)
    {
        _command = connection.CreateCommand();
        _command.CommandText = sql;
        for (var i = 1; i <= parameters; i++) _command.Parameters.Add(new SqliteParameter("?" + i.ToString(CultureInfo.InvariantCulture), DBNull.Value));
    }

    /// <summary>Sets parameter <paramref name="index"/>, counted from 0.</summary>
    public Statement Set(int index, object? value)
    {
        _command.Parameters[index].Value = value ?? DBNull.Value;
        return this;
    }

    /// <summary>Runs it and returns the number of rows changed.</summary>
    public int Run() => _command.ExecuteNonQuery();

    /// <summary>The first value of the first row, or null.</summary>
    public object? Scalar() => _command.ExecuteScalar() is { } value and not DBNull ? value : null;

    /// <summary>The rows, each read by <paramref name="read"/>.</summary>
    public IEnumerable<T> Rows<T>(Func<SqliteDataReader, T> read)
    {
        using var rows = _command.ExecuteReader();
        while (rows.Read()) yield return read(rows);
    }

    public void Dispose() => _command.Dispose();
}

/// <summary>Short forms for statements that are run once, and for columns that may be null.</summary>
internal static class SqliteReading
{
    public static int Run(this SqliteConnection connection, string sql, params object?[] values)
    {
        using var statement = Bound(connection, sql, values);
        return statement.Run();
    }

    public static object? Scalar(this SqliteConnection connection, string sql, params object?[] values)
    {
        using var statement = Bound(connection, sql, values);
        return statement.Scalar();
    }

    public static List<T> Query<T>(this SqliteConnection connection, string sql, Func<SqliteDataReader, T> read, params object?[] values)
    {
        using var statement = Bound(connection, sql, values);
        return [.. statement.Rows(read)];
    }

    public static string? Text(this SqliteDataReader row, int column) => row.IsDBNull(column) ? null : row.GetString(column);

    public static double? Number(this SqliteDataReader row, int column) =>
        row.IsDBNull(column) ? null : double.Parse(row.GetString(column), NumberStyles.Float, CultureInfo.InvariantCulture);

    private static Statement Bound(SqliteConnection connection, string sql, object?[] values)
    {
        var statement = new Statement(connection, sql, values.Length);
        for (var i = 0; i < values.Length; i++) statement.Set(i, values[i]);
        return statement;
    }
}
