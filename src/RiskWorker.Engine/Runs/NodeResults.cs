using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Runs;

/// <summary>Turns the series of a run into the figures of each node.</summary>
public static class NodeResults
{
    /// <summary>The measures alone, by node.</summary>
    internal static IEnumerable<ModelNode> Measured(ModelRun run) => run.Plan.Nodes.Select((node, i) =>
        new ModelNode(node.Book, run.Plan.Currencies[node.Currency].Code, [.. run.Measures.Select(m => run.Outcome.Measures.Of(i, m, run.Outcome.Level))]));

    /// <summary>The nodes in depth-first order.</summary>
    public static IReadOnlyList<NodeResult> Of(BookTree tree, RevaluationPlan plan, LookOutcome outcome, IReadOnlyList<MeasureSpec> measures, IReadOnlyList<Position> positions)
    {
        var held = positions.CountBy(p => p.Book, StringComparer.Ordinal).ToDictionary(StringComparer.Ordinal);
        var errors = PriceErrors.Of(plan);
        var sums = outcome.Record.Sums.Total();
        return [.. tree.Books.Select((book, node) => Of(book, node))];

        NodeResult Of(Book book, int node)
        {
            var own = outcome.Measures.HasOwnCurrency(node);
            var value = plan.Nodes[node].ValueRoot;
            return new NodeResult
            {
                Book = book.Name,
                Name = book.DisplayName,
                Parent = book.Parent,
                Depth = tree.DepthOf(node),
                Currency = book.Currency,
                Value = value / plan.Currencies[plan.Nodes[node].Currency].Rate,
                ValueRoot = value,
                PriceError = errors[node],
                Positions = held.GetValueOrDefault(book.Name),
                Measures = [.. measures.Select(m => outcome.Measures.Of(node, m, outcome.Level))],
                MeasuresRoot = own ? [.. measures.Select(m => outcome.Measures.Of(node, m, outcome.Level, inReportingCurrency: true))] : null,
                Distributions = [.. Rows(node, own).Select(row => DistributionSummary.Of(plan.Horizons[plan.Rows[row].Horizon],
                    sums[row], sums[plan.Rows.Count + row], outcome.Record.Histogram(row), outcome.Edges[row], outcome.Series[row]))],
            };
        }

        IEnumerable<int> Rows(int node, bool own) =>
            Enumerable.Range(0, plan.Rows.Count).Where(r => plan.Rows[r].Node == node && plan.Rows[r].InOwnCurrency == own);
    }
}
