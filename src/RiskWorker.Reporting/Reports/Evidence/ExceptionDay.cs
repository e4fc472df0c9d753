using RiskWorker.Domain.Evidence;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>A book's day with an exception: one entry for all confidences and kinds of profit that share an explanation.</summary>
internal sealed class ExceptionDay(IReadOnlyList<ExceptionEntry> entries)
{
    /// <summary>The entry of the highest confidence, of several the one that lost most.</summary>
    public ExceptionEntry Main { get; } = entries.OrderByDescending(one => one.Confidence).ThenBy(one => one.Amount ?? double.NegativeInfinity).First();

    public IReadOnlyList<ExceptionEntry> Entries => entries;

    public int Age => entries.Max(one => one.Age);

    public bool IsTechnical => Main.Explanation?.Cause == ExceptionCause.System;

    /// <summary>The loss beyond VaR; null where either is missing.</summary>
    public double? Excess => -Main.Amount - Main.Var;

    public static IReadOnlyList<ExceptionDay> Of(IEnumerable<ExceptionEntry> exceptions) =>
        [.. exceptions.GroupBy(one => (one.Date, one.Book, one.Currency, one.Explanation)).Select(group => new ExceptionDay([.. group])).OrderBy(day => day.Main.Explanation is not null)];
}
