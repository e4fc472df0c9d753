using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The formula of a barrier option in units of w = σ√T, mirrored so that the barrier lies below: gaps are positive upwards.
/// The logarithm to the barrier is a·w, to the strike k·w; m is the drift of the logarithm, so that with D₂ = n + m and
/// D₁ = D₂ ± w the event of ending above M = n·w lower has the terms asset·Φ(D₁) and cash·Φ(D₂), and its mirror image beyond the
/// barrier the same at D - 2a, times P = (H/S)^(2μ) = e^(-2am).
/// </summary>
/// <remarks>
/// Paths that end above M, the higher of strike and barrier, without a touch have the event less its image; where the payoff ends at the
/// barrier (an up call, a down put) the same at M = H is taken off. The image's weights are those of the event times
/// e^(-2a(a-n)), 1 where M is the barrier: no power of H/S ever stands alone with a tail that undoes it, since where D - 2a is positive
/// P is 2 at most. A knock-in is the plain option less the knock-out.
/// </remarks>
internal readonly struct BarrierPayoff : IMarketPayoff<BarrierOptionTerms>
{
    // Rows: exponents that become exponentials in place, then gaps and drift, then the terms' arguments and weights, then two results.
    private const int Discounted = 0, Growth = 1, Power = 2, Weight = 3, ImageWeight = 4, AtBarrier = 5, Extra = 6, Shift = 7;
    private const int Gap = 8, Drift = 9, StrikeGap = 10, Deviation = 11, Arguments = 12, Weights = 20, Vanilla = 28, Rebate = 29;

    public static int Rows => 30;

    public static double Value(in BarrierOptionTerms terms, in MarketPoint at)
    {
        double w = WeightedTail.Deviation(at.Deviation), side = terms.Side, strike = terms.Strike;
        double open = Math.FusedMultiplyAdd(side, at.X, terms.BarrierGap);
        double a = Math.FusedMultiplyAdd(terms.Shift, w, open) / w;
        double k = Math.FusedMultiplyAdd(side, at.X, terms.StrikeGap) / w;
        double m = side * Math.FusedMultiplyAdd(w, -0.5, (at.Discount - at.Carry) / w);
        double n = k < a ? k : a, deviation = side * w;
        double half = -0.5 * (n + m) * (n + m);
        double barrier = terms.Shift > 0.0 ? terms.Barrier * Exponential.Of(-side * terms.Shift * w) : terms.Barrier;
        double discounted = Exponential.Of(-at.Discount), power = Exponential.Of(-2.0 * a * m);
        double weight = discounted * Exponential.Of(half), imageWeight = discounted * Exponential.Of(Math.FusedMultiplyAdd(-2.0 * a, a - n, half));
        double atBarrier = discounted * Exponential.Of(-0.5 * (a + m) * (a + m));
        double asset = Exponential.Of(-at.Carry) * at.Spot, cash = strike * discounted, ratio = barrier / at.Spot;
        double imageAsset = power * asset * ratio * ratio, imageCash = power * cash;

        double end = k < a ? strike : barrier, d2 = n + m, d1 = d2 + deviation, i2 = d2 - (2.0 * a), i1 = d1 - (2.0 * a);
        double value = WeightedTail.Level(asset, d1) - WeightedTail.Level(cash, d2) - WeightedTail.Level(imageAsset, i1) + WeightedTail.Level(imageCash, i2);
        double b2 = a + m, b1 = b2 + deviation, j2 = b2 - (2.0 * a), j1 = b1 - (2.0 * a);
        if (terms.IsReverse)
            value = value - WeightedTail.Level(asset, b1) + WeightedTail.Level(cash, b2) + WeightedTail.Level(imageAsset, j1) - WeightedTail.Level(imageCash, j2);
        value = WeightedTail.Add(WeightedTail.Add(value, end * weight, d1), -strike * weight, d2);
        value = WeightedTail.Add(WeightedTail.Add(value, -end * imageWeight, i1), strike * imageWeight, i2);
        if (terms.IsReverse)
        {
            value = WeightedTail.Add(WeightedTail.Add(value, -barrier * atBarrier, b1), strike * atBarrier, b2);
            value = WeightedTail.Add(WeightedTail.Add(value, barrier * atBarrier, j1), -strike * atBarrier, j2);
        }

        if (terms.IsIn)
        {
            double v2 = terms.Sign * side * (k + m);
            double vanilla = BlackFormula.Value(terms.Sign * asset, terms.Sign * cash, Math.FusedMultiplyAdd(terms.Sign, w, v2), v2);
            value = WeightedTail.NotNegative(Math.FusedMultiplyAdd(-side, value, vanilla));
            if (terms.Rebate > 0.0)
            {
                double untouched = WeightedTail.Level(discounted, b2) - WeightedTail.Level(power * discounted, j2);
                untouched = WeightedTail.Add(WeightedTail.Add(untouched, atBarrier, b2), -atBarrier, j2);
                value = Math.FusedMultiplyAdd(terms.Rebate, untouched, value);
            }

            return open <= 0.0 ? vanilla : value;
        }

        value = WeightedTail.NotNegative(side * value);
        if (terms.Rebate > 0.0)
            value = Math.FusedMultiplyAdd(terms.Rebate, HitRebate.Value(a, m, at.Discount, atBarrier), value);
        return open <= 0.0 ? terms.Rebate : value;
    }

    public static void Values(in BarrierOptionTerms terms, in MarketSpans market, in Workbench bench)
    {
        bool hasRebate = terms.Rebate > 0.0;
        Prepare(terms, market, bench);
        bench.Exponentials(Discounted, terms.IsReverse || hasRebate ? 6 : 5);
        if (terms.IsIn || hasRebate)
            bench.Exponentials(Extra, 1);
        if (terms.Shift > 0.0)
            bench.Exponentials(Shift, 1);
        Survivors(terms, market.Spot, bench);
        if (terms.IsReverse)
            Beyond(terms, market.Spot, bench);
        bench.AddTails(Workbench.Result, Weights, Arguments, terms.IsReverse ? 8 : 4);
        if (terms.IsIn)
        {
            Plain(terms, market, bench);
            bench.AddTails(Vanilla, Weights, Arguments, 2);
        }

        if (hasRebate)
        {
            if (terms.IsIn)
                Untouched(bench);
            else
                Hit(market.Discount, bench);
            bench.AddTails(Rebate, Weights, Arguments, 2);
            if (!terms.IsIn)
                HitRebate.Mend(bench[Gap], bench[Drift], market.Discount, bench[Weights], bench[Rebate]);
        }

        Finish(terms, market.X, bench);
    }

    [MethodImpl(Workbench.Loop)]
    private static void Prepare(in BarrierOptionTerms terms, in MarketSpans market, in Workbench bench)
    {
        ref double moves = ref MemoryMarshal.GetReference(market.X);
        ref double discounts = ref MemoryMarshal.GetReference(market.Discount);
        ref double carries = ref MemoryMarshal.GetReference(market.Carry);
        ref double deviations = ref MemoryMarshal.GetReference(market.Deviation);
        Vector512<double> side = Vector512.Create(terms.Side), minusHalf = Vector512.Create(-0.5), minusTwo = Vector512.Create(-2.0);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> w = WeightedTail.Deviation(Vector512.LoadUnsafe(ref deviations, s)), x = Vector512.LoadUnsafe(ref moves, s);
            Vector512<double> discount = Vector512.LoadUnsafe(ref discounts, s), carry = Vector512.LoadUnsafe(ref carries, s);
            Vector512<double> open = Vector512.FusedMultiplyAdd(side, x, Vector512.Create(terms.BarrierGap));
            Vector512<double> a = Vector512.FusedMultiplyAdd(Vector512.Create(terms.Shift), w, open) / w;
            Vector512<double> k = Vector512.FusedMultiplyAdd(side, x, Vector512.Create(terms.StrikeGap)) / w;
            Vector512<double> m = side * Vector512.FusedMultiplyAdd(w, minusHalf, (discount - carry) / w);
            Vector512<double> n = Vector512.ConditionalSelect(Vector512.LessThan(k, a), k, a), half = minusHalf * (n + m) * (n + m);
            bench.Store(Gap, s, a);
            bench.Store(Drift, s, m);
            bench.Store(StrikeGap, s, k);
            bench.Store(Deviation, s, side * w);
            bench.Store(Discounted, s, -discount);
            bench.Store(Growth, s, -carry);
            bench.Store(Power, s, minusTwo * a * m);
            bench.Store(Weight, s, half);
            bench.Store(ImageWeight, s, Vector512.FusedMultiplyAdd(minusTwo * a, a - n, half));
            bench.Store(AtBarrier, s, minusHalf * (a + m) * (a + m));
            bench.Store(Shift, s, Vector512.Create(-terms.Side * terms.Shift) * w);
            if (terms.IsIn)
                bench.Store(Extra, s, BlackFormula.Exponent(Plain1(terms, w, k, m)));
            else
                bench.Store(Extra, s, HitRebate.Parts(a, m, discount).Exponent);
        }
    }

    [MethodImpl(Workbench.Loop)]
    private static void Survivors(in BarrierOptionTerms terms, ReadOnlySpan<double> spot, in Workbench bench)
    {
        ref double levels = ref MemoryMarshal.GetReference(spot);
        Vector512<double> strike = Vector512.Create(terms.Strike), two = Vector512.Create(2.0);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> discounted = bench.Load(Discounted, s), power = bench.Load(Power, s), level = Vector512.LoadUnsafe(ref levels, s);
            Vector512<double> barrier = BarrierOf(terms, bench, s), ratio = barrier / level;
            Vector512<double> asset = bench.Load(Growth, s) * level, cash = strike * discounted;
            Vector512<double> a = bench.Load(Gap, s), k = bench.Load(StrikeGap, s), nearer = Vector512.LessThan(k, a);
            Vector512<double> n = Vector512.ConditionalSelect(nearer, k, a), end = Vector512.ConditionalSelect(nearer, strike, barrier);
            Vector512<double> d2 = n + bench.Load(Drift, s), d1 = d2 + bench.Load(Deviation, s), i2 = d2 - (two * a), i1 = d1 - (two * a);
            Vector512<double> value = WeightedTail.Level(asset, d1) - WeightedTail.Level(cash, d2)
                - WeightedTail.Level(power * asset * ratio * ratio, i1) + WeightedTail.Level(power * cash, i2);
            Vector512<double> weight = discounted * bench.Load(Weight, s), imageWeight = discounted * bench.Load(ImageWeight, s);
            bench.Store(Workbench.Result, s, value);
            bench.Store(Arguments, s, d1);
            bench.Store(Arguments + 1, s, d2);
            bench.Store(Arguments + 2, s, i1);
            bench.Store(Arguments + 3, s, i2);
            bench.Store(Weights, s, end * weight);
            bench.Store(Weights + 1, s, -strike * weight);
            bench.Store(Weights + 2, s, -end * imageWeight);
            bench.Store(Weights + 3, s, strike * imageWeight);
        }
    }

    /// <summary>Takes off the paths that end above the barrier.</summary>
    [MethodImpl(Workbench.Loop)]
    private static void Beyond(in BarrierOptionTerms terms, ReadOnlySpan<double> spot, in Workbench bench)
    {
        ref double levels = ref MemoryMarshal.GetReference(spot);
        Vector512<double> strike = Vector512.Create(terms.Strike), two = Vector512.Create(2.0);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> discounted = bench.Load(Discounted, s), power = bench.Load(Power, s), level = Vector512.LoadUnsafe(ref levels, s);
            Vector512<double> barrier = BarrierOf(terms, bench, s), ratio = barrier / level;
            Vector512<double> asset = bench.Load(Growth, s) * level, cash = strike * discounted;
            Vector512<double> a = bench.Load(Gap, s), d2 = a + bench.Load(Drift, s), d1 = d2 + bench.Load(Deviation, s), i2 = d2 - (two * a), i1 = d1 - (two * a);
            Vector512<double> value = bench.Load(Workbench.Result, s) - WeightedTail.Level(asset, d1) + WeightedTail.Level(cash, d2)
                + WeightedTail.Level(power * asset * ratio * ratio, i1) - WeightedTail.Level(power * cash, i2);
            Vector512<double> weight = discounted * bench.Load(AtBarrier, s);
            bench.Store(Workbench.Result, s, value);
            bench.Store(Arguments + 4, s, d1);
            bench.Store(Arguments + 5, s, d2);
            bench.Store(Arguments + 6, s, i1);
            bench.Store(Arguments + 7, s, i2);
            bench.Store(Weights + 4, s, -barrier * weight);
            bench.Store(Weights + 5, s, strike * weight);
            bench.Store(Weights + 6, s, barrier * weight);
            bench.Store(Weights + 7, s, -strike * weight);
        }
    }

    /// <summary>The plain option, as <see cref="BlackFormula"/> has it.</summary>
    [MethodImpl(Workbench.Loop)]
    private static void Plain(in BarrierOptionTerms terms, in MarketSpans market, in Workbench bench)
    {
        ref double levels = ref MemoryMarshal.GetReference(market.Spot);
        ref double deviations = ref MemoryMarshal.GetReference(market.Deviation);
        Vector512<double> sign = Vector512.Create(terms.Sign), strike = Vector512.Create(terms.Strike);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> w = WeightedTail.Deviation(Vector512.LoadUnsafe(ref deviations, s)), k = bench.Load(StrikeGap, s), m = bench.Load(Drift, s);
            Vector512<double> d1 = Plain1(terms, w, k, m), d2 = Plain2(terms, k, m);
            Vector512<double> asset = sign * (bench.Load(Growth, s) * Vector512.LoadUnsafe(ref levels, s)), cash = sign * (strike * bench.Load(Discounted, s));
            Vector512<double> weight = asset * bench.Load(Extra, s);
            bench.Store(Vanilla, s, WeightedTail.Level(asset, d1) - WeightedTail.Level(cash, d2));
            bench.Store(Arguments, s, d1);
            bench.Store(Arguments + 1, s, d2);
            bench.Store(Weights, s, weight);
            bench.Store(Weights + 1, s, -weight);
        }
    }

    /// <summary>e^(-rT) P(never touched): what one unit paid at expiry by a knock-in that did not knock is worth.</summary>
    [MethodImpl(Workbench.Loop)]
    private static void Untouched(in Workbench bench)
    {
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> discounted = bench.Load(Discounted, s), a = bench.Load(Gap, s), d2 = a + bench.Load(Drift, s), i2 = d2 - (Vector512.Create(2.0) * a);
            Vector512<double> weight = discounted * bench.Load(AtBarrier, s);
            bench.Store(Rebate, s, WeightedTail.Level(discounted, d2) - WeightedTail.Level(bench.Load(Power, s) * discounted, i2));
            bench.Store(Arguments, s, d2);
            bench.Store(Arguments + 1, s, i2);
            bench.Store(Weights, s, weight);
            bench.Store(Weights + 1, s, -weight);
        }
    }

    /// <summary>One unit paid at the hit; see <see cref="HitRebate"/>.</summary>
    [MethodImpl(Workbench.Loop)]
    private static void Hit(ReadOnlySpan<double> discount, in Workbench bench)
    {
        ref double discounts = ref MemoryMarshal.GetReference(discount);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> a = bench.Load(Gap, s), root = HitRebate.Parts(a, bench.Load(Drift, s), Vector512.LoadUnsafe(ref discounts, s)).Root;
            Vector512<double> near = root - a, weight = bench.Load(Discounted, s) * bench.Load(AtBarrier, s);
            bench.Store(Rebate, s, WeightedTail.Level(bench.Load(Extra, s), near));
            bench.Store(Arguments, s, near);
            bench.Store(Arguments + 1, s, -root - a);
            bench.Store(Weights, s, weight);
            bench.Store(Weights + 1, s, weight);
        }
    }

    [MethodImpl(Workbench.Loop)]
    private static void Finish(in BarrierOptionTerms terms, ReadOnlySpan<double> x, in Workbench bench)
    {
        ref double moves = ref MemoryMarshal.GetReference(x);
        Vector512<double> side = Vector512.Create(terms.Side), rebate = Vector512.Create(terms.Rebate);
        for (nuint s = 0; s < (nuint)bench.Length; s += 8)
        {
            Vector512<double> open = Vector512.FusedMultiplyAdd(side, Vector512.LoadUnsafe(ref moves, s), Vector512.Create(terms.BarrierGap));
            Vector512<double> value = bench.Load(Workbench.Result, s), known = rebate;
            if (terms.IsIn)
            {
                known = WeightedTail.NotNegative(bench.Load(Vanilla, s));
                value = WeightedTail.NotNegative(Vector512.FusedMultiplyAdd(-side, value, known));
            }
            else
            {
                value = WeightedTail.NotNegative(side * value);
            }

            if (terms.Rebate > 0.0)
                value = Vector512.FusedMultiplyAdd(rebate, bench.Load(Rebate, s), value);
            bench.Store(Workbench.Result, s, Vector512.ConditionalSelect(Vector512.LessThanOrEqual(open, Vector512<double>.Zero), known, value));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> BarrierOf(in BarrierOptionTerms terms, in Workbench bench, nuint s) =>
        terms.Shift > 0.0 ? Vector512.Create(terms.Barrier) * bench.Load(Shift, s) : Vector512.Create(terms.Barrier);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Plain2(in BarrierOptionTerms terms, Vector512<double> k, Vector512<double> m) =>
        Vector512.Create(terms.Sign * terms.Side) * (k + m);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Plain1(in BarrierOptionTerms terms, Vector512<double> w, Vector512<double> k, Vector512<double> m) =>
        Vector512.FusedMultiplyAdd(Vector512.Create(terms.Sign), w, Plain2(terms, k, m));
}
