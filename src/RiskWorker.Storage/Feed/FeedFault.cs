namespace RiskWorker.Storage.Feed;

/// <summary>Something in a feed file that keeps the whole folder from being loaded.</summary>
/// <param name="File">Name of the file.</param>
/// <param name="Line">Line of the cell, 1 for the header; 0 where the file as a whole is meant.</param>
/// <param name="Column">Column, or null where the row or the file is meant.</param>
/// <param name="Found">What stands there, shortened, control characters escaped.</param>
/// <param name="Expected">What should stand there.</param>
public sealed record FeedFault(string File, long Line, string? Column, string Found, string Expected)
{
    /// <summary>As in <c>positions.csv, line 12, column quantity: found '1,5', expected a number</c>.</summary>
    public override string ToString() =>
        File + (Line > 0 ? $", line {Line}" : "") + (Column is null ? "" : $", column {Column}") + $": found {(Found.Length == 0 ? "nothing" : $"'{Found}'")}, expected {Expected}";
}
