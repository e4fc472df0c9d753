namespace RiskWorker.Domain.Runs;

/// <summary>Everything in the settings that a run's figures may depend on; part of the snapshot and of its hash.</summary>
public sealed record RunSettings
{
    /// <summary>The model of record.</summary>
    public ModelSettings Model { get; init; } = new();

    /// <summary>The measures to compute, in the order of <see cref="MeasureSpec.CompareTo"/>; those that valid limits name are added by the run.</summary>
    public IReadOnlyList<MeasureSpec> Measures { get; init; } =
        [new(MeasureKind.Var, new(0.99m), new(1)), new(MeasureKind.Es, new(0.975m), new(1))];

    /// <summary>How many scenarios, from which seed, and how far looks may go.</summary>
    public SimulationSettings Simulation { get; init; } = new();

    /// <summary>Thresholds and severities of the checks.</summary>
    public CheckSettings Checks { get; init; } = new();

    /// <summary>Whether hypothetical profit moves the valuation date too.</summary>
    public bool TimeEffectsIncluded { get; init; }
}

/// <summary>Where a model's covariance comes from.</summary>
public enum CovarianceEstimator
{
    /// <summary>Exponentially weighted, zero mean, weights normalised over the window.</summary>
    Ewma,

    /// <summary>Equal weights, divisor n.</summary>
    Equal,

    /// <summary>Read from <c>covariance.csv</c>.</summary>
    Given,
}

/// <summary>The expected move of a factor.</summary>
public enum DriftKind
{
    /// <summary>Zero expected arithmetic return: a log-drift of -sigma²/2.</summary>
    Zero,

    /// <summary>The mean shock of the window.</summary>
    Historical,

    /// <summary>Given per factor and year.</summary>
    Explicit,
}

/// <summary>A model as named in the settings.</summary>
public sealed record ModelSettings
{
    /// <summary>Its name in the settings.</summary>
    public string Name { get; init; } = "lognormal";

    /// <summary>Its kind; <c>lognormal</c> is the correlated log-normal model.</summary>
    public string Kind { get; init; } = "lognormal";

    /// <summary>How the covariance of daily shocks is found.</summary>
    public CovarianceEstimator Covariance { get; init; } = CovarianceEstimator.Ewma;

    /// <summary>Decay per day of the exponential weights, in (0, 1).</summary>
    public double Lambda { get; init; } = 0.94;

    /// <summary>Number of shocks used, newest first.</summary>
    public int Window { get; init; } = 500;

    /// <summary>Expected moves.</summary>
    public DriftKind Drift { get; init; } = DriftKind.Zero;

    /// <summary>Expected arithmetic return per year of 252 business days by factor, for <see cref="DriftKind.Explicit"/>; factors left out have 0.</summary>
    public IReadOnlyDictionary<string, double> Drifts { get; init; } = new SortedDictionary<string, double>(StringComparer.Ordinal);
}

/// <summary>Scenarios, seed and looks.</summary>
public sealed record SimulationSettings
{
    /// <summary>Scenarios of the first look, N0.</summary>
    public int Scenarios { get; init; } = 100_000;

    /// <summary>Seed of every draw.</summary>
    public ulong Seed { get; init; } = 1;

    /// <summary>Most looks that a run may take at N0·2^j.</summary>
    public int Looks { get; init; } = 5;

    /// <summary>Most scenarios that a run may use.</summary>
    public int Cap { get; init; } = 1_600_000;

    /// <summary>Wanted half-width of the top node's measures as a fraction of their value, or null.</summary>
    public double? Precision { get; init; }
}

/// <summary>Thresholds and severities of the checks.</summary>
public sealed record CheckSettings
{
    /// <summary>Business days without a change from which a price counts as stale.</summary>
    public int StaleDays { get; init; } = 3;

    /// <summary>Standard deviations of the other days from which a move counts as a jump.</summary>
    public double JumpSigmas { get; init; } = 8;

    /// <summary>Shocks below which a factor has too little history.</summary>
    public int MinimumHistory { get; init; } = 60;

    /// <summary>Relative difference between model value and market value that is let pass.</summary>
    public double ValueTolerance { get; init; } = 0.01;

    /// <summary>Relative change of a book's gross value against the previous date that is let pass.</summary>
    public double GrossChange { get; init; } = 0.5;

    /// <summary>Severity by finding code, where the settings change it.</summary>
    public IReadOnlyDictionary<string, FindingSeverity> Severity { get; init; } = new SortedDictionary<string, FindingSeverity>(StringComparer.Ordinal);
}
