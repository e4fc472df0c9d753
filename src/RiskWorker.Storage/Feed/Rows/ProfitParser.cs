namespace RiskWorker.Storage.Feed.Rows;

/// <summary>One row of <c>pnl.csv</c>.</summary>
internal readonly record struct ProfitRow(DateOnly Date, string Book, TypedNumber? Actual, TypedNumber? Hypothetical);

/// <summary><c>pnl.csv</c>: date, book, actual, hypothetical.</summary>
internal sealed class ProfitParser : IRowParser<ProfitRow>
{
    public static FileFormat Format { get; } = new("pnl.csv", false,
        [FeedColumn.Must("date"), FeedColumn.Must("book"), FeedColumn.May("actual"), FeedColumn.May("hypothetical")]);

    private readonly FirstLines<(DateOnly, string)> _keys = new();

    public bool TryParse(CellReader cells, out ProfitRow row)
    {
        row = new(cells.Date(0), cells.Name(1), cells.OptionalNumber(2), cells.OptionalNumber(3));
        if (cells.RowIsSound) _keys.Claim((row.Date, row.Book), cells, 1, "each book and date");
        return cells.RowIsSound;
    }
}
