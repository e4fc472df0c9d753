namespace RiskWorker.Domain.Runs;

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

    /// <summary>How far prices found by numerical methods may carry its value, in its currency; null where none of its positions has such a price.</summary>
    public PriceError? PriceError { get; init; }

    /// <summary>Distribution of profit by horizon, in the node's currency.</summary>
    public required IReadOnlyList<ProfitDistribution> Distributions { get; init; }

    /// <summary>The measures in the reporting currency, whichever list holds them.</summary>
    public IReadOnlyList<MeasureResult> InReportingCurrency => MeasuresRoot ?? Measures;
}

/// <summary>The error of prices found by numerical methods, in the currency of a node: position by position, added without regard to sign.</summary>
/// <param name="Table">Largest error of the tables that scenarios are valued by.</param>
/// <param name="Standard">Standard error of those prices that are simulated; they share their draws, so it adds up instead of averaging out.</param>
public sealed record PriceError(double Table, double Standard);

/// <summary>A measure with its sampling interval. Positive is a loss.</summary>
/// <param name="Spec">What is measured.</param>
/// <param name="Value">The estimate.</param>
/// <param name="Low">Lower end; null where its rank lies outside the sample.</param>
/// <param name="High">Upper end; null where its rank lies outside the sample.</param>
/// <param name="Level">Level of the interval.</param>
public sealed record MeasureResult(MeasureSpec Spec, double Value, double? Low, double? High, double Level)
{
    /// <summary>What the days of a history, taken as a sample, say of the law behind them, at the same level; null for a measure that is simulated.</summary>
    public SampleInterval? Sample { get; init; }
}

/// <summary>An interval from a sample of past days; it stands outside the status of limits.</summary>
/// <param name="Low">Lower end; null where no order statistic reaches, or none is claimed.</param>
/// <param name="High">Upper end; null where no order statistic reaches, or none is claimed.</param>
public sealed record SampleInterval(double? Low, double? High);
