namespace RiskWorker.Engine.Models;

/// <summary>Normal shocks: the exact solution of correlated geometric Brownian motions, and normal moves of rates and spreads from the same draw.</summary>
public sealed record LognormalLaw : ScenarioLaw
{
    /// <summary>The law, which has no number of its own.</summary>
    public static LognormalLaw Instance { get; } = new();

    /// <inheritdoc/>
    public override bool GivesShocks => false;

    /// <inheritdoc/>
    public override bool HasPaths => true;

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [];
}
