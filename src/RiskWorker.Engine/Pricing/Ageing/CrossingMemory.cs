using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>An option that a barrier starts or ends: one thing where it was never crossed, another where it was.</summary>
/// <param name="untouched">The value where it was not: state 0.</param>
/// <param name="crossed">The value, with what was paid at the hit, where it was.</param>
internal sealed class CrossingMemory(OptionFormula untouched, OptionFormula crossed) : PathMemory
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market, double state) => state == 0 ? untouched.Value(market) : crossed.Value(market);

    /// <inheritdoc/>
    public override void Fill(in MarketSpans market, ReadOnlySpan<double> states, Span<double> values)
    {
        Span<double> others = stackalloc double[values.Length];
        Fill(untouched, market, values);
        Fill(crossed, market, others);
        for (var s = 0; s < values.Length; s++) values[s] = states[s] == 0 ? values[s] : others[s];
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [1, .. untouched.Numbers(), .. crossed.Numbers()];
}
