namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>books.csv</c>: book, parent, name, currency. A book that names no currency has its parent's.</summary>
internal sealed class BookParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("books.csv", true,
        [FeedColumn.Must("book"), FeedColumn.May("parent"), FeedColumn.May("name"), FeedColumn.May("currency")]);

    private readonly FirstLines<string> _names = new(StringComparer.Ordinal);

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var book = cells.Name(0);
        row = [book, cells.OptionalName(1), cells.OptionalText(2), cells.OptionalName(3)];
        if (cells.RowIsSound) _names.Claim(book, cells, 0, "each book");
        if (row[1] is null && row[3] is null && cells.RowIsSound) cells.Fault(3, "a currency, since the root's is the reporting currency");
        return cells.RowIsSound;
    }
}
