using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Sensitivities to the points of curves: a row a curve, a column a tenor, and what all points of a curve together make.</summary>
internal static class TenorTables
{
    private const int MostCurves = 12;
    private const int TenorsPerTable = 8;

    /// <summary>One table or, for many tenors, several below each other, of which the last holds the sums.</summary>
    public static IEnumerable<Table> Of(string name, IReadOnlyList<Sensitivity> found, MoneyScale scale)
    {
        // A factor of no curve is its own row; without a tenor it stands in the sum alone.
        var curves = found.GroupBy(one => one.Curve ?? one.Factor, StringComparer.Ordinal)
            .OrderByDescending(curve => curve.Max(one => Math.Abs(one.Value))).ThenBy(curve => curve.Key, StringComparer.Ordinal).ToList();
        var shown = curves.Take(MostCurves).ToList();
        double[] tenors = [.. shown.SelectMany(curve => curve).Select(one => one.TenorYears).OfType<double>().Distinct().Order()];
        IReadOnlyList<double[]> parts = tenors.Length == 0 ? [[]] : [.. tenors.Chunk(TenorsPerTable)];
        for (var part = 0; part < parts.Count; part++)
            yield return Part($"{name}, {scale.Unit}", shown, curves.Count - shown.Count, parts[part], part == parts.Count - 1, scale);
    }

    private static Table Part(string head, List<IGrouping<string, Sensitivity>> curves, int further, double[] tenors, bool isLast, MoneyScale scale)
    {
        var rows = curves.Select(curve => new Row(
        [
            curve.Key,
            .. tenors.Select(tenor => (Cell)(curve.Any(one => one.TenorYears == tenor) ? scale.Text(curve.Where(one => one.TenorYears == tenor).Sum(one => one.Value)) : "")),
            .. isLast ? [scale.Text(curve.Sum(one => one.Value))] : (Cell[])[],
        ])).ToList();
        IReadOnlyList<Column> columns =
        [
            new(head, 1.8), .. tenors.Select(tenor => new Column(Tenor(tenor), 1, Alignment.Right)), .. isLast ? [new("All tenors", 1.1, Alignment.Right)] : (Column[])[],
        ];
        if (further > 0 && isLast)
            rows.Add(new Row([Phrases.Plural(further, "smaller curve"), .. Enumerable.Repeat<Cell>("", columns.Count - 1)], Emphasis.Muted));
        return new Table(columns, [new RowGroup(rows)], "");
    }

    // Whole months below two years, as they are spoken of; other tenors in years.
    private static string Tenor(double years)
    {
        var months = Math.Round(years * 12);
        return years < 2 && months is > 0 and not 12 && Math.Abs((years * 12) - months) < 0.05
            ? $"{Numerals.Fixed(months)}\u00A0m"
            : $"{Numerals.Fixed(years, years == Math.Floor(years) ? 0 : 2)}\u00A0y";
    }
}
