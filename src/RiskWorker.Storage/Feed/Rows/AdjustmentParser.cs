namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>adjustments.csv</c>: factor, date, ratio, reason.</summary>
internal sealed class AdjustmentParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("adjustments.csv", false,
        [FeedColumn.Must("factor"), FeedColumn.Must("date"), FeedColumn.Must("ratio"), FeedColumn.May("reason")]);

    private readonly FirstLines<(string, DateOnly)> _keys = new();

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var (factor, date) = (cells.Name(0), cells.Date(1));
        row = [factor, Iso.Of(date), cells.Number(2, "a number above 0", ratio => ratio > 0).Text, cells.OptionalText(3)];
        if (cells.RowIsSound) _keys.Claim((factor, date), cells, 0, "each factor and date");
        return cells.RowIsSound;
    }
}
