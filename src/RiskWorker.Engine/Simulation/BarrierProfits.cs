using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Simulation;

/// <summary>Values options whose barrier may have been crossed inside a horizon: in each scenario by the one formula or the other.</summary>
internal sealed class BarrierProfits(int capacity)
{
    private readonly double[] _untouched = new double[capacity];
    private readonly double[] _crossed = new double[capacity];

    /// <summary>Sets <paramref name="isCrossed"/> to 1 where the underlying stands on the barrier or beyond, and leaves it elsewhere.</summary>
    public static void Look(in BarrierLook look, ReadOnlySpan<double> spots, Span<double> isCrossed)
    {
        for (var s = 0; s < spots.Length; s++)
        {
            if (look.IsUp ? spots[s] >= look.Level : spots[s] <= look.Level) isCrossed[s] = 1;
        }
    }

    /// <summary>Adds the options of <paramref name="batch"/> at the market's close.</summary>
    public void Add(BarrierBatch batch, MarketLanes market, LaneTable isCrossed, LaneTable cells)
    {
        market.Underlying(batch.Underlying);
        var seen = market.Terms(batch.Market);
        Span<double> untouched = _untouched.AsSpan(0, market.Width), crossed = _crossed.AsSpan(0, market.Width);
        for (var i = 0; i < batch.Items.Length; i++)
        {
            ref readonly var item = ref batch.Items[i];
            untouched.Clear();
            crossed.Clear();
            item.Untouched.Accumulate(seen, 1, 0, untouched);
            item.Crossed.Accumulate(seen, 1, 0, crossed);
            Span<double> hit = isCrossed[item.Barrier], profit = cells[item.Cell];
            for (var s = 0; s < profit.Length; s++) profit[s] = Math.FusedMultiplyAdd(item.Quantity, (hit[s] != 0 ? crossed[s] : untouched[s]) - item.BaseValue, profit[s]);
        }
    }
}
