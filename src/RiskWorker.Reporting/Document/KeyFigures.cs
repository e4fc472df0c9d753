namespace RiskWorker.Reporting.Document;

/// <summary>The few figures a page rests on, large and side by side.</summary>
/// <param name="Figures">Two to four read best; more wrap into a second row.</param>
public sealed record KeyFigures(IReadOnlyList<KeyFigure> Figures) : Block;

/// <summary>One large figure.</summary>
/// <param name="Label">What it is, above it.</param>
/// <param name="Value">The figure as text.</param>
/// <param name="Unit">Its unit, small beside it; empty for none.</param>
/// <param name="Detail">What stands below it: its interval, its change.</param>
/// <param name="Mark">The status that its shape shows.</param>
public sealed record KeyFigure(string Label, string Value, string Unit, RichText Detail, StatusMark Mark = StatusMark.None);

/// <summary>Names and their values in two columns, without a head.</summary>
/// <param name="Items">The pairs, in reading order.</param>
public sealed record Facts(IReadOnlyList<Fact> Items) : Block;

/// <summary>One name and its value.</summary>
public sealed record Fact(string Name, RichText Value);
