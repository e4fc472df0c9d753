using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>The tree of books with its measures in the reporting currency, what the parts add up to, and what diversification takes off.</summary>
internal static class BooksSection
{
    private const int Charted = 12;
    private const int MeasuresInTree = 3;
    private const int MeasuresPerTable = 4;

    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        if (run.HeadlineSpecs.Count == 0)
            return [];

        IReadOnlyList<MeasureSpec> first = [.. run.HeadlineSpecs.Concat(run.Specs.Except(run.HeadlineSpecs)).Take(MeasuresInTree)];
        var others = run.Specs.Except(first).Chunk(MeasuresPerTable);
        return
        [
            new Heading("Books"),
            Tree(run, first, first[0]),
            new Paragraph(
                $"Figures in {run.Scale().Unit}, whatever the currency of the book; {Below(run)}. Stand-alone: the sum of {Phrases.Short(first[0])} over the books directly below; "
                + "it is left out where a book also holds positions of its own. Diversification: the part of that sum by which the whole is smaller.", Voice.Note),
            .. others.SelectMany(specs => (Block[])[new Heading("Other measures", 3), Tree(run, specs, null)]),
            .. run.Results.Nodes.Count > 1 ? [Chart(run, first[0])] : (Block[])[],
        ];
    }

    private static string Below(RunReading run) => run.IsWeighted ? "days of different weight claim no interval"
        : run.IsHistory ? "intervals of the days as a sample stand below"
        : "intervals stand below";

    private static Table Tree(RunReading run, IReadOnlyList<MeasureSpec> specs, MeasureSpec? sumOf)
    {
        var unit = run.Scale().Unit;
        var columns = specs.Select(spec => new Column(Phrases.Head(spec), 1.25, Alignment.Right, Phrases.Head(run, unit)));
        if (sumOf is not null)
            columns = [new("Value", 1.1, Alignment.Right, unit), .. columns, new("Stand-alone", 1.1, Alignment.Right, unit), new("Diversification", 1, Alignment.Right, "%")];

        return new Table([new("Book", 2.6), .. columns], [.. Branches(run).Select(branch => new RowGroup([.. branch.Select(node => Row(run, node, specs, sumOf))]))], "");
    }

    // Each branch below the root, the root with the first: branches stay together on a page where they fit.
    private static IEnumerable<IReadOnlyList<NodeResult>> Branches(RunReading run)
    {
        var branch = new List<NodeResult>();
        foreach (var node in run.Results.Nodes)
        {
            if (node.Depth <= 1 && branch.Count > 0 && branch[^1].Depth > 0)
            {
                yield return branch;
                branch = [];
            }

            branch.Add(node);
        }

        yield return branch;
    }

    private static Row Row(RunReading run, NodeResult node, IReadOnlyList<MeasureSpec> specs, MeasureSpec? sumOf)
    {
        var scale = run.Scale();
        var cells = new List<Cell> { new TextCell(node.Name, Level: node.Depth) };
        if (sumOf is not null)
            cells.Add(Numerals.Fixed(node.ValueRoot / scale.Divisor, scale.Decimals));
        foreach (var spec in specs)
        {
            var measure = RunReading.Find(node.InReportingCurrency, spec);
            cells.Add(new TextCell(scale.Text(measure?.Value), measure is null ? "" : Phrases.Interval(run, scale, measure)));
        }

        if (sumOf is { } summed)
            cells.AddRange(Diversification(run, node, summed));
        return new Row(cells, node.Parent is null ? Emphasis.Strong : Emphasis.None);
    }

    private static Cell[] Diversification(RunReading run, NodeResult node, MeasureSpec spec)
    {
        var parts = run.ChildrenOf(node).Select(child => RunReading.Find(child.InReportingCurrency, spec)?.Value).ToList();
        if (parts.Count == 0)
            return ["", ""];

        var sum = node.Positions > 0 || parts.Contains(null) ? null : parts.Sum();
        var taken = sum > 0 ? 1 - (RunReading.Find(node.InReportingCurrency, spec)?.Value / sum) : null;
        return [run.Scale().Text(sum), Numerals.Fixed(taken * 100, 1)];
    }

    private static Figure Chart(RunReading run, MeasureSpec spec)
    {
        var rows = run.Results.Nodes.Select(node => (Node: node, Measure: RunReading.Find(node.InReportingCurrency, spec)))
            .Where(pair => pair.Measure is not null)
            .OrderByDescending(pair => pair.Measure!.Value).ThenBy(pair => pair.Node.Book, StringComparer.Ordinal)
            .Take(Charted).Select(pair => ChartRow(run, pair.Node, pair.Measure!)).ToList();
        var books = rows.Count < run.Results.Nodes.Count ? $"The {Phrases.Number(rows.Count)} books with the largest {Phrases.Short(spec)}" : $"{Phrases.Short(spec)} by book";
        return new Figure(
            books, new MeasureChart(rows, spec.ToString(), run.Currency), 38 + (14 * rows.Count),
            (run.IsWeighted ? "" : run.IsHistory ? "Whisker: interval of the days as a sample. " : "Whisker: interval. ") + "Upright stroke: limit in money on this measure, where the book is in the reporting currency. Square: breached; diamond: inconclusive; triangle: warning; circle: within or without limit.");
    }

    private static MeasureRow ChartRow(RunReading run, NodeResult node, MeasureResult measure)
    {
        var limit = run.Results.Limits.Where(one => one.Limit.Book == node.Book && one.Limit.Measure == measure.Spec)
            .OrderBy(one => Phrases.Urgency(one.Status)).ThenByDescending(one => one.Used).FirstOrDefault();
        double? amount = limit is { Limit.Basis: LimitBasis.Amount } && node.Currency == run.Currency ? limit.Limit.Amount : null;
        var (low, high) = measure.Sample is { } sample ? (sample.Low, sample.High) : (measure.Low, measure.High);
        return new(node.Name, measure.Value, low, high, amount, limit is null ? StatusMark.None : Phrases.Mark(limit.Status));
    }
}
