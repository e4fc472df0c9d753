namespace RiskWorker.Domain.Runs;

/// <summary>How a run ended.</summary>
public enum RunStatus
{
    /// <summary>Nothing was found.</summary>
    Complete,

    /// <summary>The figures stand, with warnings that travel with them.</summary>
    Degraded,

    /// <summary>A blocking finding stopped it: there are no figures.</summary>
    Failed,
}

/// <summary>
/// A run as it is kept for good: what went in (by hash), what came out, and all that its documents show.
/// Documents are rendered from this record alone.
/// </summary>
public sealed record RunRecord
{
    /// <summary>Id: derives from the inputs' hash and the attempt.</summary>
    public required string Run { get; init; }

    /// <summary>1 for the first run of these inputs, one more for each repetition.</summary>
    public required int Attempt { get; init; }

    /// <summary>The date that the figures are for.</summary>
    public required DateOnly AsOf { get; init; }

    /// <summary>How it ended.</summary>
    public required RunStatus Status { get; init; }

    /// <summary>Recorded before the next profit was known, or backfilled.</summary>
    public required EvidenceKind Evidence { get; init; }

    /// <summary>Start, UTC.</summary>
    public required DateTimeOffset Started { get; init; }

    /// <summary>End, UTC.</summary>
    public required DateTimeOffset Finished { get; init; }

    /// <summary>Version of the code.</summary>
    public required string Version { get; init; }

    /// <summary>Numerics epoch: raised by a change that moves bits.</summary>
    public required int Epoch { get; init; }

    /// <summary>Hash of the snapshot, as 64 hex digits.</summary>
    public required string Snapshot { get; init; }

    /// <summary>Hash of the settings that figures depend on.</summary>
    public required string SettingsHash { get; init; }

    /// <summary>Hash of each file of the snapshot.</summary>
    public required IReadOnlyList<SnapshotPart> Parts { get; init; }

    /// <summary>The command that runs it again.</summary>
    public required string Command { get; init; }

    /// <summary>The settings used.</summary>
    public required RunSettings Settings { get; init; }

    /// <summary>What was computed.</summary>
    public required RunResults Results { get; init; }

    /// <summary>Hash over the bits of nodes, limits and backtest.</summary>
    public required string Figures { get; init; }

    /// <summary>The run compared with, or null for the first.</summary>
    public PreviousRun? Previous { get; init; }

    /// <summary>Seconds by phase; not part of any hash.</summary>
    public Timings Timings { get; init; } = new(0, 0, 0, 0);
}

/// <summary>Seconds spent loading, calibrating, simulating (plan, draws, revaluation, reductions) and reporting.</summary>
public sealed record Timings(double Load, double Calibrate, double Simulate, double Report);

/// <summary>What a run computed: a pure function of its snapshot.</summary>
public sealed record RunResults
{
    /// <summary>Findings of the checks; a blocking one means that all else is empty.</summary>
    public required IReadOnlyList<Finding> Findings { get; init; }

    /// <summary>The root's display name and currency, or null where the books form no tree.</summary>
    public FirmIdentity? Firm { get; init; }

    /// <summary>The model as calibrated; null in a failed run.</summary>
    public CalibrationSummary? Calibration { get; init; }

    /// <summary>How many scenarios were drawn, and why so many; null in a failed run.</summary>
    public SimulationSummary? Simulation { get; init; }

    /// <summary>Nodes in depth-first order.</summary>
    public IReadOnlyList<NodeResult> Nodes { get; init; } = [];

    /// <summary>Limits valid on the date, by name.</summary>
    public IReadOnlyList<LimitResult> Limits { get; init; } = [];

    /// <summary>Exception counts by book and confidence.</summary>
    public IReadOnlyList<BacktestResult> Backtest { get; init; } = [];

    /// <summary>Hypothetical profit from the close before to this one; null where there is none.</summary>
    public HypotheticalProfit? Hypothetical { get; init; }

    /// <summary>What was held, what was priced, and how it ties to the book of record.</summary>
    public Holdings Holdings { get; init; } = new();

    /// <summary>Splits and rolls that were applied to the history used.</summary>
    public IReadOnlyList<AppliedAdjustment> Adjustments { get; init; } = [];
}

/// <summary>The firm as reports head it.</summary>
public sealed record FirmIdentity(string Name, string ReportingCurrency);

/// <summary>A split or roll that changed prices of the history.</summary>
public sealed record AppliedAdjustment(string Factor, DateOnly Date, double Ratio, string? Reason);

/// <summary>The model after calibration.</summary>
public sealed record CalibrationSummary
{
    /// <summary>Complete days of shocks that entered the covariance.</summary>
    public required int Shocks { get; init; }

    /// <summary>Days of the window that were dropped because a factor was not observed.</summary>
    public required int DroppedDays { get; init; }

    /// <summary>First and last date of the shocks used; null for a given covariance.</summary>
    public DateOnly? From { get; init; }

    /// <summary>See <see cref="From"/>.</summary>
    public DateOnly? To { get; init; }

    /// <summary>Factors in the model.</summary>
    public required int Factors { get; init; }

    /// <summary>Factors whose variance is zero.</summary>
    public required int Still { get; init; }

    /// <summary>Rank of the correlation matrix.</summary>
    public required int Rank { get; init; }

    /// <summary>Frobenius distance to the nearest correlation matrix, or null where no repair was needed.</summary>
    public double? RepairDistance { get; init; }

    /// <summary>Hash of the compiled plan.</summary>
    public required string Plan { get; init; }
}

/// <summary>The scenarios of a run.</summary>
/// <param name="Scenarios">Scenarios used, N.</param>
/// <param name="Seed">Seed of the draws.</param>
/// <param name="Looks">Looks taken.</param>
/// <param name="LooksPlanned">Looks that were possible, J.</param>
/// <param name="Level">Level of every interval: 0.95, or 1 - 0.05/J.</param>
/// <param name="PrecisionReached">Whether the wanted precision was reached; null where none was asked for.</param>
public sealed record SimulationSummary(int Scenarios, ulong Seed, int Looks, int LooksPlanned, double Level, bool? PrecisionReached);

/// <summary>A measure with its sampling interval. Positive is a loss.</summary>
/// <param name="Spec">What is measured.</param>
/// <param name="Value">The estimate.</param>
/// <param name="Low">Lower end; null where its rank lies outside the sample.</param>
/// <param name="High">Upper end; null where its rank lies outside the sample.</param>
/// <param name="Level">Level of the interval.</param>
public sealed record MeasureResult(MeasureSpec Spec, double Value, double? Low, double? High, double Level);

/// <summary>A node of the tree with its figures.</summary>
public sealed record NodeResult
{
    /// <summary>The book.</summary>
    public required string Book { get; init; }

    /// <summary>Its display name.</summary>
    public required string Name { get; init; }

    /// <summary>Its parent; null for the root.</summary>
    public required string? Parent { get; init; }

    /// <summary>Steps from the root.</summary>
    public required int Depth { get; init; }

    /// <summary>Currency of its figures.</summary>
    public required string Currency { get; init; }

    /// <summary>Value today.</summary>
    public required double Value { get; init; }

    /// <summary>Value today in the reporting currency.</summary>
    public required double ValueRoot { get; init; }

    /// <summary>Positions held on the node itself, its children's left out.</summary>
    public required int Positions { get; init; }

    /// <summary>Measures in the node's currency.</summary>
    public required IReadOnlyList<MeasureResult> Measures { get; init; }

    /// <summary>Measures in the reporting currency; null where that is the node's own.</summary>
    public IReadOnlyList<MeasureResult>? MeasuresRoot { get; init; }

    /// <summary>Distribution of profit by horizon, in the node's currency.</summary>
    public required IReadOnlyList<ProfitDistribution> Distributions { get; init; }

    /// <summary>The measures in the reporting currency, whichever list holds them.</summary>
    public IReadOnlyList<MeasureResult> InReportingCurrency => MeasuresRoot ?? Measures;
}

/// <summary>The simulated distribution of a node's profit at one horizon.</summary>
public sealed record ProfitDistribution
{
    /// <summary>Horizon in business days.</summary>
    public required Horizon Horizon { get; init; }

    /// <summary>Mean profit.</summary>
    public required double Mean { get; init; }

    /// <summary>Standard deviation of profit (divisor n).</summary>
    public required double Deviation { get; init; }

    /// <summary>Profit at the lower edge of the first inner bin.</summary>
    public required double Low { get; init; }

    /// <summary>Profit at the upper edge of the last inner bin.</summary>
    public required double High { get; init; }

    /// <summary>Scenario counts: below <see cref="Low"/>, the equal inner bins, at or above <see cref="High"/>.</summary>
    public required IReadOnlyList<long> Counts { get; init; }

    /// <summary>About 200 quantiles of profit, probabilities ascending, dense in the loss tail.</summary>
    public required IReadOnlyList<Quantile> Quantiles { get; init; }
}

/// <summary>Profit that is not exceeded with a probability.</summary>
/// <param name="Probability">In (0, 1).</param>
/// <param name="Profit">The profit, in the node's currency.</param>
/// <param name="Exact">True for an order statistic, false where it is interpolated within a histogram bin.</param>
public readonly record struct Quantile(double Probability, double Profit, bool Exact);

/// <summary>What was held.</summary>
public sealed record Holdings
{
    /// <summary>Position rows.</summary>
    public int Positions { get; init; }

    /// <summary>Position rows that are in the figures.</summary>
    public int Priced { get; init; }

    /// <summary>Sum of absolute values of the priced lines, in the reporting currency.</summary>
    public double GrossValue { get; init; }

    /// <summary>The same for the previous date with positions; null where there is none.</summary>
    public double? PreviousGrossValue { get; init; }

    /// <summary>Rows that carried a market value of the book of record.</summary>
    public int Reconciled { get; init; }

    /// <summary>Of those, the rows whose model value differs by more than the tolerance.</summary>
    public IReadOnlyList<ReconciliationBreak> Breaks { get; init; } = [];

    /// <summary>Sum of the absolute differences of those rows, in the reporting currency; zero is shown too.</summary>
    public double BreakTotal { get; init; }

    /// <summary>Lines outside the figures, largest first.</summary>
    public IReadOnlyList<UnpricedLine> Unpriced { get; init; } = [];
}

/// <summary>A line whose model value differs from the book of record's, both in the instrument's currency.</summary>
public sealed record ReconciliationBreak(string Book, string Instrument, string Currency, double ModelValue, double MarketValue);

/// <summary>A line that no figure holds.</summary>
/// <param name="Book">Node that holds it.</param>
/// <param name="Instrument">What it is.</param>
/// <param name="Kind">Its kind, or '-' where the instrument is unknown.</param>
/// <param name="Quantity">Units held.</param>
/// <param name="Size">Estimated size in the reporting currency: the market value given, else quantity times strike, notional or price; null where nothing gives one.</param>
/// <param name="Reason">Why it is left out.</param>
public sealed record UnpricedLine(string Book, string Instrument, string Kind, double Quantity, double? Size, string Reason);

/// <summary>Profit of the positions of <paramref name="From"/>, unchanged, to the prices of <paramref name="To"/>; by book in the book's currency.</summary>
public sealed record HypotheticalProfit(DateOnly From, DateOnly To, IReadOnlyList<BookAmount> Books);

/// <summary>The run that changes are shown against.</summary>
/// <param name="Run">Its id.</param>
/// <param name="AsOf">Its date.</param>
/// <param name="Scenarios">Its scenarios.</param>
/// <param name="Model">Its model's name.</param>
/// <param name="SettingsHash">Hash of its settings: unequal means that settings changed too.</param>
/// <param name="Nodes">Its measures by book.</param>
/// <param name="Limits">Its limits.</param>
public sealed record PreviousRun(string Run, DateOnly AsOf, int Scenarios, string Model, string SettingsHash, IReadOnlyList<PreviousNode> Nodes, IReadOnlyList<PreviousLimit> Limits);

/// <summary>A node's measures in the previous run.</summary>
public sealed record PreviousNode(string Book, double Value, IReadOnlyList<MeasureResult> Measures);

/// <summary>A limit in the previous run.</summary>
/// <param name="Limit">Its name.</param>
/// <param name="Used">Utilisation; null where it could not be decided.</param>
/// <param name="Status">Status.</param>
/// <param name="StatusSince">First as-of date of the unbroken row of runs with that status.</param>
public sealed record PreviousLimit(string Limit, double? Used, Limits.LimitStatus Status, DateOnly StatusSince);
