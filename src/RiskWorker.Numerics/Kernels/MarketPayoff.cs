using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>The one loop that carries a payoff over the scenarios of a block.</summary>
internal static class MarketPayoff
{
    /// <summary>profit[s] += quantity·(value(s) - baseValue); what does not fill eight lanes goes through the scalar form.</summary>
    [MethodImpl(Workbench.Loop)]
    public static void Accumulate<TTerms, TPayoff>(in TTerms terms, in MarketSpans market, double quantity, double baseValue, Span<double> profit)
        where TTerms : struct
        where TPayoff : struct, IMarketPayoff<TTerms>
    {
        market.RequireProfit(profit);
        Span<double> room = stackalloc double[(TPayoff.Rows + 1) * Workbench.Width];
        int whole = market.Length & ~7;
        for (int s = 0; s < whole; s += Workbench.Width)
        {
            int length = Math.Min(whole - s, Workbench.Width);
            var bench = new Workbench(room, length);
            TPayoff.Values(terms, market.Slice(s, length), bench);
            Add(bench.Values, quantity, baseValue, profit.Slice(s, length));
        }

        for (int s = whole; s < market.Length; s++)
            profit[s] = Math.FusedMultiplyAdd(quantity, TPayoff.Value(terms, market[s]) - baseValue, profit[s]);
    }

    [MethodImpl(Workbench.Loop)]
    private static void Add(Span<double> values, double quantity, double baseValue, Span<double> profit)
    {
        ref double from = ref MemoryMarshal.GetReference(values);
        ref double to = ref MemoryMarshal.GetReference(profit);
        Vector512<double> units = Vector512.Create(quantity), today = Vector512.Create(baseValue);
        for (nuint s = 0; s < (nuint)profit.Length; s += 8)
            Vector512.FusedMultiplyAdd(units, Vector512.LoadUnsafe(ref from, s) - today, Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
    }
}
