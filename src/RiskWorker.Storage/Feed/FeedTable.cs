using Microsoft.Data.Sqlite;
using RiskWorker.Storage.Sqlite.Writers;

namespace RiskWorker.Storage.Feed;

/// <summary>How far reading a feed is.</summary>
/// <param name="File">The file being read.</param>
/// <param name="Storing">False while it is checked, true while it is stored.</param>
/// <param name="Rows">Rows of it read so far.</param>
public readonly record struct FeedProgress(string File, bool Storing, long Rows);

/// <summary>One file of a feed folder, its row type hidden. An instance serves one load.</summary>
internal abstract class FeedTable(FileFormat format)
{
    private const int Step = 8192;

    // Some five times as much in memory; a longer file is read a second time instead.
    private const long LongestKept = 64 << 20;

    public FileFormat Format => format;

    /// <summary>Reads the whole file, writes down what is wrong with it, and stores nothing.</summary>
    /// <param name="file">The file.</param>
    /// <param name="toBeStored">Whether <see cref="Store"/> follows if nothing is wrong; the rows of a file that is not too long are kept for it.</param>
    /// <param name="faults">Takes what is wrong.</param>
    /// <param name="warnings">Takes what is odd.</param>
    /// <param name="progress">Told every few thousand rows.</param>
    /// <param name="cancellation">Stops it.</param>
    /// <returns>Rows read.</returns>
    public abstract long Check(Stream file, bool toBeStored, FaultLog faults, WarningLog warnings, IProgress<FeedProgress>? progress, CancellationToken cancellation);

    /// <summary>Brings the rows of the checked file into the store, those that were kept or else the file's, read again.</summary>
    public abstract RowCounts Store(Stream file, SqliteConnection connection, long load, IProgress<FeedProgress>? progress, CancellationToken cancellation);

    protected static bool CanBeKept(Stream file) => file.Length <= LongestKept;

    protected void Report(long rows, bool storing, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        if (rows % Step != 0) return;
        cancellation.ThrowIfCancellationRequested();
        progress?.Report(new(format.File, storing, rows));
    }
}

/// <inheritdoc/>
/// <param name="format">Name and columns.</param>
/// <param name="parser">Makes a parser for one reading of the file.</param>
/// <param name="writer">Makes the writer for a load of the given number.</param>
/// <param name="onChecked">Sees each sound row while the file is checked, or null.</param>
internal sealed class FeedTable<TRow>(
    FileFormat format,
    Func<WarningLog, IRowParser<TRow>> parser,
    Func<SqliteConnection, long, IRowWriter<TRow>> writer,
    Action<TRow>? onChecked = null) : FeedTable(format)
{
    private List<TRow>? _kept;

    public override long Check(Stream file, bool toBeStored, FaultLog faults, WarningLog warnings, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var kept = toBeStored && CanBeKept(file) ? new List<TRow>() : null;
        using var cells = new CellReader(file, Format, faults);
        if (!cells.ReadHeader()) return 0;
        foreach (var column in cells.UnknownColumns) warnings.Add(FeedWarningCodes.UnknownColumn, column);
        var rows = parser(warnings);
        while (cells.Next())
        {
            if (rows.TryParse(cells, out var row))
            {
                onChecked?.Invoke(row);
                kept?.Add(row);
            }
            Report(cells.Rows, false, progress, cancellation);
        }
        if (Format.Required && cells.Rows == 0 && faults.Count == 0) faults.Add(0, null, "no row below the header", "at least one row");
        if (faults.Count == 0) _kept = kept;
        return cells.Rows;
    }

    public override RowCounts Store(Stream file, SqliteConnection connection, long load, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        using var stored = writer(connection, load);
        if (_kept is null) Reread(file, stored, progress, cancellation);
        else StoreKept(_kept, stored, progress, cancellation);
        _kept = null;
        return stored.Finish();
    }

    private void StoreKept(List<TRow> kept, IRowWriter<TRow> stored, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        for (var i = 0; i < kept.Count; i++)
        {
            stored.Write(kept[i]);
            Report(i + 1, true, progress, cancellation);
        }
    }

    private void Reread(Stream file, IRowWriter<TRow> stored, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var faults = new FaultLog(Format.File);
        using var cells = new CellReader(file, Format, faults);
        var rows = parser(new(Format.File));
        if (!cells.ReadHeader()) throw new FeedChangedException(Format.File);
        while (cells.Next())
        {
            if (!rows.TryParse(cells, out var row)) throw new FeedChangedException(Format.File);
            stored.Write(row);
            Report(cells.Rows, true, progress, cancellation);
        }
        if (faults.Count > 0) throw new FeedChangedException(Format.File);
    }
}

/// <summary>A file is no longer what it was when it was checked.</summary>
internal sealed class FeedChangedException(string file) : Exception($"The file {file} changed while it was read.")
{
    public string File => file;
}
