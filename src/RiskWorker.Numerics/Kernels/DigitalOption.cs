using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Full revaluation of a digital option over scenarios: cash·e^(-rT) Φ(±d₂), or S e^(-qT) Φ(±d₁) where it pays the asset, + for a call;
/// d₁ = (ln(S₀/K) + x + rT - qT)/w + w/2, d₂ = d₁ - w, w = σ√T (Reiner and Rubinstein 1991, "Unscrambling the binary code").
/// </summary>
/// <remarks>
/// With w = 0 it pays all or nothing, and half where the forward is the strike to the last bit, so that call and put add up to the payment always.
/// Absolute error below 3e-16 times what it would pay for certain and 1 + (|ln(S₀/K)| + |x| + |rT| + |qT|)/w (measured at 4,000 options): the
/// rounding of the logarithms comes as often into d as w goes into them. A NaN in a scenario's log-return, exponents or deviation gives a NaN there; allocates nothing.
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
        private const int Level = 0;
        private const int Probability = 1;

        public static int Rows => 2;

        public static double Value(in DigitalOptionTerms terms, in MarketPoint at)
        {
            double deviation = terms.Sign * WeightedTail.Deviation(at.Deviation);
            double middle = (terms.LogMoneyness + at.X + (at.Discount - at.Carry)) / deviation;
            return terms.PaysAsset
                ? Exponential.Of(-at.Carry) * at.Spot * NormalCdf.Of(Math.FusedMultiplyAdd(deviation, 0.5, middle))
                : terms.Cash * Exponential.Of(-at.Discount) * NormalCdf.Of(Math.FusedMultiplyAdd(deviation, -0.5, middle));
        }

        public static void Values(in DigitalOptionTerms terms, in MarketSpans market, in Workbench bench)
        {
            Prepare(terms, market, bench);
            bench.Exponentials(Level, 1);
            NormalCdf.Of(bench[Probability], bench[Probability]);
            if (terms.PaysAsset)
                Multiply(bench, market.Spot);
            else
                Multiply(bench, terms.Cash);
        }

        [MethodImpl(Workbench.Loop)]
        private static void Prepare(in DigitalOptionTerms terms, in MarketSpans market, in Workbench bench)
        {
            ref double moves = ref MemoryMarshal.GetReference(market.X);
            ref double discounts = ref MemoryMarshal.GetReference(market.Discount);
            ref double carries = ref MemoryMarshal.GetReference(market.Carry);
            ref double deviations = ref MemoryMarshal.GetReference(market.Deviation);
            ref double paid = ref terms.PaysAsset ? ref carries : ref discounts;
            Vector512<double> sign = Vector512.Create(terms.Sign), moneyness = Vector512.Create(terms.LogMoneyness);
            Vector512<double> half = Vector512.Create(terms.PaysAsset ? 0.5 : -0.5);
            for (nuint s = 0; s < (nuint)bench.Length; s += 8)
            {
                Vector512<double> deviation = sign * WeightedTail.Deviation(Vector512.LoadUnsafe(ref deviations, s));
                Vector512<double> growth = Vector512.LoadUnsafe(ref discounts, s) - Vector512.LoadUnsafe(ref carries, s);
                Vector512<double> middle = (moneyness + Vector512.LoadUnsafe(ref moves, s) + growth) / deviation;
                bench.Store(Probability, s, Vector512.FusedMultiplyAdd(deviation, half, middle));
                bench.Store(Level, s, -Vector512.LoadUnsafe(ref paid, s));
            }
        }

        [MethodImpl(Workbench.Loop)]
        private static void Multiply(in Workbench bench, ReadOnlySpan<double> spot)
        {
            ref double levels = ref MemoryMarshal.GetReference(spot);
            for (nuint s = 0; s < (nuint)bench.Length; s += 8)
                bench.Store(Workbench.Result, s, bench.Load(Level, s) * Vector512.LoadUnsafe(ref levels, s) * bench.Load(Probability, s));
        }

        [MethodImpl(Workbench.Loop)]
        private static void Multiply(in Workbench bench, double cash)
        {
            for (nuint s = 0; s < (nuint)bench.Length; s += 8)
                bench.Store(Workbench.Result, s, Vector512.Create(cash) * bench.Load(Level, s) * bench.Load(Probability, s));
        }
    }
}
