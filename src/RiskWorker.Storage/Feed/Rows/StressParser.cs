namespace RiskWorker.Storage.Feed.Rows;

/// <summary>How a stress moves its target.</summary>
internal enum StressMode
{
    /// <summary>A share of the value.</summary>
    Relative,

    /// <summary>An amount added to the value.</summary>
    Absolute,
}

/// <summary><c>stress.csv</c>: scenario, target, shock, mode.</summary>
internal sealed class StressParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("stress.csv", false,
        [FeedColumn.Must("scenario"), FeedColumn.Must("target"), FeedColumn.Must("shock"), FeedColumn.May("mode")]);

    private readonly FirstLines<(string, string)> _keys = new();

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var (scenario, target, shock) = (cells.Name(0), cells.Name(1), cells.Number(2));
        var mode = cells.IsEmpty(3) ? null : Spelling.Of(cells.Choice(3, Spelling.Of<StressMode>()));
        row = [scenario, target, shock.Text, mode];
        if (cells.RowIsSound) _keys.Claim((scenario, target), cells, 1, "each scenario and target");
        return cells.RowIsSound;
    }
}
