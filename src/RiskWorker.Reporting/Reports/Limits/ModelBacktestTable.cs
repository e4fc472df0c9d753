using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>Exceptions of each model over 250 and 500 days, and what the tests of them say: the top node, below it the books.</summary>
internal static class ModelBacktestTable
{
    private const int MostBooks = 12;
    private const int MostRows = 84;
    private const int DaysForZone = 125;
    private const double Low = 0.05;
    private const double Convincing = 0.8;

    public static IEnumerable<Block> Blocks(RunReading run)
    {
        var counts = run.Results.ModelBacktests.Where(count => count.Days > 0).ToList();
        yield return new Heading("Exceptions by model", 3);
        if (counts.Count == 0 || run.Root is not { } root)
        {
            yield return new Paragraph("No earlier run with these models is stored, so there is no VaR of theirs to hold against the P&L.");
            yield break;
        }

        var byBook = counts.ToLookup(count => count.Book, StringComparer.Ordinal);
        var below = run.Results.Nodes.Where(node => node.Book != root.Book && byBook.Contains(node.Book)).ToList();
        var most = Math.Clamp(MostRows / byBook.Max(book => Distinct(book).Count()), 1, MostBooks);
        var shown = below.OrderByDescending(node => byBook[node.Book].Any(IsRemarkable)).Take(most).ToHashSet();
        yield return new Paragraph(Evidence(counts));
        yield return Table([.. byBook.Contains(root.Book) ? [root] : (IEnumerable<NodeResult>)[], .. below.Where(shown.Contains)], byBook, run);
        yield return new Paragraph(
            "p-values of likelihood-ratio tests: as many exceptions as the confidence says (Kupiec 1995); an exception makes none the next day more likely (Christoffersen 1998); both together. "
            + "The greater of actual and hypothetical counts. Where there are no more than 250 days, one line stands for both windows."
            + (shown.Count < below.Count ? $" Shown are {Phrases.Number(shown.Count)} of {Phrases.Number(below.Count)} books below the top, those with a zone other than green or a p-value below 5% before others; all are in results.json." : ""), Voice.Note);
    }

    private static Table Table(IReadOnlyList<NodeResult> nodes, ILookup<string, ModelBacktest> byBook, RunReading run) => new(
        [
            new("Model", 2), new("VaR", 0.7, Alignment.Right), new("Days", 0.6, Alignment.Right), new("Exceptions", 0.9, Alignment.Right), new("Expected", 0.8, Alignment.Right), new("Zone", 1.2),
            new("Coverage", 0.9, Alignment.Right, "p-value"), new("Independence", 1, Alignment.Right, "p-value"), new("Both", 0.8, Alignment.Right, "p-value"),
        ],
        [.. nodes.Select(node => new RowGroup([.. Rows([.. Distinct(byBook[node.Book])])], run.NameOf(node.Book)))], "");

    // A model is named once for all its lines.
    private static IEnumerable<Row> Rows(IReadOnlyList<ModelBacktest> counts) => counts.Select((count, i) => Row(count, i > 0 && counts[i - 1].Model == count.Model ? "" : count.Model));

    // The longer window adds nothing where it holds the same days.
    private static IEnumerable<ModelBacktest> Distinct(IEnumerable<ModelBacktest> counts) => counts
        .GroupBy(count => (count.Model, count.Confidence))
        .SelectMany(group => group.OrderBy(count => count.Window).DistinctBy(count => count.Days));

    private static Row Row(ModelBacktest count, string name)
    {
        var (mark, word) = Phrases.Zone(count.Zone);
        return new(
        [
            name, count.Confidence.ToString(), Numerals.Count(count.Days), new TextCell(RichText.Strong(Numerals.Count(count.Exceptions))),
            Numerals.Fixed((double)(count.Days * (1 - count.Confidence.Level)), 1), new StatusCell(mark, word), Test(count.Coverage), Test(count.Independence), Test(count.Conditional),
        ]);
    }

    private static TextCell Test(TestResult? test) => test is null
        ? new(Numerals.Missing)
        : new(test.PValue < 0.005 ? "<\u00A00.01" : Numerals.Fixed(test.PValue, 2), test.PValue < Low ? "below\u00A05%" : "");

    private static bool IsRemarkable(ModelBacktest count) =>
        count.Zone is BacktestZone.Yellow or BacktestZone.Red || new[] { count.Coverage, count.Independence, count.Conditional }.Any(test => test?.PValue < Low);

    private static string Evidence(IReadOnlyList<ModelBacktest> counts)
    {
        var days = counts.Max(count => count.Days);
        var confidence = counts.Max(count => count.Confidence);
        var (from, found) = ExceptionPower.Of(days, confidence);
        var least = counts.GroupBy(count => (count.Model, count.Book)).Min(group => group.Max(count => count.Days));
        var span = least == days ? Phrases.Plural(days, "day") : $"{Numerals.Count(least)} to {Phrases.Plural(days, "day")}";
        return $"There {(days == 1 ? "is" : "are")} {span} of evidence{(days < DaysForZone ? $", too few for a zone, which needs {Numerals.Count(DaysForZone)}" : "")}. "
            + $"{(found < Convincing ? "So few prove little: over" : "Over")} {Phrases.Plural(days, "day")}, VaR {confidence} should be passed {Numerals.Fixed((double)(days * (1 - confidence.Level)), 1)} times, "
            + $"{Phrases.Number(from)} or more would be remarkable, and a model whose VaR is passed twice as often as it says would show so many in {(found < Convincing ? "only " : "")}{Numerals.Fixed(found * 100)} of 100 such spans. "
            + "A test that finds nothing does not show that a model is right.";
    }
}
