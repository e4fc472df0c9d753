using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Surfaces;

/// <summary>
/// Every price surface of a plan, and how far a node's profit by surface may lie from full revaluation. The bound of a surface
/// is four times its largest error on a grid of four times its nodes: checked, not proven, and held against the pilot in every run.
/// </summary>
public sealed class SurfaceSet
{
    // Share of a value that the order of its sums may move, with room to spare.
    private const double Rounding = 1e-13;

    private readonly GroupSurfaces[][] _groups;
    private readonly double[][] _bounds;
    private readonly int _currencies;

    /// <summary>Takes the surfaces by horizon and group of <paramref name="plan"/>.</summary>
    public SurfaceSet(RevaluationPlan plan, GroupSurfaces[][] groups)
    {
        (_groups, _currencies) = (groups, plan.Currencies.Count);
        _bounds = [.. groups.Select(horizon => BoundsOf(plan, horizon))];
        Count = groups.Sum(h => h.Sum(g => g.Batches.Sum(b => b.Surfaces.Length)));
        Options = groups.Sum(h => h.Sum(g => g.Batches.Sum(b => b.Surfaces.Sum(s => (long)(s.Items.To - s.Items.From))))) / Math.Max(1, groups.Length);
    }

    /// <summary>Number of surfaces, over all horizons.</summary>
    public int Count { get; }

    /// <summary>Options that a surface stands for, at a horizon.</summary>
    public long Options { get; }

    /// <summary>The surfaces of group <paramref name="group"/> at <paramref name="horizon"/>.</summary>
    public GroupSurfaces Of(int horizon, int group) => _groups[horizon][group];

    /// <summary>How far the profit of <paramref name="node"/> in one currency of the plan may be off, children included, in that currency.</summary>
    public double BoundOf(int horizon, int node, int currency) => _bounds[horizon][(node * _currencies) + currency];

    private double[] BoundsOf(RevaluationPlan plan, GroupSurfaces[] groups)
    {
        var bounds = new double[plan.Nodes.Count * _currencies];
        foreach (var surface in groups.SelectMany(g => g.Batches).SelectMany(b => b.Surfaces)) Add(surface.Cell, surface.Bound);
        // What has no surface is valued alike, but added to another partial sum; parts may be large where their sum is nothing.
        foreach (var group in plan.Groups)
        {
            foreach (var holding in group.Linear) Add(holding.Cell, Rounding * Math.Abs(holding.Units * group.Spot));
            foreach (var item in group.Formulas.SelectMany(f => f.Items)) Add(item.Cell, Rounding * Math.Abs(item.Quantity * item.BaseValue));
        }
        foreach (var flow in plan.Flows)
        {
            foreach (var amount in flow.Amounts) Add(amount.Cell, Rounding * Math.Abs(amount.Units * flow.Factor));
        }
        for (var node = plan.Nodes.Count - 1; node > 0; node--)
        {
            for (var c = 0; c < _currencies; c++) bounds[(plan.Nodes[node].Parent * _currencies) + c] += bounds[(node * _currencies) + c];
        }
        return bounds;

        void Add(int place, double bound)
        {
            var cell = plan.Cells[place];
            bounds[(cell.Node * _currencies) + cell.Currency] += bound + (Rounding * Math.Abs(cell.Value));
        }
    }
}
