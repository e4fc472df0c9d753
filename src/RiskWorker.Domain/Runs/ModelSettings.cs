namespace RiskWorker.Domain.Runs;

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

    /// <summary>Whether the valuation date moves with the horizon.</summary>
    public AgeingKind Ageing { get; init; } = AgeingKind.None;
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
