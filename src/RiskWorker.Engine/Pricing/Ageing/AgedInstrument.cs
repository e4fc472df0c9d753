using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>What one instrument turns into by a horizon: what is still alive then, and what it pays on the way.</summary>
public sealed record AgedInstrument
{
    /// <summary>What is alive at the end, as of that date; null where nothing is, or all of it hangs on <see cref="Path"/>.</summary>
    public BoundInstrument? Rest { get; init; }

    /// <summary>Known amounts paid inside the horizon, of one unit held.</summary>
    public double Cash { get; init; }

    /// <summary>What is paid at closes inside the horizon.</summary>
    public IReadOnlyList<Settlement> Settlements { get; init; } = [];

    /// <summary>Rates that are fixed inside the horizon, with what grows by them.</summary>
    public IReadOnlyList<RateReset> Resets { get; init; } = [];

    /// <summary>The path that decides what it is worth; null where there is none to look at.</summary>
    public WatchedPath? Path { get; init; }

    /// <summary>What expires, pays or is fixed inside the horizon, as a clause to follow its name; null where nothing does.</summary>
    public string? Event { get; init; }

    /// <summary>Why it keeps the valuation date of today, as a clause to follow its name; null where it ages.</summary>
    public string? Refusal { get; init; }
}

/// <summary>An instrument as of a date inside the horizon, whose value at that close is paid.</summary>
/// <param name="Day">The close, as business days after the as-of date.</param>
/// <param name="Bound">The instrument.</param>
public readonly record struct Settlement(int Day, BoundInstrument Bound);

/// <summary>A floating rate that is fixed inside the horizon.</summary>
/// <param name="Day">The close that fixes it, as business days after the as-of date.</param>
/// <param name="Growth">Minus the logarithm of what an amount grows by over the period, in the levels of that close.</param>
/// <param name="Amount">The amount, of one unit held.</param>
/// <param name="Discount">Minus the logarithm of the discount factor at the end of the horizon; null where it is paid by then.</param>
public readonly record struct RateReset(int Day, LinearForm Growth, double Amount, LinearForm? Discount);

/// <summary>A path that is looked at on closes of the horizon, and what an option is worth by what they leave.</summary>
/// <param name="Underlying">What is looked at.</param>
/// <param name="Kind">What a look leaves.</param>
/// <param name="Barrier">The barrier, where there is one.</param>
/// <param name="IsContinuous">Whether every moment counts, else the closes alone.</param>
/// <param name="IsUnderWay">Whether today's close belongs to it: the moments from then on do; else it begins at its first look.</param>
/// <param name="Start">What the path has left until today.</param>
/// <param name="Unmoved">What it leaves where no level moves.</param>
/// <param name="Looks">The closes looked at, as business days after the as-of date, ascending; one that counts twice comes twice.</param>
/// <param name="Day">The close at which the option is valued or pays.</param>
/// <param name="Multiplier">Value of one unit held per unit of the formula.</param>
/// <param name="Market">What the formula sees.</param>
/// <param name="Formula">The value at that close.</param>
public sealed record WatchedPath(
    UnderlyingKey Underlying, LookKind Kind, double Barrier, bool IsContinuous, bool IsUnderWay, double Start, double Unmoved, IReadOnlyList<int> Looks, int Day, double Multiplier, MarketTerms Market, PathMemory Formula);

/// <summary>What a look at a close leaves of a path.</summary>
public enum LookKind
{
    /// <summary>1 where it closes on a barrier or above it.</summary>
    CrossedUp,

    /// <summary>1 where it closes on a barrier or below it.</summary>
    CrossedDown,

    /// <summary>The sum of levels.</summary>
    Sum,

    /// <summary>The sum of log-returns since today.</summary>
    ReturnSum,

    /// <summary>The highest level.</summary>
    Highest,

    /// <summary>The lowest level.</summary>
    Lowest,
}
