using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>An option priced by a numerical method: too slow for every scenario, so that a run tabulates it once (<see cref="PriceTable"/>).</summary>
public abstract class NumericFormula : OptionFormula
{
    /// <summary>The spot at which the value bends, or is smooth only over a much shorter distance than elsewhere; null where there is none.</summary>
    public virtual double? Kink => null;

    /// <summary>What exercise brings beyond <see cref="ExerciseSpot"/>; null for an option that cannot be exercised early.</summary>
    public virtual EarlyExercise? Exercise => null;

    /// <summary>The option under one set of rates and one volatility.</summary>
    /// <param name="discount">rT.</param>
    /// <param name="carry">qT.</param>
    /// <param name="deviation">σ√T; what is not positive counts as 0.</param>
    public abstract SpotPrices At(double discount, double carry, double deviation);

    /// <summary>Values and standard errors of one unit at every spot, under one set of rates and one volatility.</summary>
    /// <param name="discount">rT.</param>
    /// <param name="carry">qT.</param>
    /// <param name="deviation">σ√T.</param>
    /// <param name="spots">Levels of the underlying.</param>
    /// <param name="values">A value for each.</param>
    /// <param name="standardErrors">Its standard error: 0 for a method without draws.</param>
    public void Price(double discount, double carry, double deviation, ReadOnlySpan<double> spots, Span<double> values, Span<double> standardErrors) =>
        At(discount, carry, deviation).Price(spots, values, standardErrors);

    /// <summary>The spot at which an American option is best exercised at once, beyond which its value is that of exercise; null where there is none.</summary>
    public double? ExerciseSpot(double discount, double carry, double deviation) => At(discount, carry, deviation).ExerciseSpot;

    /// <inheritdoc/>
    public override double Value(in MarketPoint market) => ValueWithError(market).Value;

    /// <summary>The value in one scenario with its standard error.</summary>
    public (double Value, double StandardError) ValueWithError(in MarketPoint market)
    {
        Span<double> value = stackalloc double[1], error = stackalloc double[1];
        Price(market.Discount, market.Carry, market.Deviation, [market.Spot], value, error);
        return (value[0], error[0]);
    }

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit)
    {
        for (var s = 0; s < profit.Length; s++) profit[s] = Math.FusedMultiplyAdd(quantity, Value(market[s]) - baseValue, profit[s]);
    }
}
