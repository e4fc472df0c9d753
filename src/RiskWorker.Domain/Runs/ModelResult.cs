namespace RiskWorker.Domain.Runs;

/// <summary>What a model that runs beside the one of record says on the same positions and date.</summary>
public sealed record ModelResult
{
    /// <summary>Its name in the settings.</summary>
    public required string Name { get; init; }

    /// <summary>Its kind.</summary>
    public required ModelKind Kind { get; init; }

    /// <summary>The model after calibration; null where that failed.</summary>
    public CalibrationSummary? Calibration { get; init; }

    /// <summary>Its scenarios; null where calibration failed.</summary>
    public SimulationSummary? Simulation { get; init; }

    /// <summary>Its measures by node, in the order of the run's nodes.</summary>
    public IReadOnlyList<ModelNode> Nodes { get; init; } = [];
}

/// <summary>A node's measures under one model.</summary>
/// <param name="Book">The book.</param>
/// <param name="Currency">Currency of the figures.</param>
/// <param name="Measures">The measures.</param>
public sealed record ModelNode(string Book, string Currency, IReadOnlyList<MeasureResult> Measures);

/// <summary>A number that a model was calibrated to or given.</summary>
/// <param name="Name">What it is, in the words of the field.</param>
/// <param name="Value">Its value.</param>
/// <param name="Low">Lower end of its interval, where one is claimed.</param>
/// <param name="High">Upper end of its interval, where one is claimed.</param>
/// <param name="Note">What a reader must know of it, or null.</param>
public sealed record ModelParameter(string Name, double Value, double? Low = null, double? High = null, string? Note = null);

/// <summary>How a model's one-day VaR stood up over the newest days of its evidence.</summary>
public sealed record ModelBacktest
{
    /// <summary>The model.</summary>
    public required string Model { get; init; }

    /// <summary>The book.</summary>
    public required string Book { get; init; }

    /// <summary>Confidence of the VaR.</summary>
    public required Confidence Confidence { get; init; }

    /// <summary>Days asked for: 250 or 500.</summary>
    public required int Window { get; init; }

    /// <summary>Days counted, at most <see cref="Window"/>.</summary>
    public required int Days { get; init; }

    /// <summary>Days whose loss was beyond the VaR, by the greater of actual and hypothetical profit.</summary>
    public required int Exceptions { get; init; }

    /// <summary>Zone of the count; null below 125 days.</summary>
    public required BacktestZone? Zone { get; init; }

    /// <summary>Whether exceptions are as many as the confidence says (Kupiec 1995); null without days.</summary>
    public TestResult? Coverage { get; init; }

    /// <summary>Whether they come independently of one another (Christoffersen 1998); null below two days.</summary>
    public TestResult? Independence { get; init; }

    /// <summary>Both together; null below two days.</summary>
    public TestResult? Conditional { get; init; }
}

/// <summary>A statistical test.</summary>
/// <param name="Statistic">The likelihood ratio, rounded to 12 significant digits.</param>
/// <param name="PValue">The probability of one as large, by the asymptotic chi-square law, rounded to 12 significant digits.</param>
public sealed record TestResult(double Statistic, double PValue);
