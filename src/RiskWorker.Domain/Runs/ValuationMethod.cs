namespace RiskWorker.Domain.Runs;

/// <summary>How the lines of one kind that a run held were valued.</summary>
/// <param name="Kind">The kind, or the kinds that the row speaks of.</param>
/// <param name="Model">What is assumed of the market.</param>
/// <param name="Method">How the value is computed, with the error measured where one was.</param>
/// <param name="Source">Paper or rule that the formula is from.</param>
/// <param name="Caution">Where it should not be trusted.</param>
/// <param name="Lines">Priced position rows that it speaks of.</param>
public sealed record ValuationMethod(string Kind, string Model, string Method, string Source, string Caution, int Lines);
