namespace RiskWorker.Storage.Feed.Rows;

/// <summary>One value of <c>observations.csv</c>.</summary>
internal readonly record struct ObservationRow(DateOnly Date, string Factor, TypedNumber Value);

/// <summary><c>observations.csv</c>: date, factor, value.</summary>
internal sealed class ObservationParser : IRowParser<ObservationRow>
{
    public static FileFormat Format { get; } = new("observations.csv", true, [FeedColumn.Must("date"), FeedColumn.Must("factor"), FeedColumn.Must("value")]);

    private readonly FirstLines<(DateOnly, string)> _keys = new();

    public bool TryParse(CellReader cells, out ObservationRow row)
    {
        row = new(cells.Date(0), cells.Name(1), cells.Number(2));
        if (cells.RowIsSound) _keys.Claim((row.Date, row.Factor), cells, 1, "each factor and date");
        return cells.RowIsSound;
    }
}
