namespace RiskWorker.Domain.Runs;

/// <summary>A model as named in the settings.</summary>
public sealed record ModelSettings
{
    /// <summary>Its name in the settings.</summary>
    public string Name { get; init; } = "lognormal";

    /// <summary>Its kind.</summary>
    public ModelKind Kind { get; init; }

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

    /// <summary>What becomes of days on which a factor has no shock.</summary>
    public MissingDays MissingDays { get; init; }

    /// <summary>Degrees of freedom of <see cref="ModelKind.StudentT"/>, above 2; null where they are fitted by profile likelihood.</summary>
    public double? DegreesOfFreedom { get; init; }

    /// <summary>Margins of <see cref="ModelKind.StudentT"/>.</summary>
    public StudentMargins Margins { get; init; }

    /// <summary>Decay per day of the weights of <see cref="ModelKind.Historical"/>, in (0, 1); null where all days weigh the same.</summary>
    public double? AgeWeight { get; init; }

    /// <summary>What says how volatile a day was in <see cref="ModelKind.FilteredHistorical"/>.</summary>
    public VolatilityFilter Volatility { get; init; }

    /// <summary>The jumps of <see cref="ModelKind.JumpDiffusion"/>.</summary>
    public JumpSettings Jumps { get; init; } = new();

    /// <summary>The model that <see cref="ModelKind.Stressed"/> calibrates to the worst span of the history; null for every other kind.</summary>
    public ModelSettings? Stressed { get; init; }

    /// <summary>Length of that span in days of shocks.</summary>
    public int Span { get; init; } = 250;

    /// <summary>Whether the valuation date moves with the horizon; for a stressed model what the one that it calibrates says.</summary>
    public AgeingKind Ageing { get; init; } = AgeingKind.None;

    /// <summary>Whether the valuation date moves.</summary>
    public bool Ages => (Stressed ?? this).Ageing == AgeingKind.Horizon;
}

/// <summary>What becomes of the valuation date over a horizon.</summary>
public enum AgeingKind
{
    /// <summary>It stays: shocks are instantaneous, and nothing expires or pays.</summary>
    None,

    /// <summary>It moves by the horizon: what expires, is fixed or pays inside does so.</summary>
    Horizon,
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

    /// <summary>Equal weights, the correlation shrunk towards independence (Ledoit and Wolf 2004).</summary>
    Shrunk,
}

/// <summary>What becomes of days on which a factor has no shock.</summary>
public enum MissingDays
{
    /// <summary>Only days complete over all factors are used.</summary>
    Complete,

    /// <summary>Every pair of factors uses the days that both have; what comes out may need repair.</summary>
    Pairwise,
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
