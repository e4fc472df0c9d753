using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>
/// An option on a geometric average of which some fixings are to come; the state is the sum of log-returns since today of those made inside
/// the horizon. That sum moves the average as a log-return of the underlying does that all fixings to come share.
/// </summary>
/// <param name="unmoved">The option where those fixings came out at today's level.</param>
/// <param name="toCome">Fixings to come.</param>
internal sealed class GeometricMemory(OptionFormula unmoved, int toCome) : PathMemory
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market, double state) => unmoved.Value(market with { X = market.X + (state / toCome) });

    /// <inheritdoc/>
    public override void Fill(in MarketSpans market, ReadOnlySpan<double> states, Span<double> values)
    {
        Span<double> moved = stackalloc double[values.Length];
        for (var s = 0; s < moved.Length; s++) moved[s] = market.X[s] + (states[s] / toCome);
        Fill(unmoved, new(moved, market.Spot, market.Discount, market.Carry, market.Deviation), values);
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [2, toCome, .. unmoved.Numbers()];
}

/// <summary>An option on an average whose fixings have all been made; the state is the sum of levels, or of log-returns since today, of those made inside the horizon.</summary>
/// <param name="isGeometric">Whether the average is geometric.</param>
/// <param name="known">The sum of the levels known today, or of all fixings' logarithms where those inside came out at today's level.</param>
/// <param name="count">All fixings.</param>
/// <param name="strike">The strike.</param>
/// <param name="sign">+1 call, -1 put.</param>
internal sealed class KnownAverageMemory(bool isGeometric, double known, int count, double strike, int sign) : PathMemory
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market, double state)
    {
        var mean = (known + state) / count;
        return Math.Max(sign * ((isGeometric ? Exponential.Of(mean) : mean) - strike), 0) * Exponential.Of(-market.Discount);
    }

    /// <inheritdoc/>
    public override void Fill(in MarketSpans market, ReadOnlySpan<double> states, Span<double> values)
    {
        for (var s = 0; s < values.Length; s++) values[s] = Value(market[s], states[s]);
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [3, isGeometric ? 1 : 0, known, count, strike, sign];
}
