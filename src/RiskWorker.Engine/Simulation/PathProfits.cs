using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>Follows paths from look to look, and values options that hang on them.</summary>
internal sealed class PathProfits(int capacity)
{
    private readonly double[] _values = new double[capacity];

    /// <summary>Takes one look.</summary>
    /// <param name="look">The look.</param>
    /// <param name="market">The market, at the close and moved to the underlying.</param>
    /// <param name="states">What the path has left so far in each scenario.</param>
    public static void Look(in PathLook look, MarketLanes market, Span<double> states)
    {
        switch (look.Kind)
        {
            case LookKind.Sum:
                Elementwise.Add(market.Spots, states);
                return;
            case LookKind.ReturnSum:
                Elementwise.Add(market.Returns, states);
                return;
        }
        var spots = market.Spots;
        var number = look.Number;
        for (var s = 0; s < states.Length; s++)
        {
            states[s] = look.Kind switch
            {
                LookKind.CrossedUp => spots[s] >= number ? 1 : states[s],
                LookKind.CrossedDown => spots[s] <= number ? 1 : states[s],
                LookKind.Highest => Math.Max(states[s], spots[s] * number),
                _ => Math.Min(states[s], spots[s] * number),
            };
        }
    }

    /// <summary>Adds the options of <paramref name="batch"/> at the market's close.</summary>
    public void Add(PathBatch batch, MarketLanes market, LaneTable states, LaneTable cells)
    {
        market.Underlying(batch.Underlying);
        var seen = market.Terms(batch.Market);
        var values = _values.AsSpan(0, market.Width);
        for (var i = 0; i < batch.Items.Length; i++)
        {
            ref readonly var item = ref batch.Items[i];
            item.Formula.Fill(seen, states[item.Path], values);
            BookProfit.AddLinear(values, item.BaseValue, item.Quantity, cells[item.Cell]);
        }
    }
}
