using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Full revaluation of a European option whose rate, carry and volatility move with the scenario: S e^(-qT) Φ(d₁) - K e^(-rT) Φ(d₂)
/// for a call, mirrored for a put; d₁ = (ln(S₀/K) + x + rT - qT)/w + w/2, d₂ = d₁ - w, w = σ√T (Black and Scholes 1973, Merton 1973).
/// </summary>
/// <remarks>
/// <see cref="EuropeanOption"/> is the faster form where only the underlying moves; the two differ by rounding. No time or no volatility
/// (w = 0) gives the discounted intrinsic value of the forward. Absolute error below 4e-16 times (S e^(-qT) + K e^(-rT)) (measured at 2,000
/// options), and a value is never below zero. A NaN in a scenario's log-return, exponents or deviation gives a NaN there; allocates nothing.
/// </remarks>
public static class MovedOption
{
    /// <summary>Value of one unit.</summary>
    /// <param name="terms">The option.</param>
    /// <param name="at">The scenario; X = 0 at S₀ is today.</param>
    public static double Value(in MovedOptionTerms terms, in MarketPoint at) => Payoff.Value(terms, at);

    /// <summary>A scenario's profit with one position added: profit + quantity·(value - baseValue) in one fused multiply-add.</summary>
    public static double Profit(in MovedOptionTerms terms, in MarketPoint at, double quantity, double baseValue, double profit) =>
        Math.FusedMultiplyAdd(quantity, Payoff.Value(terms, at) - baseValue, profit);

    /// <summary>Adds one position's profit in each scenario: profit[s] += quantity·(value(s) - baseValue).</summary>
    /// <param name="terms">The option.</param>
    /// <param name="market">The scenarios.</param>
    /// <param name="quantity">Units held, the multiplier included.</param>
    /// <param name="baseValue">Value of one unit today; <see cref="Value"/> of today makes a scenario without a move exactly 0.</param>
    /// <param name="profit">As long as the market's spans and apart from them.</param>
    [ScalarTwin(nameof(Profit))]
    public static void AccumulateValue(in MovedOptionTerms terms, in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        MarketPayoff.Accumulate<MovedOptionTerms, Payoff>(terms, market, quantity, baseValue, profit);

    private readonly struct Payoff : IMarketPayoff<MovedOptionTerms>
    {
        public static int Rows => BlackFormula.Rows;

        public static double Value(in MovedOptionTerms terms, in MarketPoint at)
        {
            double asset = terms.Sign * Exponential.Of(-at.Carry) * at.Spot;
            double strike = terms.SignedStrike * Exponential.Of(-at.Discount);
            double deviation = terms.Sign * WeightedTail.Deviation(at.Deviation);
            double d1 = Math.FusedMultiplyAdd(deviation, 0.5, (terms.LogMoneyness + at.X + (at.Discount - at.Carry)) / deviation);
            return BlackFormula.Value(asset, strike, d1, d1 - deviation);
        }

        public static void Values(in MovedOptionTerms terms, in MarketSpans market, in Workbench bench)
        {
            Prepare(terms, market, bench);
            BlackFormula.Values(bench, terms.Sign, market.Spot, terms.SignedStrike);
        }

        [MethodImpl(Workbench.Loop)]
        private static void Prepare(in MovedOptionTerms terms, in MarketSpans market, in Workbench bench)
        {
            ref double moves = ref MemoryMarshal.GetReference(market.X);
            ref double discounts = ref MemoryMarshal.GetReference(market.Discount);
            ref double carries = ref MemoryMarshal.GetReference(market.Carry);
            ref double deviations = ref MemoryMarshal.GetReference(market.Deviation);
            Vector512<double> sign = Vector512.Create(terms.Sign), moneyness = Vector512.Create(terms.LogMoneyness);
            for (nuint s = 0; s < (nuint)bench.Length; s += 8)
            {
                Vector512<double> discount = Vector512.LoadUnsafe(ref discounts, s), carry = Vector512.LoadUnsafe(ref carries, s);
                Vector512<double> deviation = sign * WeightedTail.Deviation(Vector512.LoadUnsafe(ref deviations, s));
                Vector512<double> middle = (moneyness + Vector512.LoadUnsafe(ref moves, s) + (discount - carry)) / deviation;
                Vector512<double> d1 = Vector512.FusedMultiplyAdd(deviation, Vector512.Create(0.5), middle);
                bench.Store(BlackFormula.Asset, s, -carry);
                bench.Store(BlackFormula.Strike, s, -discount);
                bench.Store(BlackFormula.Gaussian, s, BlackFormula.Exponent(d1));
                bench.Store(BlackFormula.D1, s, d1);
                bench.Store(BlackFormula.D2, s, d1 - deviation);
            }
        }
    }
}
