using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Charts;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>A book on a page: its days in a picture, where they fell in the model's distribution, its tests.</summary>
internal static class BookPage
{
    private const int NamedDays = 6;
    private const float DaysHeight = 104;
    private const float ProbabilityHeight = 80;

    public static Section Of(BookEvidence book) => new(
    [
        new Heading(book.Name, 2, Lead(book)),
        Days(book),
        new Columns([.. Probabilities(book)], [new Heading("Counts", 3), new Facts([.. Counts(book)])], 0.5),
        .. BookTests.Blocks(book),
    ], StartsPage: true);

    private static string Lead(BookEvidence book)
    {
        var days = book.Main.Decides.Days;
        var span = days.Count == 0 ? "no day" : $"{Numerals.Count(days.Count)} days from {Numerals.Date(days[0].Date)} to {Numerals.Date(days[^1].Date)}";
        return book.Book == book.Name ? $"{span} · {book.Currency}" : $"{book.Book} · {span} · {book.Currency}";
    }

    private static Figure Days(BookEvidence book)
    {
        var series = book.Main.Decides;
        return new Figure(
            $"{Phrases.Sentence(EvidenceWords.Profit(series.Profit))} P&L against VaR {series.Confidence}: {Phrases.Plural(series.Count, "exception")}, {Numerals.Fixed(series.Expected, 1)} expected",
            new PnlChart([.. series.Days.Select(day => new PnlDay(day.Date, day.Profit, day.Var, day.Exception))], $"VaR {series.Confidence}", book.Currency),
            DaysHeight, "Line: VaR of the previous close, as a loss. Diamond: exception. Grey column below a cross: a day without VaR or P&L.");
    }

    private static IEnumerable<Block> Probabilities(BookEvidence book)
    {
        var known = book.Counts.SelectMany(count => count.Counted.Prepend(count.Decides)).FirstOrDefault(one => one.Probabilities.Sum() > 0);
        if (known is null)
        {
            yield return new Paragraph("Where each P&L fell in the model's distribution is not known: no probability is stored for these days.");
            yield break;
        }

        var days = known.Probabilities.Sum();
        var usual = UsualBin.Of(days, known.Probabilities.Count);
        yield return new Figure(
            $"Where {EvidenceWords.Profit(known.Profit)} P&L fell in the forecast",
            new ProbabilityChart(known.Probabilities, usual?.Low, usual?.High), ProbabilityHeight,
            "Level where the model is right." + (usual is { } band ? $" Grey: usual, 95 of 100 such spans ({Numerals.Count(band.Low)} to {Numerals.Count(band.High)} days)." : ""));
    }

    private static IEnumerable<Fact> Counts(BookEvidence book)
    {
        foreach (var count in book.Counts)
        {
            var (_, zone) = Phrases.Zone(count.Zone);
            var kinds = string.Join(", ", count.Series.Select(one => $"{EvidenceWords.Profit(one.Profit)} {Numerals.Count(one.Count)}"));
            yield return new($"VaR {count.Confidence}", RichText.Of(new TextRun($"{kinds}; expected {Numerals.Fixed(count.Decides.Expected, 1)}; "), new TextRun(zone, Strong: true)));
        }

        yield return new("Without VaR", Missing(book.Main.Decides, day => day.Var is null));
        foreach (var series in book.Main.Series)
            yield return new($"Without {EvidenceWords.Profit(series.Profit)} P&L", Missing(series, day => day.Profit is null));
    }

    private static string Missing(BacktestSeries series, Func<EvidenceDay, bool> isMissing)
    {
        var dates = series.Days.Where(isMissing).Select(day => day.Date).ToList();
        return dates.Count == 0 ? "no day" : EvidenceWords.Dates(dates, NamedDays);
    }
}
