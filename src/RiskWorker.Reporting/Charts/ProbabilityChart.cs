namespace RiskWorker.Reporting.Charts;

/// <summary>How often the P&amp;L fell into each part of the model's own distribution: level where the model is right.</summary>
/// <param name="Counts">Days a bin, the bins equal parts of (0, 1) from the losses on.</param>
/// <param name="Low">The fewest days that are usual in a bin; null where that is not known.</param>
/// <param name="High">The most.</param>
public sealed record ProbabilityChart(IReadOnlyList<int> Counts, int? Low = null, int? High = null) : ChartSpec;
