using RiskWorker.Reporting.Charts;

namespace RiskWorker.Reporting.Document;

/// <summary>A chart with the sentence that says what it shows.</summary>
/// <param name="Title">What the chart shows.</param>
/// <param name="Chart">The chart's data.</param>
/// <param name="Height">The chart's height in points, without title and caption.</param>
/// <param name="Caption">A remark below it; empty for none.</param>
public sealed record Figure(string Title, ChartSpec Chart, float Height, string Caption = "") : Block;
