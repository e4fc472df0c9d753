using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>The words that the sections of the evidence share.</summary>
internal static class EvidenceWords
{
    /// <summary>The kind of evidence, as a title says it.</summary>
    public static string Kind(BacktestEvidence evidence) => evidence.Kind switch
    {
        BacktestKind.Recorded => "recorded",
        BacktestKind.Backfilled => "backfilled",
        _ => evidence.Positions == BacktestPositions.Today ? "walk-forward on today's positions held fixed" : "walk-forward on stored positions",
    };

    /// <summary>What the kind means for who reads the counts.</summary>
    public static string Meaning(BacktestEvidence evidence) => evidence.Kind switch
    {
        BacktestKind.Recorded => "every VaR was reported by a stored run before the profit was known.",
        BacktestKind.Backfilled => "stored runs computed these figures after the profit was known: nobody had them on their date.",
        _ => "on each past day the model was estimated anew from what was known then, on "
            + (evidence.Positions == BacktestPositions.Today ? "the positions of the newest date held fixed: it says how the model would have served today's book, not what the firm held." : "the positions stored for that day: what would have been reported, not what was."),
    };

    public static string Profit(ProfitKind profit) => profit switch
    {
        ProfitKind.Actual => "actual",
        ProfitKind.Hypothetical => "hypothetical",
        _ => "theoretical",
    };

    public static string Method(PValueMethod? method) => method switch
    {
        PValueMethod.Exact => "exact",
        PValueMethod.Asymptotic => "asymptotic",
        PValueMethod.Simulated => "simulated",
        _ => "",
    };

    public static string Cause(ExceptionCause cause) => cause switch
    {
        ExceptionCause.System => "system or data",
        ExceptionCause.Model => "model",
        ExceptionCause.Market => "market",
        _ => "intraday trading",
    };

    /// <summary>A p-value with three decimals; what rounds to nothing is said to be below.</summary>
    public static string PValue(double? value) => value is { } p && p < 0.0005 ? "<\u00A00.001" : Numerals.Fixed(value, 3);

    /// <summary>Items as a sentence joins them: one, two and three.</summary>
    public static string Joined(IReadOnlyList<string> items) => items.Count < 2 ? string.Concat(items) : string.Join(", ", items.Take(items.Count - 1)) + " and " + items[^1];

    /// <summary>Dates of which no more than <paramref name="most"/> are named.</summary>
    public static string Dates(IReadOnlyList<DateOnly> dates, int most) =>
        string.Join(", ", dates.Take(most).Select(Numerals.Date)) + (dates.Count > most ? $" and {Numerals.Count(dates.Count - most)} more" : "");
}
