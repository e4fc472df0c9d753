using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Limits;

/// <summary>What a limit's amount is measured in.</summary>
public enum LimitBasis
{
    /// <summary>Money in the book's currency.</summary>
    Amount,

    /// <summary>A fraction of the book's value.</summary>
    Nav,

    /// <summary>A multiple of the same relative measure of a reference book.</summary>
    Book,
}

/// <summary>Where a measure stands against its limit, its interval considered.</summary>
public enum LimitStatus
{
    /// <summary>The whole interval lies at or below the amount, and the value below the warning level.</summary>
    Within,

    /// <summary>Within, but the value has reached the warning level.</summary>
    Warning,

    /// <summary>The whole interval lies above the amount.</summary>
    Breached,

    /// <summary>The interval holds the amount: simulation noise decides, so nothing is declared.</summary>
    Inconclusive,
}

/// <summary>A limit on a measure of a book: one row of <c>limits.csv</c>.</summary>
/// <param name="Name">Identifies the limit.</param>
/// <param name="Book">The node it binds.</param>
/// <param name="Measure">Which measure, at which confidence and horizon.</param>
/// <param name="Amount">Money, fraction or multiple, as <paramref name="Basis"/> says; positive.</param>
/// <param name="Basis">What the amount is measured in.</param>
/// <param name="ReferenceBook">The book compared with, for <see cref="LimitBasis.Book"/>.</param>
/// <param name="WarnAt">Share of the amount from which the status is a warning.</param>
/// <param name="ValidFrom">First date that it holds on, or null for always.</param>
/// <param name="ValidTo">Last date that it holds on, or null for always.</param>
/// <param name="Approver">Who approved it.</param>
/// <param name="Reason">Why it was set.</param>
public sealed record Limit(
    string Name,
    string Book,
    MeasureSpec Measure,
    double Amount,
    LimitBasis Basis = LimitBasis.Amount,
    string? ReferenceBook = null,
    double WarnAt = 0.8,
    DateOnly? ValidFrom = null,
    DateOnly? ValidTo = null,
    string? Approver = null,
    string? Reason = null)
{
    /// <summary>Whether it binds on <paramref name="date"/>; both ends count.</summary>
    public bool IsValidOn(DateOnly date) => !(date < ValidFrom) && !(date > ValidTo);
}
