using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What moves the root and the books directly below it: the largest deltas and vegas, DV01 and CS01 by curve and tenor; left out where a record holds none.</summary>
internal static class SensitivitiesSection
{
    private const int MostChildren = 8;
    private const double DeltaShare = 0.58;

    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        var byBook = run.Results.Sensitivities.ToLookup(found => found.Book, StringComparer.Ordinal);
        if (byBook.Count == 0 || run.Root is not { } root)
            return [];

        var below = run.ChildrenOf(root).Where(child => byBook.Contains(child.Book)).ToList();
        IReadOnlyList<NodeResult> shown = [root, .. Largest(below)];
        var scales = Scales(shown, byBook);
        return
        [
            new Heading("Sensitivities"),
            new Paragraph(
                "Each book with all below it, in its own currency, by full revaluation at moved prices, one factor at a time and all others held. Delta: profit for +1% of the level, half of the profit at +1% less that at "
                + $"{Numerals.Minus}1%; an exchange rate's holds the translation of values in its currency. Gamma: how much that delta grows with another +1%, no column where all are zero. Vega: profit for +0.01 of volatility. DV01 and CS01: profit for a fall "
                + "of a rate or a credit spread by one basis point. Each is a central difference; a factor that moves nothing is left out. Every book and factor stands in sensitivities.csv.", Voice.Note),
            .. shown.SelectMany(node => Of(node, [.. byBook[node.Book]], measure => scales[(node.Currency, measure)])),
            .. shown.Count <= below.Count ? [new Paragraph($"Shown are the {Phrases.Number(MostChildren)} of {Phrases.Number(below.Count)} books below the root with the largest values at risk.", Voice.Note)] : (Block[])[],
        ];
    }

    // In the order of the tree.
    private static IEnumerable<NodeResult> Largest(List<NodeResult> children)
    {
        var largest = children.OrderByDescending(child => child.InReportingCurrency is [var first, ..] ? first.Value : 0).Take(MostChildren).ToHashSet();
        return children.Where(largest.Contains);
    }

    // What is compared down the page has one unit: a measure in a currency.
    private static Dictionary<(string Currency, SensitivityMeasure Measure), MoneyScale> Scales(IReadOnlyList<NodeResult> shown, ILookup<string, Sensitivity> byBook) => shown
        .SelectMany(node => byBook[node.Book].Select(found => (node.Currency, found.Measure, Size: Math.Abs(found.Value))))
        .GroupBy(found => (found.Currency, found.Measure))
        .ToDictionary(group => group.Key, group => MoneyScale.For(group.Max(found => found.Size), group.Key.Currency));

    private static IEnumerable<Block> Of(NodeResult node, IReadOnlyList<Sensitivity> found, Func<SensitivityMeasure, MoneyScale> scale)
    {
        if (found.Count == 0)
            yield break;

        var by = found.ToLookup(one => one.Measure);
        yield return new Heading(node.Name, 3);
        IReadOnlyList<Table> largest =
        [
            .. Where(SensitivityMeasure.Delta, SensitivityTables.Deltas),
            .. Where(SensitivityMeasure.Vega, SensitivityTables.Vegas),
        ];
        if (largest.Count > 0)
            yield return new Columns([largest[0]], [.. largest.Skip(1)], DeltaShare);
        foreach (var table in Tenors(SensitivityMeasure.Dv01, "DV01").Concat(Tenors(SensitivityMeasure.Cs01, "CS01")))
            yield return table;

        IEnumerable<Table> Where(SensitivityMeasure measure, Func<IReadOnlyList<Sensitivity>, MoneyScale, Table> table) => by.Contains(measure) ? [table([.. by[measure]], scale(measure))] : [];
        IEnumerable<Table> Tenors(SensitivityMeasure measure, string name) => by.Contains(measure) ? TenorTables.Of(name, [.. by[measure]], scale(measure)) : [];
    }
}
