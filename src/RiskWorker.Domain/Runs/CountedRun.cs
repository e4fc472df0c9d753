namespace RiskWorker.Domain.Runs;

/// <summary>What the exception count takes from an earlier run.</summary>
/// <param name="Run">Its id.</param>
/// <param name="Hash">Hash of its record.</param>
/// <param name="AsOf">Its as-of date: its VaR is for the business day after.</param>
/// <param name="Evidence">Recorded before the profit was known, or backfilled.</param>
/// <param name="Measures">VaR by book and confidence, at a horizon of one day, in the book's currency.</param>
/// <param name="HypotheticalDate">The close from which its hypothetical profit starts, or null where it has none.</param>
/// <param name="Hypothetical">Hypothetical profit of its as-of date by book, in the book's currency.</param>
public sealed record CountedRun(
    string Run,
    string Hash,
    DateOnly AsOf,
    EvidenceKind Evidence,
    IReadOnlyList<CountedVar> Measures,
    DateOnly? HypotheticalDate,
    IReadOnlyList<BookAmount> Hypothetical)
{
    /// <summary>The same of the models that ran beside the one of record.</summary>
    public IReadOnlyList<ChallengerVar> Challengers { get; init; } = [];
}

/// <summary>A one-day VaR that another model than the one of record gave.</summary>
public readonly record struct ChallengerVar(string Model, string Book, Confidence Confidence, double Value);

/// <summary>A one-day VaR that an earlier run reported.</summary>
public readonly record struct CountedVar(string Book, Confidence Confidence, double Value);

/// <summary>An amount of a book, in the book's currency.</summary>
public readonly record struct BookAmount(string Book, double Amount);

/// <summary>When a figure came to be, seen from the day that it is held against.</summary>
public enum EvidenceKind
{
    /// <summary>Reported before the profit of the next day was known.</summary>
    Recorded,

    /// <summary>Computed afterwards.</summary>
    Backfilled,
}
