namespace RiskWorker.Domain.Runs;

/// <summary>The scenarios of a run.</summary>
/// <param name="Scenarios">Scenarios used, N.</param>
/// <param name="Seed">Seed of the draws.</param>
/// <param name="Looks">Looks taken.</param>
/// <param name="LooksPlanned">Looks that were possible, J.</param>
/// <param name="Level">Level of every interval: 0.95, or 1 - 0.05/J.</param>
/// <param name="PrecisionReached">Whether the wanted precision was reached; null where none was asked for.</param>
/// <param name="Surfaces">What price surfaces did; null where everything was revalued fully.</param>
public sealed record SimulationSummary(int Scenarios, ulong Seed, int Looks, int LooksPlanned, double Level, bool? PrecisionReached, SurfaceSummary? Surfaces = null);

/// <summary>What price surfaces did in a run.</summary>
/// <param name="Count">Surfaces built, over all horizons.</param>
/// <param name="Options">Options of the book that they stand for.</param>
/// <param name="Scenarios">Scenarios that were valued by surface, each counted once for every node and horizon.</param>
/// <param name="Revalued">Those of them that were then revalued fully, since they might belong to a tail.</param>
public sealed record SurfaceSummary(int Count, long Options, long Scenarios, long Revalued)
{
    /// <summary>Surfaces were built, and none was used: on the scenarios that check them one lay further from full revaluation than its bound.</summary>
    public static SurfaceSummary Refused { get; } = new(0, 0, 0, 0);
}
