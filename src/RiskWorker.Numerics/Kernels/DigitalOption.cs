using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Full revaluation of a digital option over scenarios: cash·e^(-rT) Φ(±d₂), or S e^(-qT) Φ(±d₁) where it pays the asset, + for a call;
/// d₁ = (ln(S₀/K) + x + rT - qT)/w + w/2, d₂ = d₁ - w, w = σ√T (Reiner and Rubinstein 1991, "Unscrambling the binary code").
/// </summary>
/// <remarks>
/// With w = 0 it pays all or nothing, and half where the forward is the strike to the last bit, so that call and put add up to the payment always.
/// ERRORNOTE A NaN in a scenario gives a NaN there; allocates nothing.
/// </remarks>
public static class DigitalOption
{
    /// <summary>Value of one unit.</summary>
    /// <param name="terms">The option.</param>
    /// <param name="at">The scenario; X = 0 at S₀ is today.</param>
    public static double Value(in DigitalOptionTerms terms, in MarketPoint at) => Payoff.Value(terms, at);

    /// <summary>A scenario's profit with one position added: profit + quantity·(value - baseValue) in one fused multiply-add.</summary>
    public static double Profit(in DigitalOptionTerms terms, in MarketPoint at, double quantity, double baseValue, double profit) =>
        Math.FusedMultiplyAdd(quantity, Payoff.Value(terms, at) - baseValue, profit);

    /// <summary>Adds one position's profit in each scenario: profit[s] += quantity·(value(s) - baseValue).</summary>
    /// <param name="terms">The option.</param>
    /// <param name="market">The scenarios.</param>
    /// <param name="quantity">Units held, the multiplier included.</param>
    /// <param name="baseValue">Value of one unit today; <see cref="Value"/> of today makes a scenario without a move exactly 0.</param>
    /// <param name="profit">As long as the market's spans and apart from them.</param>
    [ScalarTwin(nameof(Profit))]
    public static void AccumulateValue(in DigitalOptionTerms terms, in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        MarketPayoff.Accumulate<DigitalOptionTerms, Payoff>(terms, market, quantity, baseValue, profit);

    private readonly struct Payoff : IMarketPayoff<DigitalOptionTerms>
    {
        public static double Value(in DigitalOptionTerms terms, in MarketPoint at)
        {
            double deviation = terms.Sign * WeightedTail.Deviation(at.Deviation);
            double middle = (terms.LogMoneyness + at.X + (at.Discount - at.Carry)) / deviation;
            return terms.PaysAsset
                ? Exponential.Of(-at.Carry) * at.Spot * NormalCdf.Of(Math.FusedMultiplyAdd(deviation, 0.5, middle))
                : terms.Cash * Exponential.Of(-at.Discount) * NormalCdf.Of(Math.FusedMultiplyAdd(deviation, -0.5, middle));
        }

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public static Vector512<double> Value(in DigitalOptionTerms terms, in MarketLanes at)
        {
            Vector512<double> deviation = Vector512.Create(terms.Sign) * WeightedTail.Deviation(at.Deviation);
            Vector512<double> middle = (Vector512.Create(terms.LogMoneyness) + at.X + (at.Discount - at.Carry)) / deviation;
            Vector512<double> half = Vector512.Create(terms.PaysAsset ? 0.5 : -0.5);
            Vector512<double> level = terms.PaysAsset
                ? Exponential.Of(-at.Carry) * at.Spot
                : Vector512.Create(terms.Cash) * Exponential.Of(-at.Discount);
            return level * NormalCdf.Of(Vector512.FusedMultiplyAdd(deviation, half, middle));
        }
    }
}
