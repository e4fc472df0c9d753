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

    public FileFormat Format => format;

    /// <summary>Reads the whole file, writes down what is wrong with it, and stores nothing.</summary>
    /// <returns>Rows read.</returns>
    public abstract long Check(Stream file, FaultLog faults, WarningLog warnings, IProgress<FeedProgress>? progress, CancellationToken cancellation);

    /// <summary>Reads the checked file again, into the store.</summary>
    public abstract RowCounts Store(Stream file, SqliteConnection connection, long load, IProgress<FeedProgress>? progress, CancellationToken cancellation);

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
    public override long Check(Stream file, FaultLog faults, WarningLog warnings, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        using var cells = new CellReader(file, Format, faults);
        if (!cells.ReadHeader()) return 0;
        foreach (var column in cells.UnknownColumns) warnings.Add(FeedWarningCodes.UnknownColumn, column);
        var rows = parser(warnings);
        while (cells.Next())
        {
            if (rows.TryParse(cells, out var row)) onChecked?.Invoke(row);
            Report(cells.Rows, false, progress, cancellation);
        }
        if (Format.Required && cells.Rows == 0 && faults.Count == 0) faults.Add(0, null, "no row below the header", "at least one row");
        return cells.Rows;
    }

    public override RowCounts Store(Stream file, SqliteConnection connection, long load, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var faults = new FaultLog(Format.File);
        using var cells = new CellReader(file, Format, faults);
        using var stored = writer(connection, load);
        var rows = parser(new(Format.File));
        if (!cells.ReadHeader()) throw new FeedChangedException(Format.File);
        while (cells.Next())
        {
            if (!rows.TryParse(cells, out var row)) throw new FeedChangedException(Format.File);
            stored.Write(row);
            Report(cells.Rows, true, progress, cancellation);
        }
        return faults.Count == 0 ? stored.Finish() : throw new FeedChangedException(Format.File);
    }
}

/// <summary>A file is no longer what it was when it was checked.</summary>
internal sealed class FeedChangedException(string file) : Exception($"The file {file} changed while it was read.")
{
    public string File => file;
}
