using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>All that is known of a book.</summary>
internal sealed class BookEvidence
{
    public BookEvidence(IReadOnlyList<BacktestSeries> series)
    {
        First = series[0];
        Counts = [.. series.GroupBy(one => one.Confidence).OrderByDescending(one => one.Key).Select(one => new BookCount([.. one]))];
    }

    public string Book => First.Book;

    public string Name => First.Name;

    public int Depth => First.Depth;

    public string Currency => First.Currency;

    /// <summary>A count a confidence, the highest first.</summary>
    public IReadOnlyList<BookCount> Counts { get; }

    /// <summary>The count at the highest confidence.</summary>
    public BookCount Main => Counts[0];

    /// <summary>Days of its longest series.</summary>
    public int Days => Counts.SelectMany(count => count.Series).Max(one => one.Days.Count);

    /// <summary>What a reader must see first: a desk limit not kept, a zone other than green, a rejected test.</summary>
    public int Urgency => Counts.Min(count => count switch
    {
        { KeepsDeskLimit: false } => 0,
        { Zone: BacktestZone.Red } => 1,
        { Zone: BacktestZone.Yellow } => 2,
        _ => count.Series.SelectMany(one => one.Tests).Any(test => test.Reject == true) ? 3 : 4,
    });

    private BacktestSeries First { get; }
}
