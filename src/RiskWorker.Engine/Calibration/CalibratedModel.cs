using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Models;

namespace RiskWorker.Engine.Calibration;

/// <summary>
/// The law of the factors' moves. Over h business days factor j moves by h·drift_j + sqrt(h)·deviation_j·z_j, of the logarithm for a
/// lognormal factor, of the value for a normal one; z = L e with e independent standard normals, one e for all horizons, and
/// z_j = 0 for a factor that is not among <see cref="Moving"/>.
/// </summary>
public sealed record CalibratedModel
{
    /// <summary>The factors, in ordinal order of their names.</summary>
    public required IReadOnlyList<Factor> Factors { get; init; }

    /// <summary>Value today of each factor: its last adjusted observation on an open day of its calendar.</summary>
    public required double[] Levels { get; init; }

    /// <summary>Date of each level.</summary>
    public required DateOnly[] LevelDates { get; init; }

    /// <summary>Standard deviation of each factor's daily shock.</summary>
    public required double[] Deviations { get; init; }

    /// <summary>Expected daily shock of each factor.</summary>
    public required double[] DailyDrift { get; init; }

    /// <summary>The factors of positive variance, in pivot order: row k of <see cref="Lower"/> is the factor Moving[k].</summary>
    public required int[] Moving { get; init; }

    /// <summary>Rank of the correlation matrix: normals needed a scenario.</summary>
    public required int Rank { get; init; }

    /// <summary>L, the lower trapezoidal factor of the correlation of the moving factors: Moving.Length × Rank, row-major, zeros above the diagonal.</summary>
    public required double[] Lower { get; init; }

    /// <summary>Whether the valuation date moves with the horizon.</summary>
    public bool Ages { get; init; }

    /// <summary>How the moves are distributed jointly.</summary>
    public ScenarioLaw Law { get; init; } = LognormalLaw.Instance;

    /// <summary>What the estimator of the covariance found besides.</summary>
    public IReadOnlyList<ModelParameter> Parameters { get; init; } = [];

    /// <summary>Frobenius distance from the correlation matrix found to the nearest one, or null where it needed no repair.</summary>
    public double? RepairDistance { get; init; }

    /// <summary>Days of shocks that entered the covariance; 0 for a given one.</summary>
    public int Shocks { get; init; }

    /// <summary>First day of the shocks used; null where none was.</summary>
    public DateOnly? From { get; init; }

    /// <summary>Last day of the shocks used; null where none was.</summary>
    public DateOnly? To { get; init; }

    /// <summary>Days after the first one used that were dropped because a factor has no shock.</summary>
    public IReadOnlyList<DateOnly> DroppedDays { get; init; } = [];

    /// <summary>The ten factors that most of the dropped days are owed to.</summary>
    public IReadOnlyList<DropCause> DropCauses { get; init; } = [];

    /// <summary>Proxies whose shocks stand in the window.</summary>
    public IReadOnlyList<UsedProxy> Proxies { get; init; } = [];

    /// <summary>Splits and rolls that changed a value used, by factor and date.</summary>
    public IReadOnlyList<AppliedAdjustment> Adjustments { get; init; } = [];

    /// <summary>Observations of the whole history that were left out because the factor's calendar is closed on their day.</summary>
    public int ClosedDayObservations { get; init; }
}

/// <summary>A proxy whose shocks stand for a factor's on the days before its own first shock.</summary>
/// <param name="Factor">The factor.</param>
/// <param name="Proxy">Whose shocks are used.</param>
/// <param name="Beta">The multiple of them.</param>
/// <param name="Days">Days of the window that are filled.</param>
/// <param name="Share">Those days as a fraction of the window.</param>
public readonly record struct UsedProxy(string Factor, string Proxy, double Beta, int Days, double Share);
