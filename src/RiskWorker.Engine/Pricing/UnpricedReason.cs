namespace RiskWorker.Engine.Pricing;

/// <summary>Why a line cannot be priced.</summary>
public enum UnpricedReason
{
    /// <summary>No row of the instruments file has its name.</summary>
    UnknownInstrument,

    /// <summary>It names a factor that is not among the factors.</summary>
    UnknownFactor,

    /// <summary>No fx factor prices its currency, or the base currency of its underlying.</summary>
    UnknownCurrency,

    /// <summary>The factor is quoted in another currency than the instrument's.</summary>
    CurrencyMismatch,

    /// <summary>It expired before the valuation date.</summary>
    Expired,

    /// <summary>Its kind, or a term of it, has no pricing.</summary>
    NotModelled,

    /// <summary>A fixing of the past is known neither from its terms nor from the observations.</summary>
    MissingFixing,

    /// <summary>A factor that it needs has no level.</summary>
    NoLevel,
}

/// <summary>Why a line is outside the figures: the reason and a clause to follow its name.</summary>
public sealed record Unpriced(UnpricedReason Reason, string Clause);
