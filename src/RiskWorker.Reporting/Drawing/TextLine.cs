namespace RiskWorker.Reporting.Drawing;

/// <summary>A stretch of one weight on a line, at its distance from the line's left end.</summary>
internal readonly record struct TextSpan(string Text, bool Strong, float X);

/// <summary>A line that has been measured and needs no more breaking.</summary>
internal sealed record TextLine(IReadOnlyList<TextSpan> Spans, float Width);
