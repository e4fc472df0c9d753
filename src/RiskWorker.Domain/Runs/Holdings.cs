namespace RiskWorker.Domain.Runs;

/// <summary>What was held.</summary>
public sealed record Holdings
{
    /// <summary>Position rows.</summary>
    public int Positions { get; init; }

    /// <summary>Position rows that are in the figures.</summary>
    public int Priced { get; init; }

    /// <summary>Sum of absolute values of the priced lines, in the reporting currency; a future counts at its price, a swap at its notional.</summary>
    public double GrossValue { get; init; }

    /// <summary>The same for the previous date with positions; null where there is none.</summary>
    public double? PreviousGrossValue { get; init; }

    /// <summary>Rows that carried a market value of the book of record.</summary>
    public int Reconciled { get; init; }

    /// <summary>Of those, the rows whose model value differs by more than the tolerance.</summary>
    public IReadOnlyList<ReconciliationBreak> Breaks { get; init; } = [];

    /// <summary>Sum of the absolute differences of those rows, in the reporting currency; zero is shown too.</summary>
    public double BreakTotal { get; init; }

    /// <summary>Lines outside the figures, largest first.</summary>
    public IReadOnlyList<UnpricedLine> Unpriced { get; init; } = [];

    /// <summary>Gross notional of the lines outside the figures as far as it is known, in the reporting currency.</summary>
    public double UnpricedNotional => Unpriced.Sum(line => line.Size ?? 0);

    /// <summary>Lines outside the figures whose notional nothing gives.</summary>
    public int UnpricedOfUnknownSize => Unpriced.Count(line => line.Size is null);
}

/// <summary>A line whose model value differs from the book of record's, both in the instrument's currency.</summary>
public sealed record ReconciliationBreak(string Book, string Instrument, string Currency, double ModelValue, double MarketValue);

/// <summary>A line that no figure holds.</summary>
/// <param name="Book">Node that holds it.</param>
/// <param name="Instrument">What it is.</param>
/// <param name="Kind">Its kind, or '-' where the instrument is unknown.</param>
/// <param name="Quantity">Units held.</param>
/// <param name="Size">Its notional in the reporting currency: the larger of quantity times notional, strike or price and of the market value given; null where nothing gives one.</param>
/// <param name="Reason">Why it is left out.</param>
public sealed record UnpricedLine(string Book, string Instrument, string Kind, double Quantity, double? Size, string Reason);
