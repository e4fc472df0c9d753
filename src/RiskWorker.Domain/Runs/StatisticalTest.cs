namespace RiskWorker.Domain.Runs;

/// <summary>How a p-value was found.</summary>
public enum PValueMethod
{
    /// <summary>From the law of the statistic for this number of days: an enumeration, or a formula without simulation.</summary>
    Exact,

    /// <summary>From the law that the statistic tends to as days grow.</summary>
    Asymptotic,

    /// <summary>From series drawn under the model: (those as extreme + 1) / (series + 1).</summary>
    Simulated,
}

/// <summary>A test of a model against what happened. Figures are rounded to 12 significant digits.</summary>
public sealed record StatisticalTest
{
    /// <summary>Largest p-value that rejects.</summary>
    public const double Level = 0.05;

    /// <summary>One of <see cref="StatisticalTestNames"/>.</summary>
    public required string Name { get; init; }

    /// <summary>The statistic; null where it has no value.</summary>
    public double? Statistic { get; init; }

    /// <summary>The probability of a statistic as extreme, were the model right; null where it cannot be assessed.</summary>
    public double? PValue { get; init; }

    /// <summary>How the p-value was found; null without one.</summary>
    public PValueMethod? Method { get; init; }

    /// <summary>The paper or paragraph that the test is from.</summary>
    public required string Source { get; init; }

    /// <summary>What a reader must know of this result: another convention's figure, what could not be assessed and why. Empty where there is nothing.</summary>
    public string Note { get; init; } = "";

    /// <summary>Whether the test rejects at 5%; null where it cannot be assessed.</summary>
    public bool? Reject => PValue is { } p ? p <= Level : null;
}
