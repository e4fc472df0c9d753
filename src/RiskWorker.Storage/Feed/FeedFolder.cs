namespace RiskWorker.Storage.Feed;

/// <summary>The open files of a feed folder: what is checked and what is stored are the same files, even where somebody renames new ones into place.</summary>
internal sealed class FeedFolder : IDisposable
{
    private readonly List<OpenFile> _files = [];

    /// <summary>A table with its open file.</summary>
    public sealed record OpenFile(FeedTable Table, FileStream Stream, Utf8Inspection Inspection, FaultLog Faults, WarningLog Warnings);

    /// <summary>Opens what is there; what is missing or cannot be read becomes a fault.</summary>
    public FeedFolder(string path, CancellationToken cancellation)
    {
        var tables = FeedTables.ForOneLoad();
        if (!Directory.Exists(path))
        {
            Missing.Add(new(path, 0, null, "no such folder", "a folder with " + string.Join(", ", tables.Where(t => t.Format.Required).Select(t => t.Format.File))));
            return;
        }
        foreach (var table in tables) Open(Path.Combine(path, table.Format.File), table, cancellation);
        foreach (var other in Directory.EnumerateFiles(path, "*.csv").Select(f => Path.GetFileName(f)!).Where(f => tables.All(t => t.Format.File != f)))
            Strays.Add(FeedWarningCodes.UnknownFile, other);
    }

    /// <summary>The files that are there, in the order of the formats.</summary>
    public IReadOnlyList<OpenFile> Files => _files;

    /// <summary>Required files that are missing, and files that cannot be read.</summary>
    public List<FeedFault> Missing { get; } = [];

    /// <summary>CSV files that no format has.</summary>
    public WarningLog Strays { get; } = new("feed");

    public void Dispose()
    {
        foreach (var file in _files) file.Stream.Dispose();
    }

    private void Open(string path, FeedTable table, CancellationToken cancellation)
    {
        var name = table.Format.File;
        if (!File.Exists(path))
        {
            if (table.Format.Required) Missing.Add(new(name, 0, null, "no such file", "this file in the folder"));
            return;
        }
        FileStream? stream = null;
        try
        {
            stream = new(path, FileMode.Open, FileAccess.Read, FileShare.Read | FileShare.Delete, bufferSize: 1 << 16, FileOptions.SequentialScan);
            _files.Add(new(table, stream, Utf8Inspection.Of(stream, cancellation), new(name), new(name)));
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            stream?.Dispose();
            Missing.Add(new(name, 0, null, error.Message, "a file that can be read"));
        }
    }
}
