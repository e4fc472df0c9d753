namespace RiskWorker.Domain.Runs;

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

    /// <summary>Sensitivities by node and factor: nodes depth first, then by measure, curve, tenor and factor; empty in a run that is evidence only.</summary>
    public IReadOnlyList<Sensitivity> Sensitivities { get; init; } = [];

    /// <summary>Exception counts by book and confidence.</summary>
    public IReadOnlyList<BacktestResult> Backtest { get; init; } = [];

    /// <summary>Models beside the one of record, by name.</summary>
    public IReadOnlyList<ModelResult> Models { get; init; } = [];

    /// <summary>How the model of record and the others stood up over 250 and 500 days, in that order of models; empty where there are no others.</summary>
    public IReadOnlyList<ModelBacktest> ModelBacktests { get; init; } = [];

    /// <summary>What the choices behind the figures do; null in a run without challengers and in one that is evidence only.</summary>
    public RunEffects? Effects { get; init; }

    /// <summary>Hypothetical profit from the close before to this one; null where there is none.</summary>
    public HypotheticalProfit? Hypothetical { get; init; }

    /// <summary>What was held, what was priced, and how it ties to the book of record.</summary>
    public Holdings Holdings { get; init; } = new();

    /// <summary>How the kinds held were valued, in the order of the table in the code; empty in a failed run and in records of versions without it.</summary>
    public IReadOnlyList<ValuationMethod> Methods { get; init; } = [];

    /// <summary>Splits and rolls that were applied to the history used.</summary>
    public IReadOnlyList<AppliedAdjustment> Adjustments { get; init; } = [];
}

/// <summary>The firm as reports head it.</summary>
public sealed record FirmIdentity(string Name, string ReportingCurrency);

/// <summary>A split or roll that changed prices of the history.</summary>
public sealed record AppliedAdjustment(string Factor, DateOnly Date, double Ratio, string? Reason);

/// <summary>Profit of the positions of <paramref name="From"/>, unchanged, to the prices of <paramref name="To"/>; by book in the book's currency.</summary>
public sealed record HypotheticalProfit(DateOnly From, DateOnly To, IReadOnlyList<BookAmount> Books);
