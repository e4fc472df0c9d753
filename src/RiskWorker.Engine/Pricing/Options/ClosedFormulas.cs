using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>A plain European option whose rates or volatility scenarios move (Black and Scholes 1973, Merton 1973, Black 1976).</summary>
public sealed class PlainFormula(MovedOptionTerms terms) : OptionFormula
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market) => MovedOption.Value(terms, market);

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        MovedOption.AccumulateValue(terms, market, quantity, baseValue, profit);

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => FormulaNumbers.Of(1, MovedOptionTerms.NumberCount, terms.CopyTo);
}

/// <summary>A cash- or asset-or-nothing option (Reiner and Rubinstein 1991).</summary>
public sealed class DigitalFormula(DigitalOptionTerms terms) : OptionFormula
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market) => DigitalOption.Value(terms, market);

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        DigitalOption.AccumulateValue(terms, market, quantity, baseValue, profit);

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => FormulaNumbers.Of(2, DigitalOptionTerms.NumberCount, terms.CopyTo);
}

/// <summary>A single-barrier option (Reiner and Rubinstein 1991), the barrier moved where it is observed daily (Broadie, Glasserman and Kou 1997).</summary>
public sealed class BarrierFormula(BarrierOptionTerms terms) : OptionFormula
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market) => BarrierOption.Value(terms, market);

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        BarrierOption.AccumulateValue(terms, market, quantity, baseValue, profit);

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => FormulaNumbers.Of(3, BarrierOptionTerms.NumberCount, terms.CopyTo);
}

/// <summary>An option on a geometric average (Kemna and Vorst 1990).</summary>
public sealed class GeometricAsianFormula(GeometricAsianTerms terms) : OptionFormula
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market) => GeometricAsianOption.Value(terms, market);

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        GeometricAsianOption.AccumulateValue(terms, market, quantity, baseValue, profit);

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => FormulaNumbers.Of(4, GeometricAsianTerms.NumberCount, terms.CopyTo);
}

/// <summary>A forward whose rate or yield scenarios move: S e^(-qT) - K e^(-rT).</summary>
public sealed class ForwardFormula(double strike) : OptionFormula
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market) =>
        Math.FusedMultiplyAdd(market.Spot, Exponential.Of(-market.Carry), -(strike * Exponential.Of(-market.Discount)));

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit)
    {
        for (var s = 0; s < profit.Length; s++) profit[s] = Math.FusedMultiplyAdd(quantity, Value(market[s]) - baseValue, profit[s]);
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [5, strike];
}

/// <summary>An amount that nothing moves any more: an option that has been knocked out, a rebate.</summary>
public sealed class SettledFormula(double value) : OptionFormula
{
    /// <inheritdoc/>
    public override double Value(in MarketPoint market) => value;

    /// <inheritdoc/>
    public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit)
    {
        if (baseValue == value) return;
        for (var s = 0; s < profit.Length; s++) profit[s] = Math.FusedMultiplyAdd(quantity, value - baseValue, profit[s]);
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [6, value];
}

/// <summary>Reads the numbers of terms.</summary>
internal static class FormulaNumbers
{
    public delegate void Copy(Span<double> numbers);

    public static double[] Of(int formula, int count, Copy copy)
    {
        var numbers = new double[count + 1];
        numbers[0] = formula;
        copy(numbers.AsSpan(1));
        return numbers;
    }
}
