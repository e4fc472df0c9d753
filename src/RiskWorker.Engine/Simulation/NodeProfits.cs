using RiskWorker.Engine.Plans;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Simulation;

/// <summary>Turns profits by cell into profits by node, children included, and those into losses.</summary>
internal sealed class NodeProfits
{
    private readonly LaneTable _nodes = new();
    private RevaluationPlan _plan = null!;

    /// <summary>Turns to <paramref name="plan"/>, with room for <paramref name="capacity"/> lanes.</summary>
    public void Serve(RevaluationPlan plan, int capacity)
    {
        _plan = plan;
        _nodes.Shape(plan.Nodes.Count, capacity);
    }

    /// <summary>Converts and adds up the cells of <paramref name="slice"/>.</summary>
    public void Roll(PlanSlice slice, MarketLanes market, LaneTable cells)
    {
        _nodes.Width = market.Width;
        _nodes.Clear(slice.Node, slice.EndNode);
        for (var c = slice.Cells.From; c < slice.Cells.To; c++)
        {
            var cell = _plan.Cells[c];
            BookProfit.AddConverted(cells[c], cell.Value, market.RatesOf(cell.Currency), _plan.Currencies[cell.Currency].Rate, _nodes[cell.Node]);
        }
        for (var node = slice.EndNode - 1; node > slice.Node; node--) Elementwise.Add(_nodes[node], _nodes[_plan.Nodes[node].Parent]);
    }

    /// <summary>Writes the losses of series <paramref name="row"/>, whose node is among those rolled up.</summary>
    public void Losses(PlanRow row, MarketLanes market, Span<double> losses)
    {
        var node = _plan.Nodes[row.Node];
        if (row.InOwnCurrency)
            BookProfit.LossInCurrency(_nodes[row.Node], node.ValueRoot, market.RatesOf(node.Currency), _plan.Currencies[node.Currency].Rate, losses);
        else
            Elementwise.Negate(_nodes[row.Node], losses);
    }
}
