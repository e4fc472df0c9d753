using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Evidence;

/// <summary>What an exception is put down to.</summary>
public enum ExceptionCause
{
    /// <summary>An error of a system or of data: counted apart.</summary>
    System,

    /// <summary>The model was not accurate enough.</summary>
    Model,

    /// <summary>The market moved as the model holds unlikely.</summary>
    Market,

    /// <summary>Positions changed within the day.</summary>
    Intraday,
}

/// <summary>One day of one book on which the loss was beyond the VaR, or could not be compared.</summary>
public sealed record ExceptionEntry
{
    /// <summary>Date of the profit.</summary>
    public required DateOnly Date { get; init; }

    /// <summary>The book.</summary>
    public required string Book { get; init; }

    /// <summary>Confidence of the VaR.</summary>
    public required Confidence Confidence { get; init; }

    /// <summary>Which profit.</summary>
    public required ProfitKind Profit { get; init; }

    /// <summary>Currency of the amounts.</summary>
    public required string Currency { get; init; }

    /// <summary>The profit; null where it is missing.</summary>
    public required double? Amount { get; init; }

    /// <summary>The VaR; null where it is missing.</summary>
    public required double? Var { get; init; }

    /// <summary>The books below that lost most, with their hypothetical profit.</summary>
    public IReadOnlyList<BookAmount> Books { get; init; } = [];

    /// <summary>The factors whose moves cost most, with their part of the hypothetical profit.</summary>
    public IReadOnlyList<FactorAmount> Factors { get; init; } = [];

    /// <summary>Business days from the exception to the day of the report.</summary>
    public required int Age { get; init; }

    /// <summary>The explanation that holds, or null where there is none.</summary>
    public ExceptionExplanation? Explanation { get; init; }

    /// <summary>Earlier explanations that it corrects, newest first.</summary>
    public IReadOnlyList<ExceptionExplanation> Corrected { get; init; } = [];
}

/// <summary>A factor's part of a profit.</summary>
public readonly record struct FactorAmount(string Factor, double Amount);

/// <summary>A written explanation.</summary>
/// <param name="Cause">What the exception is put down to.</param>
/// <param name="Text">In words.</param>
/// <param name="Author">Who wrote it.</param>
/// <param name="Written">When, UTC.</param>
public sealed record ExceptionExplanation(ExceptionCause Cause, string Text, string Author, DateTimeOffset Written);
