using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Plans;

namespace RiskWorker.Engine.Measures;

/// <summary>Every series of a run as losses, and the measures on them.</summary>
public sealed class NodeMeasures
{
    private readonly RevaluationPlan _plan;
    private readonly Dictionary<PlanRow, LossSeries> _series;
    private readonly Dictionary<Horizon, int> _horizons;
    private readonly Dictionary<Horizon, LiquidityCascade> _cascades = [];

    /// <summary>Takes one series for each row of <paramref name="plan"/>, in order.</summary>
    public NodeMeasures(RevaluationPlan plan, IReadOnlyList<LossSeries> series)
    {
        _plan = plan;
        _series = plan.Rows.Zip(series).ToDictionary(p => p.First, p => p.Second);
        _horizons = plan.Horizons.Index().ToDictionary(h => h.Item, h => h.Index);
    }

    private NodeMeasures(NodeMeasures of, Dictionary<Horizon, LiquidityCascade> cascades) =>
        (_plan, _series, _horizons, _cascades) = (of._plan, of._series, of._horizons, cascades);

    /// <summary>A measure of <paramref name="node"/> with its interval at <paramref name="level"/>.</summary>
    /// <param name="node">Node number.</param>
    /// <param name="spec">The measure; its horizon must be one of the plan's.</param>
    /// <param name="level">Level of the interval.</param>
    /// <param name="inReportingCurrency">In the reporting currency, else in the node's own.</param>
    public MeasureResult Of(int node, MeasureSpec spec, decimal level, bool inReportingCurrency = false) => spec.Kind == MeasureKind.Les
        ? _cascades[spec.Horizon].Of(node, spec, level, inReportingCurrency)
        : SeriesOf(node, spec.Horizon, inReportingCurrency).Measure(spec, level);

    /// <summary>The same with liquidity-adjusted measures.</summary>
    public NodeMeasures With(Dictionary<Horizon, LiquidityCascade> cascades) => new(this, cascades);

    /// <summary>The series of <paramref name="node"/> at <paramref name="horizon"/>.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The plan has no such horizon.</exception>
    public LossSeries SeriesOf(int node, Horizon horizon, bool inReportingCurrency = false)
    {
        if (!_horizons.TryGetValue(horizon, out var place)) throw new ArgumentOutOfRangeException(nameof(horizon), horizon, $"The plan has the horizons {string.Join(", ", _plan.Horizons)}.");
        return _series[new(node, place, !inReportingCurrency && HasOwnCurrency(node))];
    }

    /// <summary>Whether the node's currency is another than the reporting currency.</summary>
    public bool HasOwnCurrency(int node) => _plan.Nodes[node].Currency != 0;
}
