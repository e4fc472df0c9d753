using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>The register of exceptions: what is not explained first, what is put down to system or data apart.</summary>
internal static class ExceptionRegister
{
    private const int MostDays = 400;
    private const int MostWalkedDays = 60;
    private const int Costliest = 3;

    /// <summary>How far the exceptions are explained; null where there is none, or where nobody could have explained one.</summary>
    public static string? Sentence(EvidenceReading reading)
    {
        var days = ExceptionDay.Of(reading.Evidence.Exceptions);
        var open = days.Where(day => day.Main.Explanation is null).ToList();
        if (days.Count == 0 || (reading.IsWalkForward && open.Count == days.Count))
            return null;

        var technical = days.Count(day => day.IsTechnical);
        var all = $"{Numerals.Count(days.Count)} in the register (a book and a day each)";
        var apart = technical == 0 ? "none is put down to system or data" : $"{Phrases.Number(technical)} {Are(technical)} put down to system or data and counted apart";
        return open.Count == 0
            ? $"{all}, every one explained; {apart}."
            : $"{all}, {Phrases.Number(open.Count)} without explanation, the oldest for {Phrases.Plural(open.Max(day => day.Age), "business day")}; {apart}.";
    }

    public static IReadOnlyList<Block> Blocks(EvidenceReading reading)
    {
        var all = ExceptionDay.Of(reading.Evidence.Exceptions);
        if (all.Count == 0)
            return reading.Books.Any(book => book.Days > 0) ? [new Heading("Register of exceptions"), new Paragraph("No book had an exception in these days.")] : [];

        var shown = Shown(reading, all);
        return
        [
            new Heading("Register of exceptions", 2, Lead(all)),
            new Table(
                [
                    new("Date", 1.15), new("Book", 1.5), new("P&L", 1, Alignment.Right), new("VaR", 0.85, Alignment.Right), new("Excess", 0.85, Alignment.Right),
                    new("What cost most", 2.3), new("Cause and explanation", 2.6),
                ],
                [.. Groups(reading, shown)], ""),
            new Paragraph(
                "Excess: the loss beyond VaR at the highest confidence. What cost most: the books below with their hypothetical P&L, in small letters the factors with their part of it. "
                + "An explanation is never overwritten: one that was corrected stays, in grey, below the one that holds."
                + (shown.Count < all.Count ? $" Shown are {Numerals.Count(shown.Count)} of {Numerals.Count(all.Count)}, unexplained ones and those of books with a page first; all are in exceptions.csv." : ""), Voice.Note),
        ];
    }

    private static string Lead(IReadOnlyList<ExceptionDay> all)
    {
        var causes = all.Where(day => day.Main.Explanation is not null).GroupBy(day => day.Main.Explanation!.Cause).OrderBy(group => group.Key)
            .Select(group => $"{EvidenceWords.Cause(group.Key)} {Numerals.Count(group.Count())}");
        return string.Join(" · ", causes.Prepend($"without explanation {Numerals.Count(all.Count(day => day.Main.Explanation is null))}"));
    }

    private static List<ExceptionDay> Shown(EvidenceReading reading, IReadOnlyList<ExceptionDay> all)
    {
        var paged = reading.Paged.Select((book, i) => (book.Book, i)).ToDictionary(one => one.Book, one => one.i, StringComparer.Ordinal);
        var most = reading.IsWalkForward ? MostWalkedDays : MostDays;
        var chosen = all.Count <= most ? all : all.OrderBy(day => day.Main.Explanation is not null).ThenBy(day => paged.GetValueOrDefault(day.Main.Book, int.MaxValue)).Take(most);
        var kept = chosen.ToHashSet();
        return [.. all.Where(kept.Contains)];
    }

    // One unit a group: amounts of a currency are read together.
    private static IEnumerable<RowGroup> Groups(EvidenceReading reading, IReadOnlyList<ExceptionDay> shown) =>
        from state in shown.GroupBy(State).OrderBy(one => one.Key)
        from currency in state.GroupBy(day => day.Main.Currency, StringComparer.Ordinal).OrderBy(one => one.Key != reading.Evidence.Firm.ReportingCurrency)
        let scale = EvidenceReading.Scale(currency.SelectMany(day => day.Entries).SelectMany(one => (double?[])[one.Amount, one.Var]), currency.Key)
        select new RowGroup([.. currency.SelectMany(day => Rows(reading, day, scale))], $"{Title(state.Key)}, in {scale.Unit}");

    private static int State(ExceptionDay day) => day.Main.Explanation is null ? 0 : day.IsTechnical ? 2 : 1;

    private static string Title(int state) => state switch { 0 => "Without explanation", 1 => "Explained", _ => "Put down to system or data, counted apart" };

    private static IEnumerable<Row> Rows(EvidenceReading reading, ExceptionDay day, MoneyScale scale)
    {
        var entry = day.Main;
        yield return new(
        [
            new TextCell(Numerals.Date(entry.Date), entry.Explanation is null && !reading.IsWalkForward ? $"open {Phrases.Plural(day.Age, "day")}" : ""),
            new TextCell(reading.NameOf(entry.Book), Kinds(day)),
            new TextCell(scale.Text(entry.Amount), EvidenceWords.Profit(entry.Profit)), new TextCell(scale.Text(entry.Var), entry.Confidence.ToString()), Excess(day, scale),
            new TextCell(Costs(entry.Books.Select(book => (reading.NameOf(book.Book), book.Amount)), scale), Costs(entry.Factors.Select(factor => (factor.Factor, factor.Amount)), scale)),
            Explained(entry.Explanation, reading.IsWalkForward ? Numerals.Missing : "not explained"),
        ]);
        foreach (var corrected in entry.Corrected)
            yield return new(["", "", "", "", "", new TextCell("corrected:"), Explained(corrected, "")], Emphasis.Muted);
    }

    private static string Kinds(ExceptionDay day)
    {
        var confidences = EvidenceWords.Joined([.. day.Entries.Select(one => one.Confidence).Distinct().OrderDescending().Select(one => one.ToString())]);
        return $"{confidences} by {EvidenceWords.Joined([.. day.Entries.Select(one => one.Profit).Distinct().Order().Select(EvidenceWords.Profit)])}";
    }

    private static string Excess(ExceptionDay day, MoneyScale scale) =>
        day.Main.Var is null ? "no\u00A0VaR" : day.Main.Amount is null ? "no\u00A0P&L" : scale.Text(day.Excess);

    private static string Costs(IEnumerable<(string Name, double Amount)> parts, MoneyScale scale) =>
        string.Join(", ", parts.Take(Costliest).Select(part => $"{part.Name}\u00A0{scale.Text(part.Amount)}"));

    private static TextCell Explained(ExceptionExplanation? explanation, string otherwise) => explanation is null
        ? new(RichText.Strong(otherwise))
        : new(RichText.Of(new TextRun(Phrases.Sentence(EvidenceWords.Cause(explanation.Cause)) + ": ", Strong: true), new TextRun(explanation.Text)), $"{explanation.Author}, {Phrases.Utc(explanation.Written)}");

    private static string Are(int count) => count == 1 ? "is" : "are";
}
