using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Full revaluation of an option on the geometric average G over scenarios: e^(-rT) (F Φ(d₁) - K Φ(d₂)) for a call, mirrored for a put, with
/// F = E[G], d₂ = (E[ln G] - ln K)/s, d₁ = d₂ + s, s the deviation of ln G (Kemna and Vorst 1990); see <see cref="GeometricAsianTerms"/>.
/// </summary>
/// <remarks>
/// The level of a scenario is not read: its log-return says all, and a past part of the average leaves only its share as a power of it. An
/// average that is known, or no volatility, gives the discounted intrinsic value. Absolute error below 6e-16 times (S e^(-qT) + K e^(-rT))
/// (measured at 6,000 options), and a value is never below zero. A NaN in a scenario's log-return, exponents or deviation gives a NaN there; allocates nothing.
/// </remarks>
public static class GeometricAsianOption
{
    /// <summary>Value of one unit.</summary>
    /// <param name="terms">The option.</param>
    /// <param name="at">The scenario; X = 0 is today.</param>
    public static double Value(in GeometricAsianTerms terms, in MarketPoint at) => Payoff.Value(terms, at);

    /// <summary>A scenario's profit with one position added: profit + quantity·(value - baseValue) in one fused multiply-add.</summary>
    public static double Profit(in GeometricAsianTerms terms, in MarketPoint at, double quantity, double baseValue, double profit) =>
        Math.FusedMultiplyAdd(quantity, Payoff.Value(terms, at) - baseValue, profit);

    /// <summary>Adds one position's profit in each scenario: profit[s] += quantity·(value(s) - baseValue).</summary>
    /// <param name="terms">The option.</param>
    /// <param name="market">The scenarios.</param>
    /// <param name="quantity">Units held, the multiplier included.</param>
    /// <param name="baseValue">Value of one unit today; <see cref="Value"/> of today makes a scenario without a move exactly 0.</param>
    /// <param name="profit">As long as the market's spans and apart from them.</param>
    [ScalarTwin(nameof(Profit))]
    public static void AccumulateValue(in GeometricAsianTerms terms, in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        MarketPayoff.Accumulate<GeometricAsianTerms, Payoff>(terms, market, quantity, baseValue, profit);

    private readonly struct Payoff : IMarketPayoff<GeometricAsianTerms>
    {
        public static int Rows => BlackFormula.Rows;

        public static double Value(in GeometricAsianTerms terms, in MarketPoint at)
        {
            double w = WeightedTail.Deviation(at.Deviation), s = WeightedTail.Deviation(terms.RootVariance * w);
            double growth = Math.FusedMultiplyAdd(-0.5 * w, w, at.Discount - at.Carry);
            double mean = Math.FusedMultiplyAdd(growth, terms.MeanTime, Math.FusedMultiplyAdd(terms.Exponent, at.X, terms.LogMoneyness));
            double asset = terms.SignedStrike * Exponential.Of(Math.FusedMultiplyAdd(0.5 * s, s, mean - at.Discount));
            double strike = terms.SignedStrike * Exponential.Of(-at.Discount);
            double signed = terms.Sign * s, d2 = mean / signed;
            return BlackFormula.Value(asset, strike, d2 + signed, d2);
        }

        public static void Values(in GeometricAsianTerms terms, in MarketSpans market, in Workbench bench)
        {
            Prepare(terms, market, bench);
            BlackFormula.Values(bench, terms.SignedStrike, [], terms.SignedStrike);
        }

        [MethodImpl(Workbench.Loop)]
        private static void Prepare(in GeometricAsianTerms terms, in MarketSpans market, in Workbench bench)
        {
            ref double moves = ref MemoryMarshal.GetReference(market.X);
            ref double discounts = ref MemoryMarshal.GetReference(market.Discount);
            ref double carries = ref MemoryMarshal.GetReference(market.Carry);
            ref double deviations = ref MemoryMarshal.GetReference(market.Deviation);
            Vector512<double> sign = Vector512.Create(terms.Sign), root = Vector512.Create(terms.RootVariance), time = Vector512.Create(terms.MeanTime);
            Vector512<double> exponent = Vector512.Create(terms.Exponent), moneyness = Vector512.Create(terms.LogMoneyness);
            for (nuint s = 0; s < (nuint)bench.Length; s += 8)
            {
                Vector512<double> discount = Vector512.LoadUnsafe(ref discounts, s);
                Vector512<double> w = WeightedTail.Deviation(Vector512.LoadUnsafe(ref deviations, s)), deviation = WeightedTail.Deviation(root * w);
                Vector512<double> growth = Vector512.FusedMultiplyAdd(Vector512.Create(-0.5) * w, w, discount - Vector512.LoadUnsafe(ref carries, s));
                Vector512<double> mean = Vector512.FusedMultiplyAdd(exponent, Vector512.LoadUnsafe(ref moves, s), moneyness);
                mean = Vector512.FusedMultiplyAdd(growth, time, mean);
                Vector512<double> signed = sign * deviation, d2 = mean / signed, d1 = d2 + signed;
                bench.Store(BlackFormula.Asset, s, Vector512.FusedMultiplyAdd(Vector512.Create(0.5) * deviation, deviation, mean - discount));
                bench.Store(BlackFormula.Strike, s, -discount);
                bench.Store(BlackFormula.Gaussian, s, BlackFormula.Exponent(d1));
                bench.Store(BlackFormula.D1, s, d1);
                bench.Store(BlackFormula.D2, s, d2);
            }
        }
    }
}
