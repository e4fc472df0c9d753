using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>Every book: exceptions by actual and by hypothetical profit, the greater of them, and what it means.</summary>
internal static class CountsTable
{
    public static IEnumerable<Block> Blocks(EvidenceReading reading)
    {
        var supervised = IsSupervised(reading);
        yield return new Heading("Exceptions of every book", 3);
        yield return new Table(
            [
                new("Book", 2.6), new("VaR", 0.7, Alignment.Right), new("Days", 0.6, Alignment.Right), new("Actual", 0.7, Alignment.Right), new("Hypothetical", 1, Alignment.Right),
                new("Greater", 0.8, Alignment.Right), new("Expected", 0.9, Alignment.Right), new("Zone", 1.2),
                .. supervised ? [new("Add-on", 0.8, Alignment.Right), new("Desk limit", 1.2)] : (Column[])[],
            ],
            [.. reading.Books.Select(book => new RowGroup([.. book.Counts.Select((count, i) => Row(book, count, i == 0, supervised))]))],
            "No book has a series to count.");
        if (reading.Books.Count == 0)
            yield break;

        yield return new Paragraph(
            "An exception is a loss strictly greater than the VaR of the previous close; a day without VaR or P&L counts as one. "
            + (supervised ? "Add-on: what the greater count at 99% adds to the supervisory multiplier. Desk limit: no more than 12 exceptions at 99% or 30 at 97.5% in 250 days." : "Add-on and desk limit are for 250 days: there is none here.")
            + (reading.Books.SelectMany(book => book.Counts).Any(count => count.Of(ProfitKind.Actual) is null) ? " A dash under actual: the book has no row of actual P&L." : ""), Voice.Note);
        yield return new Paragraph(Pages(reading), Voice.Note);
    }

    private static bool IsSupervised(EvidenceReading reading) => reading.Books.SelectMany(book => book.Counts).Any(count => count.Multiplier is not null || count.KeepsDeskLimit is not null);

    private static Row Row(BookEvidence book, BookCount count, bool first, bool supervised)
    {
        var (mark, word) = Phrases.Zone(count.Zone);
        return new(
        [
            new TextCell(first ? book.Name : "", Level: book.Depth), count.Confidence.ToString(), Numerals.Count(count.Decides.Days.Count),
            Count(count.Of(ProfitKind.Actual)), Count(count.Of(ProfitKind.Hypothetical)), new TextCell(RichText.Strong(Numerals.Count(count.Decides.Count))),
            Numerals.Fixed(count.Decides.Expected, 1), new StatusCell(mark, word),
            .. supervised ? [Numerals.Fixed(count.Multiplier, 2), Limit(count.KeepsDeskLimit)] : (Cell[])[],
        ]);
    }

    private static string Count(BacktestSeries? series) => series is null ? Numerals.Missing : Numerals.Count(series.Count);

    private static Cell Limit(bool? keeps) => keeps switch
    {
        true => new StatusCell(StatusMark.Good, "kept"),
        false => new StatusCell(StatusMark.Bad, "exceeded"),
        _ => new TextCell(Numerals.Missing),
    };

    private static string Pages(EvidenceReading reading)
    {
        var withDays = reading.Books.Count(book => book.Days > 0);
        return reading.Paged.Count < withDays
            ? $"A page of its own follows for the root and {Numerals.Count(reading.Paged.Count - 1)} of {Numerals.Count(withDays - 1)} other books: those that exceed the desk limit, are out of the green zone or fail a test before others. Every book and day is in backtest-days.csv."
            : "A page follows for every book with days. Every day is in backtest-days.csv.";
    }
}
