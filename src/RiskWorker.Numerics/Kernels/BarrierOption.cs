using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Full revaluation of the eight single-barrier calls and puts over scenarios, with a rebate that a knock-out pays at the hit and a
/// knock-in at expiry (Merton 1973; Reiner and Rubinstein 1991, "Breaking down the barriers").
/// </summary>
/// <remarks>
/// <para>
/// A scenario at or beyond the barrier H counts as a look at it: a knock-out is then worth its rebate, undiscounted, whatever else the
/// scenario says, and a knock-in the plain option. With looks at intervals the formula sees the barrier moved away by the continuity
/// correction, the touch H itself. No time left (w = 0, rT = 0) gives the payoff, no volatility the value along the forward.
/// </para>
/// <para>
/// A negative rate may leave the formula of the rebate at the hit without a real exponent; <see cref="HitRebate"/> says what then stands
/// in its place, and that it ends in NaN where -rT is above 2 or more.
/// </para>
/// <para>ERRORNOTE A NaN in a scenario that did not touch gives a NaN there; allocates nothing.</para>
/// </remarks>
public static class BarrierOption
{
    /// <summary>Value of one unit.</summary>
    /// <param name="terms">The option, not yet knocked.</param>
    /// <param name="at">The scenario; X = 0 at S₀ is today.</param>
    public static double Value(in BarrierOptionTerms terms, in MarketPoint at) => Payoff.Value(terms, at);

    /// <summary>A scenario's profit with one position added: profit + quantity·(value - baseValue) in one fused multiply-add.</summary>
    public static double Profit(in BarrierOptionTerms terms, in MarketPoint at, double quantity, double baseValue, double profit) =>
        Math.FusedMultiplyAdd(quantity, Payoff.Value(terms, at) - baseValue, profit);

    /// <summary>Adds one position's profit in each scenario: profit[s] += quantity·(value(s) - baseValue).</summary>
    /// <param name="terms">The option, not yet knocked.</param>
    /// <param name="market">The scenarios.</param>
    /// <param name="quantity">Units held, the multiplier included.</param>
    /// <param name="baseValue">Value of one unit today; <see cref="Value"/> of today makes a scenario without a move exactly 0.</param>
    /// <param name="profit">As long as the market's spans and apart from them.</param>
    [ScalarTwin(nameof(Profit))]
    public static void AccumulateValue(in BarrierOptionTerms terms, in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
        MarketPayoff.Accumulate<BarrierOptionTerms, Payoff>(terms, market, quantity, baseValue, profit);

    private readonly struct Payoff : IMarketPayoff<BarrierOptionTerms>
    {
        public static double Value(in BarrierOptionTerms terms, in MarketPoint at)
        {
            double w = WeightedTail.Deviation(at.Deviation);
            double open = Math.FusedMultiplyAdd(terms.Side, at.X, terms.BarrierGap);
            double a = Math.FusedMultiplyAdd(terms.Shift, w, open) / w;
            double k = Math.FusedMultiplyAdd(terms.Side, at.X, terms.StrikeGap) / w;
            double m = terms.Side * Math.FusedMultiplyAdd(w, -0.5, (at.Discount - at.Carry) / w);
            double barrier = terms.Shift > 0.0 ? terms.Barrier * Exponential.Of(-terms.Side * terms.Shift * w) : terms.Barrier;
            double n = k < a ? k : a, end = k < a ? terms.Strike : barrier;
            double discounted = Exponential.Of(-at.Discount), power = Exponential.Of(-2.0 * a * m);
            double asset = at.Spot * Exponential.Of(-at.Carry), cash = terms.Strike * discounted, ratio = barrier / at.Spot;
            var state = new BarrierState(a, m, terms.Side * w, asset, cash, power * asset * ratio * ratio, power * cash);

            double half = -0.5 * (n + m) * (n + m);
            double weight = discounted * WeightedTail.Gaussian(half);
            double imageWeight = discounted * WeightedTail.Gaussian(Math.FusedMultiplyAdd(-2.0 * a, a - n, half));
            double value = BarrierFormula.Survivors(state, n, end, terms.Strike, weight, imageWeight);
            double atBarrier = discounted * WeightedTail.Gaussian(-0.5 * (a + m) * (a + m));
            if (terms.IsReverse)
                value -= BarrierFormula.Survivors(state, a, barrier, terms.Strike, atBarrier, atBarrier);
            value *= terms.Side;
            if (terms.IsIn)
            {
                double d2 = terms.Sign * terms.Side * (k + m);
                double vanilla = BlackFormula.Value(terms.Sign * asset, terms.Sign * cash, Math.FusedMultiplyAdd(terms.Sign, w, d2), d2);
                value = WeightedTail.NotNegative(vanilla - value);
                if (terms.Rebate > 0.0)
                    value = Math.FusedMultiplyAdd(terms.Rebate, BarrierFormula.Untouched(a, m, discounted, power * discounted, atBarrier), value);
                return open <= 0.0 ? vanilla : value;
            }

            value = WeightedTail.NotNegative(value);
            if (terms.Rebate > 0.0)
                value = Math.FusedMultiplyAdd(terms.Rebate, HitRebate.Value(a, m, at.Discount, atBarrier), value);
            return open <= 0.0 ? terms.Rebate : value;
        }

        [MethodImpl(MethodImplOptions.AggressiveInlining)]
        public static Vector512<double> Value(in BarrierOptionTerms terms, in MarketLanes at)
        {
            Vector512<double> side = Vector512.Create(terms.Side), strike = Vector512.Create(terms.Strike), rebate = Vector512.Create(terms.Rebate);
            Vector512<double> shift = Vector512.Create(terms.Shift), minusHalf = Vector512.Create(-0.5), minusTwo = Vector512.Create(-2.0);
            Vector512<double> w = WeightedTail.Deviation(at.Deviation);
            Vector512<double> open = Vector512.FusedMultiplyAdd(side, at.X, Vector512.Create(terms.BarrierGap));
            Vector512<double> a = Vector512.FusedMultiplyAdd(shift, w, open) / w;
            Vector512<double> k = Vector512.FusedMultiplyAdd(side, at.X, Vector512.Create(terms.StrikeGap)) / w;
            Vector512<double> m = side * Vector512.FusedMultiplyAdd(w, minusHalf, (at.Discount - at.Carry) / w);
            Vector512<double> barrier = Vector512.Create(terms.Barrier);
            if (terms.Shift > 0.0)
                barrier *= Exponential.Of(Vector512.Create(-terms.Side * terms.Shift) * w);
            Vector512<double> nearer = Vector512.LessThan(k, a);
            Vector512<double> n = Vector512.ConditionalSelect(nearer, k, a), end = Vector512.ConditionalSelect(nearer, strike, barrier);
            Vector512<double> discounted = Exponential.Of(-at.Discount), power = Exponential.Of(minusTwo * a * m);
            Vector512<double> asset = at.Spot * Exponential.Of(-at.Carry), cash = strike * discounted, ratio = barrier / at.Spot;
            var state = new BarrierLanes
            {
                Gap = a,
                Drift = m,
                Deviation = side * w,
                Asset = asset,
                Cash = cash,
                ImageAsset = power * asset * ratio * ratio,
                ImageCash = power * cash,
            };

            Vector512<double> half = minusHalf * (n + m) * (n + m);
            Vector512<double> weight = discounted * WeightedTail.Gaussian(half);
            Vector512<double> imageWeight = discounted * WeightedTail.Gaussian(Vector512.FusedMultiplyAdd(minusTwo * a, a - n, half));
            Vector512<double> value = BarrierFormula.Survivors(state, n, end, strike, weight, imageWeight);
            Vector512<double> atBarrier = terms.IsReverse || terms.Rebate > 0.0
                ? discounted * WeightedTail.Gaussian(minusHalf * (a + m) * (a + m))
                : Vector512<double>.Zero;
            if (terms.IsReverse)
                value -= BarrierFormula.Survivors(state, a, barrier, strike, atBarrier, atBarrier);
            value *= side;
            Vector512<double> touched = Vector512.LessThanOrEqual(open, Vector512<double>.Zero);
            if (terms.IsIn)
            {
                Vector512<double> sign = Vector512.Create(terms.Sign);
                Vector512<double> d2 = Vector512.Create(terms.Sign * terms.Side) * (k + m);
                Vector512<double> vanilla = BlackFormula.Value(sign * asset, sign * cash, Vector512.FusedMultiplyAdd(sign, w, d2), d2);
                value = WeightedTail.NotNegative(vanilla - value);
                if (terms.Rebate > 0.0)
                    value = Vector512.FusedMultiplyAdd(rebate, BarrierFormula.Untouched(a, m, discounted, power * discounted, atBarrier), value);
                return Vector512.ConditionalSelect(touched, vanilla, value);
            }

            value = WeightedTail.NotNegative(value);
            if (terms.Rebate > 0.0)
                value = Vector512.FusedMultiplyAdd(rebate, HitRebate.Value(a, m, at.Discount, atBarrier), value);
            return Vector512.ConditionalSelect(touched, rebate, value);
        }
    }
}
