using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>
/// The value of one option, before its multiplier, at a close that ends a part of its path: a function of the market and of the one number
/// that the path so far has left (<see cref="WatchedPath"/> says which). Immutable: threads share it.
/// </summary>
public abstract class PathMemory
{
    /// <summary>The value in one scenario.</summary>
    /// <param name="market">What the option sees from that close on.</param>
    /// <param name="state">What the path has left.</param>
    public abstract double Value(in MarketPoint market, double state);

    /// <summary>The bits of <see cref="Value"/> for every scenario.</summary>
    /// <param name="market">The scenarios.</param>
    /// <param name="states">What the path has left in each.</param>
    /// <param name="values">A value for each.</param>
    public abstract void Fill(in MarketSpans market, ReadOnlySpan<double> states, Span<double> values);

    /// <summary>The same with a table in place of a numerical method, over a box of markets that scenarios reach.</summary>
    public virtual PathMemory Tabulated(in MarketRange range) => this;

    /// <summary>Every number that a value depends on, in a fixed order and after one that tells the formula: what a content hash is made of.</summary>
    public abstract IEnumerable<double> Numbers();

    /// <summary>The values of <paramref name="formula"/> for every scenario.</summary>
    protected static void Fill(OptionFormula formula, in MarketSpans market, Span<double> values)
    {
        values.Clear();
        formula.Accumulate(market, 1, 0, values);
    }
}
