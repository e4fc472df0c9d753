using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Evidence;

/// <summary>A book at one confidence against one kind of profit.</summary>
public sealed record BacktestSeries
{
    /// <summary>The book.</summary>
    public required string Book { get; init; }

    /// <summary>Its display name.</summary>
    public required string Name { get; init; }

    /// <summary>Steps from the root.</summary>
    public required int Depth { get; init; }

    /// <summary>Currency of VaR and profit.</summary>
    public required string Currency { get; init; }

    /// <summary>Confidence of VaR and ES.</summary>
    public required Confidence Confidence { get; init; }

    /// <summary>Which profit.</summary>
    public required ProfitKind Profit { get; init; }

    /// <summary>The days, oldest first.</summary>
    public required IReadOnlyList<EvidenceDay> Days { get; init; }

    /// <summary>Exceptions among them, missing VaR and missing profit included.</summary>
    public required int Count { get; init; }

    /// <summary>Exceptions that the confidence lets expect.</summary>
    public required double Expected { get; init; }

    /// <summary>Zone of the count; null below 125 days.</summary>
    public required BacktestZone? Zone { get; init; }

    /// <summary>The supervisory add-on that the count gives at 99% and 250 days or as many days' equivalent; null where there is none.</summary>
    public required double? Multiplier { get; init; }

    /// <summary>Whether the count keeps the desk limit of 250 days (12 at 99%, 30 at 97.5%); null at another confidence or number of days.</summary>
    public required bool? KeepsDeskLimit { get; init; }

    /// <summary>The tests, in their fixed order.</summary>
    public required IReadOnlyList<StatisticalTest> Tests { get; init; }

    /// <summary>Counts of the probabilities of profits in ten equal bins; empty where none is known.</summary>
    public IReadOnlyList<int> Probabilities { get; init; } = [];
}

/// <summary>A day of a series. A null is missing and makes the day an exception.</summary>
/// <param name="Date">Date of the profit.</param>
/// <param name="Var">VaR of the previous close.</param>
/// <param name="Es">Expected shortfall of the previous close at the same confidence; null where it was not measured.</param>
/// <param name="Profit">The profit.</param>
/// <param name="P">Probability under the model of a profit at or below it; null where not known.</param>
/// <param name="Exception">Whether the loss is beyond the VaR, or either is missing.</param>
public readonly record struct EvidenceDay(DateOnly Date, double? Var, double? Es, double? Profit, double? P, bool Exception);
