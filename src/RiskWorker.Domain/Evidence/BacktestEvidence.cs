using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Evidence;

/// <summary>All that an evidence report shows: documents are made from it alone.</summary>
public sealed record BacktestEvidence
{
    /// <summary>Where the figures come from.</summary>
    public required BacktestKind Kind { get; init; }

    /// <summary>Positions of a walk-forward; null for the other kinds, whose runs had their own.</summary>
    public BacktestPositions? Positions { get; init; }

    /// <summary>First day of profit.</summary>
    public required DateOnly From { get; init; }

    /// <summary>Last day of profit.</summary>
    public required DateOnly To { get; init; }

    /// <summary>The firm.</summary>
    public required FirmIdentity Firm { get; init; }

    /// <summary>The model.</summary>
    public required ModelSettings Model { get; init; }

    /// <summary>Scenarios of a day's figures; null where they differ or there are none.</summary>
    public int? Scenarios { get; init; }

    /// <summary>The series: books depth first, confidences ascending, then kinds of profit.</summary>
    public required IReadOnlyList<BacktestSeries> Series { get; init; }

    /// <summary>Every exception, the unexplained ones first, then by date and book.</summary>
    public IReadOnlyList<ExceptionEntry> Exceptions { get; init; } = [];

    /// <summary>Other models over the same days, by name.</summary>
    public IReadOnlyList<ModelCount> Models { get; init; } = [];

    /// <summary>The runs whose figures are counted, by date; empty for a walk-forward.</summary>
    public IReadOnlyList<EvidenceRun> Runs { get; init; } = [];

    /// <summary>Hash of the inputs: of the counted runs' records, or of what the walk-forward read.</summary>
    public required string Inputs { get; init; }

    /// <summary>The command that makes it again.</summary>
    public required string Command { get; init; }

    /// <summary>When it was made, UTC.</summary>
    public required DateTimeOffset Made { get; init; }

    /// <summary>Version of the code.</summary>
    public required string Version { get; init; }

    /// <summary>Numerics epoch.</summary>
    public required int Epoch { get; init; }
}

/// <summary>A model's count over the same days.</summary>
/// <param name="Model">The model.</param>
/// <param name="Book">The book.</param>
/// <param name="Confidence">The confidence.</param>
/// <param name="Days">Days counted.</param>
/// <param name="Exceptions">Exceptions by hypothetical profit.</param>
/// <param name="Zone">Zone of the count.</param>
/// <param name="MeanVar">Mean VaR over the days.</param>
public sealed record ModelCount(string Model, string Book, Confidence Confidence, int Days, int Exceptions, BacktestZone? Zone, double MeanVar);

/// <summary>A run whose figures are counted.</summary>
/// <param name="AsOf">Its date.</param>
/// <param name="Run">Its id.</param>
/// <param name="Hash">Hash of its record.</param>
/// <param name="Evidence">Recorded or backfilled.</param>
public sealed record EvidenceRun(DateOnly AsOf, string Run, string Hash, EvidenceKind Evidence);
