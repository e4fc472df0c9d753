using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>VaR of the previous close against daily P&amp;L: the counts of every book, the days of the root.</summary>
internal static class BacktestSection
{
    private const int ListedDays = 12;
    private const float ChartHeight = 125;

    public static IReadOnlyList<Block> Blocks(RunReading run)
    {
        var counts = run.Results.Backtest;
        if (counts.All(count => count.Days == 0))
            return [new Heading("VaR against P&L"), new Paragraph("No earlier run is stored, so there is no VaR to hold against the P&L.")];

        var root = counts.FirstOrDefault(count => count.Book == run.Root?.Book);
        return
        [
            new Heading("VaR against P&L"),
            .. root is { Series.Count: > 0 } ? Figures(run, root) : [],
            Counts(run, counts),
            new Paragraph(
                "An exception is a loss strictly greater than the VaR of the previous close; a day without VaR or P&L counts as one. The greater of the two counts decides the zone, which needs at least 125 days. "
                + "So few days can show that a model fails; they cannot show that it is right.", Voice.Note),
            .. root is { Series.Count: > 0 } ? Days(run, root) : NoDays(root),
        ];
    }

    // A backfilled run keeps its counts; the days behind them stand in the newest run.
    private static Block[] NoDays(BacktestResult? root) =>
        root is { Days: > 0 } ? [new Paragraph("The days behind the counts are not kept with a backfilled run; the report of a recorded run lists them.", Voice.Note)] : [];

    private static List<Block> Figures(RunReading run, BacktestResult root)
    {
        var name = $"VaR {root.Confidence}";
        var hypothetical = Chart(root, name, day => day.Hypothetical);
        var actual = root.Actual is null ? null : Chart(root, name, day => day.Actual);
        var ranges = new[] { hypothetical, actual }.OfType<PnlChart>().Select(PnlRange.Of).ToList();
        var (low, high) = (ranges.Min(range => range.Low), ranges.Max(range => range.High));
        var blocks = new List<Block>();
        if (actual is not null)
            blocks.Add(Figure("Actual P&L", actual, root.Actual!.Value, ""));
        blocks.Add(Figure("Hypothetical P&L", hypothetical, root.Hypothetical,
            "Line: VaR of the previous close, as a loss. Diamond: exception. Grey column below a cross: a day without VaR or P&L."));
        if (actual is null)
            blocks.Add(new Paragraph($"{run.NameOf(root.Book)} has no row of actual P&L in pnl.csv: there is no actual count.", Voice.Note));
        return blocks;

        Figure Figure(string kind, PnlChart chart, int exceptions, string caption) => new(
            $"{kind} of {run.NameOf(root.Book)}: {Phrases.Plural(exceptions, "exception")} in {Phrases.Plural(root.Days, "day")}",
            chart with { Lowest = low, Highest = high }, ChartHeight, caption);
    }

    private static PnlChart Chart(BacktestResult result, string name, Func<BacktestDay, double?> profit) => new(
        [.. result.Series.Select(day => new PnlDay(day.Date, profit(day), day.Var, BacktestDay.IsException(day.Var, profit(day))))], name, result.Currency);

    private static Table Counts(RunReading run, IReadOnlyList<BacktestResult> counts) => new(
        [
            new("Book", 2.6), new("VaR", 0.8, Alignment.Right), new("Days", 0.7, Alignment.Right), new("Backfilled", 0.9, Alignment.Right), new("Expected", 0.9, Alignment.Right),
            new("Actual", 0.8, Alignment.Right), new("Hypothetical", 1, Alignment.Right), new("Without VaR", 0.9, Alignment.Right), new("Greater", 0.8, Alignment.Right), new("Zone", 1.4),
        ],
        [new RowGroup([.. counts.Select(count => Row(run, count))])],
        "");

    private static Row Row(RunReading run, BacktestResult count)
    {
        var (mark, word) = Phrases.Zone(count.Zone);
        return new(
        [
            run.NameOf(count.Book), count.Confidence.ToString(), Numerals.Count(count.Days), Numerals.Count(count.Backfilled),
            Numerals.Fixed((double)(count.Days * (1 - count.Confidence.Level)), 1),
            count.Actual is { } actual ? Numerals.Count(actual) : Numerals.Missing,
            Numerals.Count(count.Hypothetical), Numerals.Count(count.MissingVar), new TextCell(RichText.Strong(Numerals.Count(count.Exceptions))), new StatusCell(mark, word),
        ]);
    }

    private static IEnumerable<Block> Days(RunReading run, BacktestResult root)
    {
        var days = root.Series.Where(day => IsException(root, day)).Reverse().ToList();
        if (days.Count == 0)
            return [new Paragraph($"{run.NameOf(root.Book)} had no exception in these days.")];

        var scale = run.Scale(root.Currency);
        var listed = days.Take(ListedDays).Select(day => new Row(
            [Numerals.Date(day.Date), scale.Text(day.Var), scale.Text(day.Actual), scale.Text(day.Hypothetical), Reason(root, day)]));
        return
        [
            new Heading($"Exceptions of {run.NameOf(root.Book)}, newest first" + (days.Count > ListedDays ? $": {Phrases.Number(ListedDays)} of {Phrases.Number(days.Count)}" : ""), 3),
            new Table(
                [new("Date", 1), new("VaR", 1, Alignment.Right, scale.Unit), new("Actual P&L", 1, Alignment.Right, scale.Unit), new("Hypothetical P&L", 1, Alignment.Right, scale.Unit), new("Exception by", 2)],
                [new RowGroup([.. listed])], ""),
        ];
    }

    private static bool IsException(BacktestResult root, BacktestDay day) =>
        BacktestDay.IsException(day.Var, day.Hypothetical) || (root.Actual is not null && BacktestDay.IsException(day.Var, day.Actual));

    private static string Reason(BacktestResult root, BacktestDay day)
    {
        if (day.Var is null)
            return "no VaR";

        var reasons = new List<string>();
        if (root.Actual is not null && BacktestDay.IsException(day.Var, day.Actual))
            reasons.Add(day.Actual is null ? "no actual P&L" : "actual");
        if (BacktestDay.IsException(day.Var, day.Hypothetical))
            reasons.Add(day.Hypothetical is null ? "no hypothetical P&L" : "hypothetical");
        return string.Join(", ", reasons);
    }
}
