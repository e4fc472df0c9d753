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

    /// <summary>Wanted half-width of the top node's measures as a fraction of their value, or null.</summary>
    public double? Precision { get; init; }
}
