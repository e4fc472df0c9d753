namespace RiskWorker.Storage.Feed.Rows;

/// <summary>One holding of <c>positions.csv</c>.</summary>
internal readonly record struct PositionRow(DateOnly AsOf, string Book, string Instrument, TypedNumber Quantity, string? Trade, TypedNumber? MarketValue);

/// <summary><c>positions.csv</c>: as_of, book, instrument, quantity, trade, market_value. Rows of one book and instrument add up, so none is a duplicate.</summary>
internal sealed class PositionParser : IRowParser<PositionRow>
{
    public static FileFormat Format { get; } = new("positions.csv", true,
    [
        FeedColumn.Must("as_of"), FeedColumn.Must("book"), FeedColumn.Must("instrument"), FeedColumn.Must("quantity"), FeedColumn.May("trade"), FeedColumn.May("market_value"),
    ]);

    // Beyond this sums of prices lose their cents, and squares of losses their range.
    private const double MostUnits = 1e15;

    public bool TryParse(CellReader cells, out PositionRow row)
    {
        row = new(cells.Date(0), cells.Name(1), cells.Name(2), cells.Number(3, "a number between -1e15 and 1e15", q => Math.Abs(q) <= MostUnits), cells.OptionalReference(4), cells.OptionalNumber(5));
        return cells.RowIsSound;
    }
}
