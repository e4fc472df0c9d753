using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>The tests of a book: those of the profit with the greater count in a table, the other series in a line each.</summary>
internal static class BookTests
{
    // More would not fit a page's width; the others stand in the lines below.
    private const int MostConfidences = 2;
    private const int MostNamed = 3;
    private const int MostNote = 400;

    public static IEnumerable<Block> Blocks(BookEvidence book)
    {
        var profit = book.Main.Decides.Profit;
        var shown = book.Counts.Select(count => count.Of(profit)).OfType<BacktestSeries>().Where(one => one.Tests.Count > 0).Take(MostConfidences).ToList();
        if (shown.Count == 0)
        {
            yield return new Paragraph("No test was made.");
            yield break;
        }

        var names = shown.SelectMany(one => one.Tests).Select(test => test.Name).Distinct().ToList();
        var assessed = names.Where(name => shown.Any(one => Find(one, name)?.Statistic is not null)).ToList();
        yield return new Heading($"Tests of {EvidenceWords.Profit(profit)} P&L", 3);
        yield return Table(shown, assessed);
        var others = book.Counts.SelectMany(count => count.Series).Where(one => one.Tests.Count > 0).Except(shown).Select(Line).ToList();
        var notes = Notes(shown);
        if (others.Count + notes.Length > 0)
            yield return new Paragraph(string.Join(" ", others.Append(notes).Where(one => one.Length > 0)), Voice.Note);
    }

    private static StatisticalTest? Find(BacktestSeries series, string name) => series.Tests.FirstOrDefault(test => test.Name == name);

    private static Table Table(IReadOnlyList<BacktestSeries> shown, IReadOnlyList<string> names) => new(
        [
            new("Test and source", 4.4),
            .. shown.SelectMany(one => (Column[])[new("Statistic", 0.9, Alignment.Right, $"at {one.Confidence}"), new("p-value", 1.4, Alignment.Right, $"at {one.Confidence}")]),
            new("At 5%", 1.6),
        ],
        [new([.. names.Select(name => Row(shown, name))])],
        "None of the tests can be assessed.");

    private static Row Row(IReadOnlyList<BacktestSeries> shown, string name)
    {
        var tests = shown.Select(one => Find(one, name)).ToList();
        return new(
        [
            $"{TestWords.Of(name).Title} · {Short(tests.OfType<StatisticalTest>().First().Source)}",
            .. tests.SelectMany(test => (Cell[])[Significant.Text(test?.Statistic), PValue(test)]),
            Decision(shown, tests),
        ]);
    }

    // Author and year: the method's table has the source in full.
    private static string Short(string source) => source.IndexOfAny([',', ';']) is var end and > 0 ? source[..end] : source;

    private static string PValue(StatisticalTest? test) => test?.PValue is null ? Numerals.Missing : $"{EvidenceWords.PValue(test.PValue)}\u00A0{EvidenceWords.Method(test.Method)}".TrimEnd('\u00A0');

    private static Cell Decision(IReadOnlyList<BacktestSeries> shown, List<StatisticalTest?> tests)
    {
        var rejected = shown.Where((_, i) => tests[i]?.Reject == true).ToList();
        if (rejected.Count > 0)
            return new StatusCell(StatusMark.Bad, "rejected", rejected.Count == tests.Count(test => test?.Reject is not null) ? "" : $"at {string.Join(", ", rejected.Select(one => one.Confidence))}");
        return tests.Any(test => test?.Reject is not null) ? new StatusCell(StatusMark.Good, "not\u00A0rejected") : new TextCell("not decided");
    }

    private static string Line(BacktestSeries series)
    {
        var assessed = series.Tests.Where(test => test.Reject is not null).ToList();
        var rejected = assessed.Where(test => test.Reject == true).ToList();
        var named = rejected.OrderBy(test => test.PValue).Take(MostNamed).Select(test => $"{TestWords.Of(test.Name).Title} (p {EvidenceWords.PValue(test.PValue)})").ToList();
        if (rejected.Count > MostNamed)
            named.Add($"{Phrases.Number(rejected.Count - MostNamed)} more");
        var found = rejected.Count == 0 ? "none rejects" : $"{Phrases.Number(rejected.Count)} reject{(rejected.Count == 1 ? "s" : "")}: {EvidenceWords.Joined(named)}";
        return $"{Phrases.Sentence(EvidenceWords.Profit(series.Profit))} P&L at {series.Confidence}: of {Phrases.Plural(assessed.Count, "test")} {found}.";
    }

    // What several tests say in the same words is said once.
    private static string Notes(IReadOnlyList<BacktestSeries> shown)
    {
        var said = shown.SelectMany(one => one.Tests).Where(test => test.Note.Length > 0)
            .GroupBy(test => test.Note, StringComparer.Ordinal)
            .Select(group => $"{string.Join(", ", group.Select(test => TestWords.Of(test.Name).Title).Distinct())}: {group.Key.TrimEnd('.')}.");
        var text = "";
        foreach (var note in said)
        {
            if (text.Length + note.Length > MostNote)
                return text + " More notes stand in backtest.json.";
            text += (text.Length > 0 ? " " : "") + note;
        }

        return text;
    }
}
