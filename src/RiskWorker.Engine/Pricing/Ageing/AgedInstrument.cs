using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>What one instrument turns into by a horizon: what is still alive then, and what it pays on the way.</summary>
public sealed record AgedInstrument
{
    /// <summary>What is alive at the end, as of that date; null where nothing is, or all of it hangs on <see cref="Barrier"/>.</summary>
    public BoundInstrument? Rest { get; init; }

    /// <summary>Known amounts paid inside the horizon, of one unit held.</summary>
    public double Cash { get; init; }

    /// <summary>What is paid at closes inside the horizon.</summary>
    public IReadOnlyList<Settlement> Settlements { get; init; } = [];

    /// <summary>Rates that are fixed inside the horizon, with what grows by them.</summary>
    public IReadOnlyList<RateReset> Resets { get; init; } = [];

    /// <summary>The barrier that decides what it is worth; null where there is none to look at.</summary>
    public WatchedBarrier? Barrier { get; init; }

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

/// <summary>A barrier that is looked at on days of the horizon.</summary>
/// <param name="Underlying">What is looked at.</param>
/// <param name="Level">The barrier.</param>
/// <param name="IsUp">Whether it is crossed from below.</param>
/// <param name="IsContinuous">Whether every moment counts, else closes alone.</param>
/// <param name="FirstDay">The first close looked at.</param>
/// <param name="Day">The last one, at which the option is valued or pays.</param>
/// <param name="Multiplier">Value of one unit held per unit of the formulas.</param>
/// <param name="Market">What the formulas see.</param>
/// <param name="Untouched">The value at that close where the barrier was never crossed.</param>
/// <param name="Crossed">The value at that close, with what was paid at the hit, where it was.</param>
public sealed record WatchedBarrier(
    UnderlyingKey Underlying, double Level, bool IsUp, bool IsContinuous, int FirstDay, int Day, double Multiplier, MarketTerms Market, OptionFormula Untouched, OptionFormula Crossed);
