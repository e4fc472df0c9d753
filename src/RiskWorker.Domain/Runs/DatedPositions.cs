using RiskWorker.Domain.Books;

namespace RiskWorker.Domain.Runs;

/// <summary>The positions at the close of one date.</summary>
public sealed record DatedPositions(DateOnly Date, IReadOnlyList<Position> Positions);
