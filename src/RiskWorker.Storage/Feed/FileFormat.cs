namespace RiskWorker.Storage.Feed;

/// <summary>A column of a feed file. A required one must be in the header; that its cells are filled is the row parser's rule.</summary>
internal readonly record struct FeedColumn(string Name, bool Required)
{
    public static FeedColumn Must(string name) => new(name, true);

    public static FeedColumn May(string name) => new(name, false);
}

/// <summary>Name and columns of a feed file.</summary>
/// <param name="File">Name of the file.</param>
/// <param name="Required">Whether a folder without it, or with no row in it, is refused.</param>
/// <param name="Columns">Its columns; row parsers refer to them by their place here, whatever their place in the file.</param>
internal sealed record FileFormat(string File, bool Required, IReadOnlyList<FeedColumn> Columns);
