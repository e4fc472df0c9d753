using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Storage.Sqlite;
using RiskWorker.Storage.Sqlite.Writers;

namespace RiskWorker.Storage.Feed;

/// <summary>
/// Reads a feed folder. It is checked whole first, and stored in one transaction or not at all.
/// books, factors, limits, holidays, adjustments, covariance and stress replace what is stored; instruments, observations and profit are added to it;
/// positions replace those of each date that the file holds. An optional file that is left out leaves what is stored.
/// </summary>
public static class FeedLoader
{
    /// <summary>Checks the folder and stores nothing.</summary>
    public static FeedOutcome Check(string feedFolder, IProgress<FeedProgress>? progress = null, CancellationToken cancellation = default)
    {
        using var folder = new FeedFolder(feedFolder, cancellation);
        return Checked(folder, toBeStored: false, progress, cancellation);
    }

    /// <summary>Checks the folder and stores it, unless each of its files is what was loaded last.</summary>
    /// <param name="feedFolder">The folder.</param>
    /// <param name="store">Where to.</param>
    /// <param name="now">The time that corrections are dated with.</param>
    /// <param name="progress">Told every few thousand rows.</param>
    /// <param name="cancellation">Stops it; nothing is stored then.</param>
    /// <exception cref="StoreException">The store cannot be read or written.</exception>
    public static FeedOutcome Load(string feedFolder, RiskStore store, DateTimeOffset now, IProgress<FeedProgress>? progress = null, CancellationToken cancellation = default)
    {
        ArgumentNullException.ThrowIfNull(store);
        using var folder = new FeedFolder(feedFolder, cancellation);
        if (folder.Missing.Count == 0 && IsStored(folder, store)) return new() { Faults = [], Warnings = store.FeedWarnings, Files = [], AlreadyLoaded = true };
        var outcome = Checked(folder, toBeStored: true, progress, cancellation);
        if (outcome.Faults.Count > 0) return outcome;
        try
        {
            return store.Write(connection => Stored(folder, outcome, connection, Path.GetFullPath(feedFolder), now, progress, cancellation));
        }
        catch (FeedChangedException changed)
        {
            return outcome with { Faults = [new(changed.File, 0, null, "other content than when it was checked", "a file that nobody writes to while it is read")] };
        }
    }

    private static FeedOutcome Checked(FeedFolder folder, bool toBeStored, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var files = SideBySide.Each(folder.Files, (file, serial) => Checked(file, toBeStored, serial, cancellation), progress, cancellation);
        return new()
        {
            Faults = [.. folder.Missing, .. folder.Files.SelectMany(f => f.Faults.First)],
            Warnings = [.. folder.Strays.Findings(), .. folder.Files.SelectMany(f => f.Warnings.Findings())],
            Files = files,
        };
    }

    private static FeedFileOutcome Checked(FeedFolder.OpenFile file, bool toBeStored, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var (table, stream, inspection, faults, warnings) = file;
        if (inspection.InvalidLine > 0) faults.Add(inspection.InvalidLine, null, string.Create(CultureInfo.InvariantCulture, $"byte 0x{inspection.InvalidByte:X2}"), "text in UTF-8");
        var rows = table.Check(stream, toBeStored, faults, warnings, progress, cancellation);
        return new(table.Format.File, rows, 0, 0, 0, 0, faults.Count);
    }

    private static bool IsStored(FeedFolder folder, RiskStore store)
    {
        var stored = store.Use(StoredDigests);
        return folder.Files.Count > 0 && folder.Files.All(f => stored.GetValueOrDefault(f.Table.Format.File) == f.Inspection.Sha256);
    }

    private static Dictionary<string, string> StoredDigests(SqliteConnection connection) =>
        connection.Query("SELECT file, sha256 FROM feed_file", r => (File: r.GetString(0), Sha256: r.GetString(1))).ToDictionary(f => f.File, f => f.Sha256, StringComparer.Ordinal);

    private static FeedOutcome Stored(FeedFolder folder, FeedOutcome outcome, SqliteConnection connection, string path, DateTimeOffset now, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var before = StoredDigests(connection);
        var load = Convert.ToInt64(connection.Scalar("INSERT INTO feed_load (loaded_at, folder) VALUES (?1, ?2) RETURNING id", now.UtcDateTime.ToString("O", CultureInfo.InvariantCulture), path), CultureInfo.InvariantCulture);
        var files = new List<FeedFileOutcome>();
        foreach (var (file, checkedFile) in folder.Files.Zip(outcome.Files))
        {
            var name = file.Table.Format.File;
            var counts = before.GetValueOrDefault(name) == file.Inspection.Sha256
                ? new RowCounts(0, 0, 0, checkedFile.Read)
                : file.Table.Store(file.Stream, connection, load, progress, cancellation);
            if (Utf8Inspection.Of(file.Stream, cancellation).Sha256 != file.Inspection.Sha256) throw new FeedChangedException(name);
            connection.Run("INSERT INTO feed_file (file, sha256, load) VALUES (?1, ?2, ?3) ON CONFLICT DO UPDATE SET sha256 = ?2, load = ?3", name, file.Inspection.Sha256, load);
            files.Add(checkedFile with { Added = counts.Added, Changed = counts.Changed, Removed = counts.Removed, Unchanged = counts.Unchanged });
        }
        connection.Run("DELETE FROM feed_warning");
        foreach (var warning in outcome.Warnings) connection.Run("INSERT INTO feed_warning (code, subject, message) VALUES (?1, ?2, ?3)", warning.Code, warning.Subject, warning.Message);
        return outcome with { Files = files };
    }
}
