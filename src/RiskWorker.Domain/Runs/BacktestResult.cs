namespace RiskWorker.Domain.Runs;

/// <summary>The zone of an exception count by the cumulative binomial probability.</summary>
public enum BacktestZone
{
    /// <summary>Below the first count whose cumulative probability reaches 95%.</summary>
    Green,

    /// <summary>From there to below 99.99%.</summary>
    Yellow,

    /// <summary>From 99.99% on.</summary>
    Red,
}

/// <summary>Exceptions of a book's one-day VaR over the last 250 days.</summary>
public sealed record BacktestResult
{
    private readonly int? _days;

    /// <summary>The book.</summary>
    public required string Book { get; init; }

    /// <summary>Confidence of the VaR.</summary>
    public required Confidence Confidence { get; init; }

    /// <summary>Currency of VaR and profit.</summary>
    public required string Currency { get; init; }

    /// <summary>Days counted, oldest first: at most 250, none before the first stored run. Empty in the record of a backfilled run, which keeps the counts alone.</summary>
    public required IReadOnlyList<BacktestDay> Series { get; init; }

    /// <summary>Exceptions by actual profit; null where the book has no actual series.</summary>
    public required int? Actual { get; init; }

    /// <summary>Exceptions by hypothetical profit.</summary>
    public required int Hypothetical { get; init; }

    /// <summary>Days whose VaR is missing, each an exception of both kinds.</summary>
    public required int MissingVar { get; init; }

    /// <summary>Days whose VaR came from a backfilled run.</summary>
    public required int Backfilled { get; init; }

    /// <summary>Zone of the greater count; null below 125 days.</summary>
    public required BacktestZone? Zone { get; init; }

    /// <summary>Days counted; more than <see cref="Series"/> holds where a record leaves the series out.</summary>
    public int Days
    {
        get => _days ?? Series.Count;
        init => _days = value;
    }

    /// <summary>The greater of the two counts.</summary>
    public int Exceptions => Math.Max(Actual ?? 0, Hypothetical);
}

/// <summary>One day of the comparison. Profit is positive for a gain; a null is missing and counts as an exception.</summary>
/// <param name="Date">Date of the profit.</param>
/// <param name="Var">VaR of the previous close.</param>
/// <param name="Actual">Actual profit.</param>
/// <param name="Hypothetical">Hypothetical profit.</param>
/// <param name="Evidence">Kind of the run that the VaR is from; null where the VaR is missing.</param>
public readonly record struct BacktestDay(DateOnly Date, double? Var, double? Actual, double? Hypothetical, EvidenceKind? Evidence)
{
    /// <summary>Whether <paramref name="profit"/> is an exception against <paramref name="var"/>: a loss strictly beyond it, or either missing.</summary>
    public static bool IsException(double? var, double? profit) => var is null || profit is null || -profit.Value > var.Value;
}
