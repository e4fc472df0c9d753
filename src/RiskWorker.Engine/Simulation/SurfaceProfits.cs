using System.Runtime.CompilerServices;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Surfaces;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>
/// Revaluation by surface: one polynomial for all options of a cell on the same underlying, full revaluation for what has none
/// and in the lanes that lie outside a surface.
/// </summary>
internal sealed class SurfaceProfits(RevaluationPlan plan, SurfaceSet surfaces, int capacity)
{
    private readonly PlanSlice _whole = PlanSlice.Whole(plan);
    private readonly double[] _z = new double[capacity];
    private readonly double[] _w = new double[capacity];
    private readonly double[] _before = new double[capacity];

    /// <summary>Adds the profits of the whole plan in the lanes of <paramref name="market"/> to their cells.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Add(MarketLanes market, int horizon, LaneTable cells)
    {
        foreach (var held in _whole.Groups)
        {
            var group = plan.Groups[held.Group];
            var fitted = surfaces.Of(horizon, held.Group);
            market.Underlying(group.Key);
            HoldingProfits.AddLinear(group, held.Linear, market, cells);
            var z = _z.AsSpan(0, market.Width);
            var isInside = !fitted.HasAny || UnitScale.Apply(market.Returns, fitted.Underlying.Scale, fitted.Underlying.Offset, z);
            for (var b = 0; b < fitted.Batches.Length; b++) AddBatch(group.Options[b], fitted.Batches[b], market, z, isInside, cells);
            for (var b = 0; b < held.Formulas.Length; b++) HoldingProfits.AddFormulas(group.Formulas[b], held.Formulas[b], market, cells);
        }
        HoldingProfits.AddFlows(_whole, market, cells);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void AddBatch(OptionBatch batch, BatchSurfaces fitted, MarketLanes market, ReadOnlySpan<double> z, bool isInside, LaneTable cells)
    {
        var w = _w.AsSpan(0, market.Width);
        if (batch.VolatilityFactor >= 0)
        {
            market.Volatility(batch.VolatilityFactor);
            if (fitted.Surfaces.Length > 0) isInside &= UnitScale.Apply(market.VolatilityReturns, fitted.Volatility.Scale, fitted.Volatility.Offset, w);
        }
        foreach (var surface in fitted.Surfaces)
        {
            var profit = cells[surface.Cell];
            if (!isInside) profit.CopyTo(_before);
            if (surface.Columns == 1) PolynomialSum.Add(surface.Coefficients, z, profit);
            else PolynomialSum.Add(surface.Coefficients, surface.Columns, z, w, profit);
            if (!isInside) RevalueOutside(batch, surface, market, z, w, profit);
        }
        foreach (var range in fitted.Direct)
        {
            for (var i = range.From; i < range.To; i++) HoldingProfits.AddOption(batch, i, market, cells);
        }
    }

    private void RevalueOutside(OptionBatch batch, PriceSurface surface, MarketLanes market, ReadOnlySpan<double> z, ReadOnlySpan<double> w, Span<double> profit)
    {
        for (var s = 0; s < profit.Length; s++)
        {
            if (Math.Abs(z[s]) <= 1 && (surface.Columns == 1 || Math.Abs(w[s]) <= 1)) continue;
            var sum = _before[s];
            for (var i = surface.Items.From; i < surface.Items.To; i++)
            {
                ref readonly var item = ref batch.Items[i];
                ref readonly var terms = ref batch.Terms[i];
                sum = batch.VolatilityFactor < 0
                    ? EuropeanOption.Profit(terms, market.Returns[s], market.Spots[s], item.Quantity, item.BaseValue, sum)
                    : EuropeanOption.Profit(terms, market.Returns[s], market.Spots[s], market.Volatilities[s], item.Quantity, item.BaseValue, sum);
            }
            profit[s] = sum;
        }
    }
}
