using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>A book at one confidence: its series by kind of profit, and the greater count that decides.</summary>
internal sealed class BookCount
{
    public BookCount(IReadOnlyList<BacktestSeries> series)
    {
        Series = series;
        Counted = [.. series.Where(one => one.Profit != ProfitKind.Theoretical)];
        Decides = (Counted.Count > 0 ? Counted : series).OrderByDescending(one => one.Count).ThenByDescending(one => one.Profit).First();
    }

    /// <summary>The series of every kind of profit.</summary>
    public IReadOnlyList<BacktestSeries> Series { get; }

    /// <summary>The series whose greater count counts: theoretical profit is the model's own and proves nothing of it.</summary>
    public IReadOnlyList<BacktestSeries> Counted { get; }

    /// <summary>The one with the greater count; the hypothetical of two equal ones.</summary>
    public BacktestSeries Decides { get; }

    public Confidence Confidence => Decides.Confidence;

    /// <summary>The worse zone; null where there is none.</summary>
    public BacktestZone? Zone => Counted.Max(one => one.Zone);

    /// <summary>The larger add-on; null where there is none.</summary>
    public double? Multiplier => Counted.Max(one => one.Multiplier);

    /// <summary>Whether every count keeps the desk limit; null where there is none to keep.</summary>
    public bool? KeepsDeskLimit => Counted.Any(one => one.KeepsDeskLimit == false) ? false : Counted.FirstOrDefault(one => one.KeepsDeskLimit is not null)?.KeepsDeskLimit;

    /// <summary>The series of a kind of profit; null where the book has none.</summary>
    public BacktestSeries? Of(ProfitKind profit) => Series.FirstOrDefault(one => one.Profit == profit);
}
