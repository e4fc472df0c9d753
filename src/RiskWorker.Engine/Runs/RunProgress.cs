namespace RiskWorker.Engine.Runs;

/// <summary>How far a run has come.</summary>
/// <param name="Phase">What is being done.</param>
/// <param name="Done">Scenarios of that look that are drawn.</param>
/// <param name="Planned">Scenarios of the look that is under way.</param>
public readonly record struct RunProgress(string Phase, long Done, long Planned);
