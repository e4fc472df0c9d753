using System.Runtime.CompilerServices;
using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>Full revaluation: the profit of every holding of a slice, formula by formula, summed by cell.</summary>
/// <remarks>Compiled well at the first call: a run is over before code that starts out plain would have been promoted.</remarks>
internal static class HoldingProfits
{
    /// <summary>Adds the profits of <paramref name="slice"/> in the lanes of <paramref name="market"/> to their cells.</summary>
    /// <param name="slice">What to revalue.</param>
    /// <param name="market">The market, at the close that it is revalued at.</param>
    /// <param name="cells">Profit by cell of the plan.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Add(PlanSlice slice, MarketLanes market, LaneTable cells)
    {
        // By index throughout: an enumerator of an interface would be allocated for every tile.
        foreach (var held in slice.Groups)
        {
            var group = slice.HeldGroups[held.Group];
            market.Underlying(group.Key);
            AddLinear(group, held.Linear, market, cells);
            for (var b = 0; b < held.Options.Length; b++) AddOptions(group.Options[b], held.Options[b], market, cells);
            for (var b = 0; b < held.Formulas.Length; b++) AddFormulas(group.Formulas[b], held.Formulas[b], market, cells);
        }
        AddFlows(slice, market, cells);
    }

    /// <summary>Adds the discounted amounts of a slice.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddFlows(PlanSlice slice, MarketLanes market, LaneTable cells)
    {
        foreach (var held in slice.Flows)
        {
            var batch = slice.HeldFlows[held.Batch];
            var factors = market.DiscountFactors(batch.Exponent);
            for (var i = held.Amounts.From; i < held.Amounts.To; i++) BookProfit.AddLinear(factors, batch.Factor, batch.Amounts[i].Units, cells[batch.Amounts[i].Cell]);
        }
    }

    /// <summary>Adds options of any formula on an underlying that the market has been moved to.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddFormulas(FormulaBatch batch, ItemRange range, MarketLanes market, LaneTable cells)
    {
        if (range.IsEmpty) return;
        var seen = market.Terms(batch.Market);
        for (var i = range.From; i < range.To; i++)
        {
            ref readonly var item = ref batch.Items[i];
            item.Formula.Accumulate(seen, item.Quantity, item.BaseValue, cells[item.Cell]);
        }
    }

    /// <summary>Adds the linear holdings of an underlying that the market has been moved to.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddLinear(UnderlyingGroup group, ItemRange range, MarketLanes market, LaneTable cells)
    {
        for (var h = range.From; h < range.To; h++) BookProfit.AddLinear(market.Spots, group.Spot, group.Linear[h].Units, cells[group.Linear[h].Cell]);
    }

    /// <summary>Adds options of an underlying that the market has been moved to; the market's volatility is theirs afterwards.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddOptions(OptionBatch batch, ItemRange range, MarketLanes market, LaneTable cells)
    {
        if (range.IsEmpty) return;
        if (batch.VolatilityFactor >= 0) market.Volatility(batch.VolatilityFactor);
        for (var i = range.From; i < range.To; i++) AddOption(batch, i, market, cells);
    }

    /// <summary>Adds one option; the market has been moved to its underlying and its volatility.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void AddOption(OptionBatch batch, int place, MarketLanes market, LaneTable cells)
    {
        ref readonly var item = ref batch.Items[place];
        ref readonly var terms = ref batch.Terms[place];
        if (batch.VolatilityFactor < 0)
            EuropeanOption.AccumulateValue(terms, market.Returns, market.Spots, item.Quantity, item.BaseValue, cells[item.Cell]);
        else
            EuropeanOption.AccumulateValue(terms, market.Returns, market.Spots, market.Volatilities, item.Quantity, item.BaseValue, cells[item.Cell]);
    }
}
