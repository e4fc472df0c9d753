using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The largest sensitivities of a book, one row a factor, and how many more there are.</summary>
internal static class SensitivityTables
{
    private const int Most = 12;

    /// <summary>Deltas, with their gammas where any is not zero.</summary>
    public static Table Deltas(IReadOnlyList<Sensitivity> found, MoneyScale scale)
    {
        IReadOnlyList<Column> gamma = found.Any(one => one.Gamma is not (null or 0)) ? [new("Gamma", 1, Alignment.Right, scale.Unit)] : [];
        return Of(
            found, [new("Factor", 2), new("Class", 1.1), new("Delta", 1, Alignment.Right, scale.Unit), .. gamma],
            one => [one.Factor, Word(one.Class), scale.Text(one.Value), .. gamma.Select(_ => (Cell)scale.Text(one.Gamma))]);
    }

    public static Table Vegas(IReadOnlyList<Sensitivity> found, MoneyScale scale) =>
        Of(found, [new("Volatility", 2), new("Vega", 1, Alignment.Right, scale.Unit)], one => [one.Factor, scale.Text(one.Value)]);

    private static Table Of(IReadOnlyList<Sensitivity> found, IReadOnlyList<Column> columns, Func<Sensitivity, IReadOnlyList<Cell>> cells)
    {
        var rows = found.OrderByDescending(one => Math.Abs(one.Value)).ThenBy(one => one.Factor, StringComparer.Ordinal).Take(Most).Select(one => new Row(cells(one))).ToList();
        if (found.Count > rows.Count)
            rows.Add(new Row([$"{Phrases.Plural(found.Count - rows.Count, "smaller one")}", .. Enumerable.Repeat<Cell>("", columns.Count - 1)], Emphasis.Muted));
        return new Table(columns, [new RowGroup(rows)], "");
    }

    private static string Word(FactorClass kind) => kind switch
    {
        FactorClass.Fx => "exchange rate",
        FactorClass.Vol => "volatility",
        _ => kind.ToString().ToLowerInvariant(),
    };
}
