using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Document;
using RiskWorker.Reporting.Reports.Limits;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>Other models over the same days beside the one that the evidence is of.</summary>
internal static class ModelCountsSection
{
    private const int MostBooks = 12;

    public static IReadOnlyList<Block> Blocks(EvidenceReading reading)
    {
        var models = reading.Evidence.Models.ToLookup(model => model.Book, StringComparer.Ordinal);
        var books = reading.Books.Where(book => models.Contains(book.Book)).ToList();
        if (books.Count == 0)
            return [];

        var shown = books.Take(1).Concat(books.Skip(1).OrderBy(book => book.Urgency).Take(MostBooks)).ToHashSet();
        return
        [
            new Heading("Models over the same days"),
            new Table(
                [
                    new("Model", 2.4), new("VaR", 0.8, Alignment.Right), new("Days", 0.7, Alignment.Right), new("Exceptions", 1, Alignment.Right), new("Expected", 0.9, Alignment.Right), new("Zone", 1.3),
                    new("Mean VaR", 1.1, Alignment.Right),
                ],
                [.. books.Where(shown.Contains).Select(book => Group(reading, book, [.. models[book.Book]]))], ""),
            new Paragraph(
                "Exceptions by hypothetical P&L. Fewer exceptions for a higher mean VaR are bought, not earned; a model is better where it comes nearer to the expected number at no higher a VaR."
                + (shown.Count < books.Count ? $" Shown are {Numerals.Count(shown.Count)} of {Numerals.Count(books.Count)} books; all are in backtest.json." : ""), Voice.Note),
        ];
    }

    private static RowGroup Group(EvidenceReading reading, BookEvidence book, IReadOnlyList<ModelCount> models)
    {
        var own = book.Counts.Select(count => count.Of(ProfitKind.Hypothetical)).OfType<BacktestSeries>().ToList();
        var means = own.Select(one => one.Days.Select(day => day.Var).OfType<double>().DefaultIfEmpty(double.NaN).Average()).ToList();
        var scale = EvidenceReading.Scale(means.Concat(models.Select(model => model.MeanVar)).Where(double.IsFinite).Select(mean => (double?)mean), book.Currency);
        IEnumerable<Row> rows =
        [
            .. own.Select((one, i) => Row(i == 0 ? $"{reading.Evidence.Model.Name}, this evidence" : "", new(reading.Evidence.Model.Name, book.Book, one.Confidence, one.Days.Count, one.Count, one.Zone, means[i]), scale, Emphasis.Strong)),
            .. models.GroupBy(model => model.Model, StringComparer.Ordinal)
                .SelectMany(model => model.OrderByDescending(one => one.Confidence).Select((one, i) => Row(i == 0 ? one.Model : "", one, scale, Emphasis.None))),
        ];
        return new([.. rows], $"{book.Name}, mean VaR in {scale.Unit}");
    }

    private static Row Row(string name, ModelCount count, MoneyScale scale, Emphasis emphasis)
    {
        var (mark, zone) = Phrases.Zone(count.Zone);
        return new(
        [
            name, count.Confidence.ToString(), Numerals.Count(count.Days), Numerals.Count(count.Exceptions),
            Numerals.Fixed((double)(count.Days * (1 - count.Confidence.Level)), 1), new StatusCell(mark, zone), scale.Text(count.MeanVar),
        ], emphasis);
    }
}
