using System.Globalization;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>covariance.csv</c>: factor, other, value. An entry stands for both orders of its pair; given twice, it must say the same.</summary>
internal sealed class CovarianceParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("covariance.csv", false, [FeedColumn.Must("factor"), FeedColumn.Must("other"), FeedColumn.Must("value")]);

    private const int Value = 2;

    private readonly Dictionary<(string, string), (double Value, long Line)> _pairs = [];

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var (factor, other, value) = (cells.Name(0), cells.Name(1), cells.Number(Value));
        var pair = string.CompareOrdinal(factor, other) <= 0 ? (factor, other) : (other, factor);
        row = [pair.Item1, pair.Item2, value.Text];
        if (!cells.RowIsSound) return false;
        if (factor == other && value.Value < 0) cells.Fault(Value, "a variance from 0 on");
        if (!_pairs.TryAdd(pair, (value.Value, cells.Line)) && _pairs[pair] is var first && first.Value != value.Value)
            cells.Fault(Value, string.Create(CultureInfo.InvariantCulture, $"{first.Value:R} as on line {first.Line}, which gives the same pair"));
        return cells.RowIsSound;
    }
}
