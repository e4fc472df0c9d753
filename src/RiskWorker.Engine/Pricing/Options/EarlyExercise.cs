namespace RiskWorker.Engine.Pricing.Options;

/// <summary>What exercising an option at once brings: the spot less a strike, or the other way round.</summary>
/// <param name="Strike">What is paid or received for the underlying.</param>
/// <param name="Sign">1 for a call, exercised at high spots; -1 for a put, exercised at low ones.</param>
public readonly record struct EarlyExercise(double Strike, int Sign);
