using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing.Options;

namespace RiskWorker.Engine.Runs;

/// <summary>Adds up, node by node, what numerical prices leave open.</summary>
internal static class PriceErrors
{
    /// <summary>The error of each node, children included, in the node's currency; null where it holds no such price.</summary>
    public static PriceError?[] Of(RevaluationPlan plan)
    {
        var errors = new PriceError?[plan.Nodes.Count];
        foreach (var item in plan.Groups.SelectMany(g => g.Formulas).SelectMany(f => f.Items))
        {
            if (item.Formula is not TabulatedFormula table) continue;
            var cell = plan.Cells[item.Cell];
            var units = Math.Abs(item.Quantity) * plan.Currencies[cell.Currency].Rate;
            Add(cell.Node, new(units * table.Error, units * table.StandardError));
        }
        for (var node = errors.Length - 1; node > 0; node--)
        {
            if (errors[node] is { } error) Add(plan.Nodes[node].Parent, error);
        }
        for (var node = 0; node < errors.Length; node++)
        {
            var rate = plan.Currencies[plan.Nodes[node].Currency].Rate;
            if (errors[node] is { } error) errors[node] = new(error.Table / rate, error.Standard / rate);
        }
        return errors;

        void Add(int node, PriceError error) => errors[node] = new((errors[node]?.Table ?? 0) + error.Table, (errors[node]?.Standard ?? 0) + error.Standard);
    }
}
