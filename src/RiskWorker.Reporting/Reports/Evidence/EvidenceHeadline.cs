using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>The top of page 1: one sentence that says how many books stand up and which do not, and what that rests on.</summary>
internal static class EvidenceHeadline
{
    private const int Named = 3;

    public static IEnumerable<Block> Blocks(EvidenceReading reading)
    {
        var evidence = reading.Evidence;
        yield return new Heading(
            $"Backtest evidence: {EvidenceWords.Kind(evidence)}", 1,
            RichText.Of(new TextRun($"{evidence.Firm.Name} · "), new TextRun($"{Numerals.Date(evidence.From)} to {Numerals.Date(evidence.To)}", Strong: true)));
        var (mark, sentence) = Verdict(reading);
        yield return new Callout(mark, sentence, [.. Details(reading)]);
    }

    private static (StatusMark Mark, string Sentence) Verdict(EvidenceReading reading)
    {
        if (reading.Books.All(book => book.Days == 0))
            return (StatusMark.None, "There is no day to count: nothing is shown of the model.");

        var byLimit = reading.Books.SelectMany(book => book.Counts).Any(count => count.KeepsDeskLimit is not null);
        Func<BookCount, bool?> passes = byLimit ? count => count.KeepsDeskLimit : count => count.Zone is { } zone ? zone == BacktestZone.Green : null;
        var judged = reading.Books.Where(book => book.Counts.Any(count => passes(count) is not null)).ToList();
        if (judged.Count == 0)
            return (StatusMark.None, $"There are too few days to judge any book: {Numerals.Count(reading.Books.Max(book => book.Days))}, where a zone needs 125.");

        var failed = judged.Where(book => book.Counts.Any(count => passes(count) == false)).ToList();
        var (does, doesNot) = byLimit
            ? (judged.Count - failed.Count == 1 ? "keeps the desk limit" : "keep the desk limit", failed.Count == 1 ? "does not" : "do not")
            : (judged.Count - failed.Count == 1 ? "is in the green zone" : "are in the green zone", failed.Count == 1 ? "is not" : "are not");
        var at = EvidenceWords.Joined([.. judged.SelectMany(book => book.Counts).Where(count => passes(count) is not null).Select(count => count.Confidence).Distinct().OrderDescending().Select(one => one.ToString())]);
        var rest = judged.Count < reading.Books.Count ? $" {Phrases.Sentence(Phrases.Number(reading.Books.Count - judged.Count))} {(reading.Books.Count - judged.Count == 1 ? "book has" : "books have")} too few days to be judged." : "";
        if (failed.Count == 0)
            return (Urgent(reading), $"{All(judged.Count)} {does} at {at}.{rest}");

        var passing = failed.Count == judged.Count ? $"None of {Phrases.Number(judged.Count)} books" : $"{Phrases.Sentence(Phrases.Number(judged.Count - failed.Count))} of {Phrases.Number(judged.Count)} books";
        var keeps = failed.Count == judged.Count ? byLimit ? "keeps the desk limit" : "is in the green zone" : does;
        return (StatusMark.Bad, $"{passing} {keeps} at {at}; {Failing(failed, passes)} {doesNot}.{rest}");
    }

    private static StatusMark Urgent(EvidenceReading reading) => reading.Books.Min(book => book.Urgency) < 3 ? StatusMark.Warning : StatusMark.Good;

    private static string All(int count) => count switch { 1 => "The only book", 2 => "Both books", _ => $"All {Phrases.Number(count)} books" };

    private static string Failing(List<BookEvidence> failed, Func<BookCount, bool?> passes)
    {
        var named = failed.Take(Named).Select(book => $"{book.Name} ({string.Join(", ", book.Counts.Where(count => passes(count) == false).Select(count => count.Confidence))})").ToList();
        if (failed.Count > Named)
            named.Add($"{Phrases.Number(failed.Count - Named)} more");
        return EvidenceWords.Joined(named);
    }

    private static IEnumerable<RichText> Details(EvidenceReading reading)
    {
        yield return RichText.Of(new TextRun(Phrases.Sentence(reading.Evidence.Kind == BacktestKind.WalkForward ? "walk-forward" : EvidenceWords.Kind(reading.Evidence)), Strong: true), new TextRun(": " + EvidenceWords.Meaning(reading.Evidence)));
        if (Zones(reading) is { Length: > 0 } zones)
            yield return RichText.Of(new TextRun("Zones", Strong: true), new TextRun(" of the greater count: " + zones + "."));
        if (ExceptionRegister.Sentence(reading) is { } register)
            yield return RichText.Of(new TextRun("Exceptions", Strong: true), new TextRun(": " + register));
        if (Tests(reading) is { } tests)
            yield return RichText.Of(new TextRun("Tests", Strong: true), new TextRun(": " + tests));
    }

    private static string Zones(EvidenceReading reading) => string.Join("; ", reading.Books.SelectMany(book => book.Counts)
        .Where(count => count.Zone is not null).GroupBy(count => count.Confidence).OrderByDescending(group => group.Key)
        .Select(group => $"at {group.Key} " + EvidenceWords.Joined([.. group.GroupBy(count => count.Zone).OrderBy(zone => zone.Key).Select(zone => $"{Phrases.Number(zone.Count())} {Phrases.Zone(zone.Key).Word}")])));

    private static string? Tests(EvidenceReading reading)
    {
        var assessed = reading.Evidence.Series.SelectMany(one => one.Tests).Where(test => test.Reject is not null).ToList();
        if (assessed.Count == 0)
            return null;

        var rejected = assessed.Count(test => test.Reject == true);
        return $"{Numerals.Count(rejected)} of {Numerals.Count(assessed.Count)} reject at 5%. About {Numerals.Fixed(assessed.Count * 0.05)} would if every model were right; tests of one book's days are not independent of each other.";
    }
}
