using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The sums that lead from moved prices to a book's loss. Elementwise over scenarios, every product fused with the sum
/// that follows it; a NaN stays one; allocates nothing.
/// </summary>
public static class BookProfit
{
    /// <summary>profit + units·(spot - spot0).</summary>
    public static double AddLinear(double spot, double spot0, double units, double profit) =>
        Math.FusedMultiplyAdd(units, spot - spot0, profit);

    /// <summary>total + profit·rate + value·(rate - rate0): the profit in another currency of what was worth <paramref name="value"/>.</summary>
    public static double AddConverted(double profit, double value, double rate, double rate0, double total) =>
        Math.FusedMultiplyAdd(profit, rate, Math.FusedMultiplyAdd(value, rate - rate0, total));

    /// <summary>(value0/rate0) - (value0 + profit)/rate, without adding the small profit to the large value first.</summary>
    public static double LossInCurrency(double profit, double value0, double rate, double rate0) =>
        Math.FusedMultiplyAdd(value0 / rate0, rate - rate0, -profit) / rate;

    /// <summary>profit[s] += units·(spot[s] - spot0).</summary>
    /// <param name="spot">Levels of the scenarios.</param>
    /// <param name="spot0">Level today.</param>
    /// <param name="units">Units held.</param>
    /// <param name="profit">As long as <paramref name="spot"/>.</param>
    [ScalarTwin(nameof(AddLinear))]
    public static void AddLinear(ReadOnlySpan<double> spot, double spot0, double units, Span<double> profit)
    {
        Spans.RequireLength(spot.Length, profit.Length, nameof(profit));
        ref double levels = ref MemoryMarshal.GetReference(spot);
        ref double to = ref MemoryMarshal.GetReference(profit);
        Vector512<double> today = Vector512.Create(spot0), held = Vector512.Create(units);
        nuint s = 0, length = (nuint)spot.Length;
        for (; s + 8 <= length; s += 8)
            Vector512.FusedMultiplyAdd(held, Vector512.LoadUnsafe(ref levels, s) - today, Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
        for (int i = (int)s; i < spot.Length; i++)
            profit[i] = AddLinear(spot[i], spot0, units, profit[i]);
    }

    /// <summary>total[s] += profit[s]·rate[s] + value·(rate[s] - rate0).</summary>
    /// <param name="profit">Profit in the currency.</param>
    /// <param name="value">Value today in the currency.</param>
    /// <param name="rate">Price of the currency in each scenario.</param>
    /// <param name="rate0">Its price today.</param>
    /// <param name="total">As long as <paramref name="profit"/>.</param>
    [ScalarTwin(nameof(AddConverted))]
    public static void AddConverted(ReadOnlySpan<double> profit, double value, ReadOnlySpan<double> rate, double rate0, Span<double> total)
    {
        Spans.RequireLength(profit.Length, rate.Length, nameof(rate));
        Spans.RequireLength(profit.Length, total.Length, nameof(total));
        ref double profits = ref MemoryMarshal.GetReference(profit);
        ref double rates = ref MemoryMarshal.GetReference(rate);
        ref double to = ref MemoryMarshal.GetReference(total);
        Vector512<double> today = Vector512.Create(rate0), values = Vector512.Create(value);
        nuint s = 0, length = (nuint)profit.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> price = Vector512.LoadUnsafe(ref rates, s);
            Vector512<double> moved = Vector512.FusedMultiplyAdd(values, price - today, Vector512.LoadUnsafe(ref to, s));
            Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref profits, s), price, moved).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < profit.Length; i++)
            total[i] = AddConverted(profit[i], value, rate[i], rate0, total[i]);
    }

    /// <summary>loss[s] = value0/rate0 - (value0 + profit[s])/rate[s].</summary>
    /// <param name="profit">Profit in the reporting currency.</param>
    /// <param name="value0">Value today in the reporting currency.</param>
    /// <param name="rate">Price of the node's currency in each scenario.</param>
    /// <param name="rate0">Its price today.</param>
    /// <param name="loss">As long as <paramref name="profit"/>.</param>
    [ScalarTwin(nameof(LossInCurrency))]
    public static void LossInCurrency(ReadOnlySpan<double> profit, double value0, ReadOnlySpan<double> rate, double rate0, Span<double> loss)
    {
        Spans.RequireLength(profit.Length, rate.Length, nameof(rate));
        Spans.RequireLength(profit.Length, loss.Length, nameof(loss));
        ref double profits = ref MemoryMarshal.GetReference(profit);
        ref double rates = ref MemoryMarshal.GetReference(rate);
        ref double to = ref MemoryMarshal.GetReference(loss);
        Vector512<double> today = Vector512.Create(rate0), value = Vector512.Create(value0 / rate0);
        nuint s = 0, length = (nuint)profit.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> price = Vector512.LoadUnsafe(ref rates, s);
            (Vector512.FusedMultiplyAdd(value, price - today, -Vector512.LoadUnsafe(ref profits, s)) / price).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < profit.Length; i++)
            loss[i] = LossInCurrency(profit[i], value0, rate[i], rate0);
    }
}
