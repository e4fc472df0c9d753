namespace RiskWorker.Domain.Runs;

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

    /// <summary>How values in the scenarios are found.</summary>
    public RevaluationKind Revaluation { get; init; } = RevaluationKind.Surface;

    /// <summary>Largest error of a price surface, as a fraction of the gross value that it stands for.</summary>
    public double SurfaceError { get; init; } = 1e-7;

    /// <summary>Whether tails are revalued fully where surfaces are in use; then VaR, expected shortfall and their intervals are those of full revaluation to the last bit.</summary>
    public bool ExactTail { get; init; } = true;

    /// <summary>Wanted half-width of the top node's measures as a fraction of their value, or null.</summary>
    public double? Precision { get; init; }
}

/// <summary>How values in the scenarios are found.</summary>
public enum RevaluationKind
{
    /// <summary>By price surfaces, and fully in the tails.</summary>
    Surface,

    /// <summary>Fully, everywhere.</summary>
    Full,
}
