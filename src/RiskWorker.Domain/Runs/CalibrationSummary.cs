namespace RiskWorker.Domain.Runs;

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

    /// <summary>What the model was calibrated to, or given, beyond deviations and correlation.</summary>
    public IReadOnlyList<ModelParameter> Parameters { get; init; } = [];

    /// <summary>Hash of the compiled plan.</summary>
    public required string Plan { get; init; }
}
