using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// The store: one SQLite file that holds the newest feed, its corrections, and every run for good.
/// It may be used from several threads, and by several processes at once; writers wait for each other.
/// </summary>
public sealed class RiskStore : IDisposable
{
    private readonly string _connection;
    private readonly string _patience;

    private RiskStore(string path, TimeSpan patience)
    {
        Path = path;
        _connection = new SqliteConnectionStringBuilder
        {
            DataSource = path,
            ForeignKeys = true,
            DefaultTimeout = Math.Max(1, (int)Math.Ceiling(patience.TotalSeconds)),
            Pooling = true,
        }.ToString();
        _patience = string.Create(CultureInfo.InvariantCulture, $"PRAGMA busy_timeout = {(long)patience.TotalMilliseconds}");
        Snapshots = new(this);
        Runs = new(this);
        Interruptions = new(this);
        WalkForward = new(this);
        Explanations = new(this);
    }

    /// <summary>The file.</summary>
    public string Path { get; }

    /// <summary>The runs that it keeps.</summary>
    public RunJournal Runs { get; }

    /// <summary>What the runs read.</summary>
    public SnapshotArchive Snapshots { get; }

    /// <summary>Days of walk-forwards.</summary>
    public WalkForwardDays WalkForward { get; }

    /// <summary>What was written to explain exceptions.</summary>
    public ExplanationLog Explanations { get; }

    /// <summary>Scheduled runs that were stopped before their end.</summary>
    public InterruptionLog Interruptions { get; }

    /// <summary>
    /// Opens the store at <paramref name="path"/>; creates file and folder where they are missing and applies the migrations that it lacks.
    /// A call waits for other processes up to <paramref name="patience"/> (30 seconds when left out).
    /// </summary>
    /// <exception cref="StoreException">It is locked, damaged, of a newer schema, another program's, or cannot be written to.</exception>
    public static RiskStore Open(string path, TimeSpan? patience = null)
    {
        ArgumentException.ThrowIfNullOrEmpty(path);
        var full = System.IO.Path.GetFullPath(path);
        try
        {
            Directory.CreateDirectory(System.IO.Path.GetDirectoryName(full)!);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            throw new StoreException(StoreFault.Unreachable, $"The folder of the store '{full}' cannot be created: {error.Message}", error);
        }
        var store = new RiskStore(full, patience ?? TimeSpan.FromSeconds(30));
        try
        {
            store.Use(connection =>
            {
                Schema.Migrate(connection, full);
                return 0;
            });
            return store;
        }
        catch
        {
            store.Dispose();
            throw;
        }
    }

    /// <summary>Warnings of the newest load, by file and code.</summary>
    public IReadOnlyList<Finding> FeedWarnings => Use(ReferenceData.Warnings);

    /// <summary>Every value that a later feed replaced, oldest correction first.</summary>
    public IReadOnlyList<Correction> Corrections => Use(connection => connection.Query(
        """
        SELECT 'observations.csv', date, factor, 'value', old_value, new_value, loaded_at, folder, load, c.id FROM observation_correction c JOIN feed_load l ON l.id = c.load
        UNION ALL
        SELECT 'pnl.csv', date, book, 'actual', old_actual, new_actual, loaded_at, folder, load, c.id FROM pnl_correction c JOIN feed_load l ON l.id = c.load WHERE old_actual IS NOT new_actual
        UNION ALL
        SELECT 'pnl.csv', date, book, 'hypothetical', old_hypothetical, new_hypothetical, loaded_at, folder, load, c.id FROM pnl_correction c JOIN feed_load l ON l.id = c.load WHERE old_hypothetical IS NOT new_hypothetical
        ORDER BY 9, 1, 10, 4
        """,
        row => new Correction(row.GetString(0), Feed.Rows.Iso.Date(row.GetString(1)), row.GetString(2), row.GetString(3), row.Text(4), row.Text(5),
            DateTimeOffset.Parse(row.GetString(6), CultureInfo.InvariantCulture), row.GetString(7))));

    /// <summary>Releases the file.</summary>
    public void Dispose()
    {
        using var connection = new SqliteConnection(_connection);
        SqliteConnection.ClearPool(connection);
    }

    /// <summary>Lends an open connection to <paramref name="work"/> and turns what SQLite reports into a <see cref="StoreException"/>.</summary>
    internal T Use<T>(Func<SqliteConnection, T> work)
    {
        try
        {
            using var connection = Connect();
            return work(connection);
        }
        catch (SqliteException error)
        {
            throw StoreException.From(error, Path);
        }
    }

    /// <summary>Does <paramref name="work"/> in one transaction that no other writer shares; commits when it returns.</summary>
    internal T Write<T>(Func<SqliteConnection, T> work) => Use(connection =>
    {
        using var transaction = connection.BeginTransaction(deferred: false);
        var result = work(connection);
        transaction.Commit();
        return result;
    });

    /// <summary>Does <paramref name="work"/> in one transaction that sees one state of the store throughout.</summary>
    internal T Read<T>(Func<SqliteConnection, T> work) => Use(connection =>
    {
        using var transaction = connection.BeginTransaction(deferred: true);
        return work(connection);
    });

    private SqliteConnection Connect()
    {
        var connection = new SqliteConnection(_connection);
        connection.Open();
        connection.Run(_patience);
        return connection;
    }
}

/// <summary>A stored value that a later feed replaced.</summary>
/// <param name="File">The feed file.</param>
/// <param name="Date">The row's date.</param>
/// <param name="Subject">The factor or book.</param>
/// <param name="Column">The column.</param>
/// <param name="Old">What stood there, as typed; null for nothing.</param>
/// <param name="New">What replaced it, as typed; null for nothing.</param>
/// <param name="At">When, UTC.</param>
/// <param name="LoadedFrom">The folder that the new value came from.</param>
public sealed record Correction(string File, DateOnly Date, string Subject, string Column, string? Old, string? New, DateTimeOffset At, string LoadedFrom);
