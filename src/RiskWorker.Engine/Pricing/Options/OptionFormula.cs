using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>
/// The value of one option, before its multiplier, as a function of the market that it sees up to its expiry. Made for one valuation
/// date and one level of the underlying, from which scenarios move. Immutable: threads share it.
/// </summary>
public abstract class OptionFormula
{
    /// <summary>The value in one scenario.</summary>
    public abstract double Value(in MarketPoint market);

    /// <summary>Adds quantity·(value - <paramref name="baseValue"/>) to the profit in each scenario: the bits of <see cref="Value"/>, scenario by scenario.</summary>
    /// <param name="market">The scenarios.</param>
    /// <param name="quantity">Units held, the multiplier included.</param>
    /// <param name="baseValue">Value of one unit today, as this formula has it.</param>
    /// <param name="profit">A number for each scenario.</param>
    public abstract void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit);

    /// <summary>Every number that a value depends on, in a fixed order and after one that tells the formula: what a content hash is made of.</summary>
    public abstract IEnumerable<double> Numbers();
}
