namespace RiskWorker.Domain.Runs;

/// <summary>The scenarios of a run.</summary>
/// <param name="Scenarios">Scenarios used, N.</param>
/// <param name="Seed">Seed of the draws.</param>
/// <param name="Looks">Looks taken.</param>
/// <param name="LooksPlanned">Looks that were possible, J.</param>
/// <param name="Level">Level of every interval: 0.95, or 1 - 0.05/J.</param>
/// <param name="PrecisionReached">Whether the wanted precision was reached; null where none was asked for.</param>
public sealed record SimulationSummary(int Scenarios, ulong Seed, int Looks, int LooksPlanned, double Level, bool? PrecisionReached);
