namespace RiskWorker.Domain.Books;

/// <summary>A holding at the close of a date: one row of <c>positions.csv</c>. Rows of one book and instrument add up.</summary>
/// <param name="Book">The node that holds it; any node may.</param>
/// <param name="Instrument">What is held.</param>
/// <param name="Quantity">Units held; negative is short.</param>
/// <param name="Trade">The trade it stems from, or null.</param>
/// <param name="MarketValue">Value in the book of record, in the instrument's currency, for reconciliation; null when not given.</param>
public readonly record struct Position(string Book, string Instrument, double Quantity, string? Trade = null, double? MarketValue = null);

/// <summary>A day's profit of a book, in the book's currency: one row of <c>pnl.csv</c>.</summary>
public readonly record struct ProfitAndLoss(DateOnly Date, string Book, double? Actual, double? Hypothetical);
