using RiskWorker.Domain.Limits;

namespace RiskWorker.Domain.Runs;

/// <summary>The run that changes are shown against.</summary>
/// <param name="Run">Its id.</param>
/// <param name="AsOf">Its date.</param>
/// <param name="Scenarios">Its scenarios.</param>
/// <param name="Model">Its model's name.</param>
/// <param name="SettingsHash">Hash of its settings: unequal means that settings changed too.</param>
/// <param name="Nodes">Its measures by book.</param>
/// <param name="Limits">Its limits.</param>
public sealed record PreviousRun(string Run, DateOnly AsOf, int Scenarios, string Model, string SettingsHash, IReadOnlyList<PreviousNode> Nodes, IReadOnlyList<PreviousLimit> Limits);

/// <summary>A node's measures in the previous run.</summary>
public sealed record PreviousNode(string Book, double Value, IReadOnlyList<MeasureResult> Measures);

/// <summary>A limit in the previous run.</summary>
/// <param name="Limit">Its name.</param>
/// <param name="Used">Utilisation; null where it could not be decided.</param>
/// <param name="Status">Status.</param>
/// <param name="StatusSince">First as-of date of the unbroken row of runs with that status.</param>
public sealed record PreviousLimit(string Limit, double? Used, LimitStatus Status, DateOnly StatusSince);
