namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>holidays.csv</c>: calendar, date. A row that stands twice is harmless.</summary>
internal sealed class HolidayParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("holidays.csv", false, [FeedColumn.Must("calendar"), FeedColumn.Must("date")]);

    public bool TryParse(CellReader cells, out string?[] row)
    {
        row = [cells.Name(0), Iso.Of(cells.Date(1))];
        return cells.RowIsSound;
    }
}
