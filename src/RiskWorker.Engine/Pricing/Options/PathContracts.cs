using RiskWorker.Domain.Instruments;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Paths;

namespace RiskWorker.Engine.Pricing.Options;

/// <summary>Formulas of options on a path, given what of the path is known. A payoff of one's own is added here and in <c>Numerics/Paths</c>.</summary>
internal static class PathContracts
{
    /// <summary>An option on an arithmetic average.</summary>
    /// <param name="seed">Seed of the run.</param>
    /// <param name="option">The option.</param>
    /// <param name="date">Valuation date.</param>
    /// <param name="past">Levels of the fixings so far, or of all closes since the issue of a continuous average.</param>
    public static OptionFormula Arithmetic(ulong seed, Asian option, DateOnly date, IReadOnlyList<double> past)
    {
        var (strike, isCall, years) = (option.Strike, option.Right == OptionRight.Call, Years(date, option.Expiry));
        var (sum, mean) = (past.Sum(), past.Count > 0 ? past.Sum() / past.Count : 0);
        double[] toCome = [.. option.Fixings.Fixings.Where(f => f.Date > date).Select(f => Years(date, f.Date))];
        var sign = isCall ? 1 : -1;
        if (years == 0) return new SettledFormula(Math.Max(sign * (mean - strike), 0));
        if (!option.Fixings.IsContinuous && toCome.Length == 0) return new DiscountedFormula(Math.Max(sign * (mean - strike), 0));
        var elapsed = option.Issue is { } issue ? Years(issue, date) : 0;
        return option.Fixings.IsContinuous
            ? new PathFormula(seed, years, (rate, yield) => ArithmeticAsianPayoff.Continuous(rate, yield, years, Math.Max(elapsed, 0), mean, strike, isCall), [1, strike, sign, elapsed, mean])
            : new PathFormula(seed, years, (rate, yield) => ArithmeticAsianPayoff.OfFixings(PathSchedule.Flat(toCome, rate, yield, years), past.Count, sum, strike, isCall),
                [2, strike, sign, past.Count, sum, .. toCome]);
    }

    /// <summary>A lookback option; <paramref name="extreme"/> is that of the closes since its issue, today's included, or null.</summary>
    public static OptionFormula Lookback(ulong seed, Lookback option, DateOnly date, double? extreme, IReadOnlyList<DateOnly> days)
    {
        var (isCall, years, isContinuous) = (option.Right == OptionRight.Call, Years(date, option.Expiry), option.Monitoring == Monitoring.Continuous);
        if (years == 0) return new ExpiringLookback(option.Strike, extreme, isCall);
        double[] looks = isContinuous ? [years] : [.. days.Select(d => Years(date, d))];
        return new PathFormula(seed, years, (rate, yield) => new LookbackPayoff(PathSchedule.Flat(looks, rate, yield, years), isContinuous, option.Strike, extreme, isCall),
            [3, option.Strike ?? 0, isCall ? 1 : -1, isContinuous ? 1 : 0, extreme ?? 0, .. looks], Level(option.Strike, extreme, isCall));
    }

    // Beyond the extreme so far, or the strike where that lies beyond it, the spot itself sets the extreme.
    private static double? Level(double? strike, double? extreme, bool isCall) =>
        strike is { } k && extreme is { } past ? (isCall ? Math.Max(k, past) : Math.Min(k, past)) : strike ?? extreme;

    private static double Years(DateOnly from, DateOnly to) => Curves.CurveTime.Between(from, to);

    /// <summary>An amount that is known and paid at expiry.</summary>
    private sealed class DiscountedFormula(double amount) : OptionFormula
    {
        public override double Value(in MarketPoint market) => amount * Exponential.Of(-market.Discount);

        public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit)
        {
            for (var s = 0; s < profit.Length; s++) profit[s] = Math.FusedMultiplyAdd(quantity, Value(market[s]) - baseValue, profit[s]);
        }

        public override IEnumerable<double> Numbers() => [9, amount];
    }

    /// <summary>A lookback on its last day: what the extreme so far, or the level at the close, pays.</summary>
    private sealed class ExpiringLookback(double? strike, double? extreme, bool isCall) : OptionFormula
    {
        public override double Value(in MarketPoint market)
        {
            var isHighest = isCall == strike.HasValue;
            var reached = extreme is { } past ? (isHighest ? Math.Max(past, market.Spot) : Math.Min(past, market.Spot)) : market.Spot;
            if (strike is { } k) return Math.Max(isCall ? reached - k : k - reached, 0);
            return isCall ? market.Spot - reached : reached - market.Spot;
        }

        public override void Accumulate(in MarketSpans market, double quantity, double baseValue, Span<double> profit)
        {
            for (var s = 0; s < profit.Length; s++) profit[s] = Math.FusedMultiplyAdd(quantity, Value(market[s]) - baseValue, profit[s]);
        }

        public override IEnumerable<double> Numbers() => [10, strike ?? 0, extreme ?? 0, isCall ? 1 : 0];
    }
}
