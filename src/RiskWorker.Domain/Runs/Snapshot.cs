using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;

namespace RiskWorker.Domain.Runs;

/// <summary>
/// Everything that one run reads, frozen before its first number is computed. Lists stand in canonical (ordinal) order,
/// so the order of the feed's rows is forgotten.
/// </summary>
public sealed record Snapshot
{
    /// <summary>The date that the run is for.</summary>
    public required DateOnly AsOf { get; init; }

    /// <summary>Settings that figures depend on.</summary>
    public required RunSettings Settings { get; init; }

    /// <summary>All books.</summary>
    public required IReadOnlyList<Book> Books { get; init; }

    /// <summary>All factors, by name.</summary>
    public required IReadOnlyList<Factor> Factors { get; init; }

    /// <summary>Observations up to <see cref="AsOf"/>, as observed (adjustments not applied).</summary>
    public required ObservationHistory Observations { get; init; }

    /// <summary>Splits and rolls up to <see cref="AsOf"/>.</summary>
    public required IReadOnlyList<Adjustment> Adjustments { get; init; }

    /// <summary>Holidays of every calendar.</summary>
    public required IReadOnlyList<Holiday> Holidays { get; init; }

    /// <summary>Instruments by name.</summary>
    public required IReadOnlyDictionary<string, Instrument> Instruments { get; init; }

    /// <summary>Positions at the close of <see cref="AsOf"/>, by book, instrument, trade.</summary>
    public required IReadOnlyList<Position> Positions { get; init; }

    /// <summary>Positions of the newest earlier date that has any, or null.</summary>
    public DatedPositions? Previous { get; init; }

    /// <summary>Limits, valid on the date or not.</summary>
    public required IReadOnlyList<Limit> Limits { get; init; }

    /// <summary>Rows of profit and loss up to <see cref="AsOf"/>.</summary>
    public required IReadOnlyList<ProfitAndLoss> ProfitAndLoss { get; init; }

    /// <summary>A given covariance; empty unless the settings ask for it.</summary>
    public IReadOnlyList<CovarianceEntry> Covariance { get; init; } = [];

    /// <summary>What loading the feed found odd; part of the run's findings.</summary>
    public IReadOnlyList<Finding> FeedWarnings { get; init; } = [];

    /// <summary>The earlier runs whose VaR is counted against profit and loss, oldest first.</summary>
    public IReadOnlyList<CountedRun> CountedRuns { get; init; } = [];

    /// <summary>Positions of earlier dates whose hypothetical profit no counted run holds, oldest first.</summary>
    public IReadOnlyList<DatedPositions> EarlierPositions { get; init; } = [];

    /// <summary>Hashes of the parts, and of the whole.</summary>
    public required SnapshotHash Hash { get; init; }

    /// <summary>Limits that bind on the as-of date: those of the feed, and those of the rule sets chosen.</summary>
    public IReadOnlyList<Limit> ValidLimits => [.. Limits.Concat(RuleSets.LimitsOf(Settings.Rules)).Where(l => l.IsValidOn(AsOf))];
}
