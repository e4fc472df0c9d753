using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>The value of one unit in a scenario, in two forms that agree to the last bit.</summary>
internal interface IMarketPayoff<TTerms>
    where TTerms : struct
{
    static abstract double Value(in TTerms terms, in MarketPoint at);

    static abstract Vector512<double> Value(in TTerms terms, in MarketLanes at);
}

/// <summary>The one loop that carries a payoff over the scenarios of a block.</summary>
internal static class MarketPayoff
{
    /// <summary>profit[s] += quantity·(value(s) - baseValue); what does not fill eight lanes goes through the scalar form.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Accumulate<TTerms, TPayoff>(in TTerms terms, in MarketSpans market, double quantity, double baseValue, Span<double> profit)
        where TTerms : struct
        where TPayoff : struct, IMarketPayoff<TTerms>
    {
        market.RequireProfit(profit);
        ref double to = ref MemoryMarshal.GetReference(profit);
        Vector512<double> units = Vector512.Create(quantity), today = Vector512.Create(baseValue);
        nuint s = 0, length = (nuint)market.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> value = TPayoff.Value(terms, market.Eight(s));
            Vector512.FusedMultiplyAdd(units, value - today, Vector512.LoadUnsafe(ref to, s)).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < market.Length; i++)
            profit[i] = Math.FusedMultiplyAdd(quantity, TPayoff.Value(terms, market[i]) - baseValue, profit[i]);
    }
}
