using RiskWorker.Domain.Books;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Limits;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Models;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Runs;

/// <summary>What the last look saw.</summary>
/// <param name="Simulation">Scenarios and looks.</param>
/// <param name="Level">Level of every interval.</param>
/// <param name="Measures">The measures on its tails.</param>
/// <param name="Limits">The limits, by name.</param>
/// <param name="Evaluator">Says which limits no sample could decide.</param>
/// <param name="Record">The tails.</param>
/// <param name="Series">The same as sampled losses, by row of the plan.</param>
/// <param name="Edges">Edges of the histograms.</param>
public sealed record LookOutcome(
    SimulationSummary Simulation,
    decimal Level,
    NodeMeasures Measures,
    IReadOnlyList<LimitResult> Limits,
    LimitEvaluator Evaluator,
    TailRecord Record,
    IReadOnlyList<LossSeries> Series,
    IReadOnlyList<HistogramEdges> Edges);

/// <summary>Draws scenarios look by look until every limit is decided and the precision is reached, or no look is left.</summary>
public sealed class LookedRun
{
    private readonly BookTree _tree;
    private readonly RevaluationPlan _plan;
    private readonly IReadOnlyList<Limit> _limits;
    private readonly IReadOnlyList<MeasureSpec> _measures;
    private readonly SimulationSettings _settings;
    private readonly LookSchedule _looks;

    /// <summary>Takes the plan, the limits valid on the date and the measures.</summary>
    public LookedRun(BookTree tree, RevaluationPlan plan, IReadOnlyList<Limit> limits, IReadOnlyList<MeasureSpec> measures, SimulationSettings settings)
    {
        (_tree, _plan, _measures, _settings) = (tree, plan, measures, settings);
        _limits = [.. limits.OrderBy(l => l.Name, StringComparer.Ordinal)];
        // A list of scenarios is looked at once, whole.
        if (plan.Law.ScenarioCount is { } count) _settings = settings with { Scenarios = count, Cap = count, Precision = null };
        _looks = new(_settings, plan.Law.ScenarioCount is null && (limits.Count > 0 || settings.Precision is not null));
    }

    /// <summary>Runs.</summary>
    public LookOutcome Run(int threads, IProgress<RunProgress>? progress, CancellationToken cancellation)
    {
        var levels = new List<decimal> { _looks.Level };
        if (_limits.Any(l => l.Basis == LimitBasis.Book)) levels.Add(LimitEvaluator.LevelOfEachOfTwo(_looks.Level));
        var planned = _looks.Scenarios[0];
        var sampler = new LossSampler(_plan, new(threads), _plan.Law.ScenarioCount is null ? new(_measures, levels) : TailDemand.Whole, _settings with { Scenarios = planned },
            progress is null ? null : drawn => progress.Report(new("simulate", drawn, planned)), cancellation);
        for (var look = 0; ; look++)
        {
            planned = _looks.Scenarios[look];
            var outcome = LookAt(sampler, look, planned);
            var last = look + 1 == _looks.Scenarios.Count;
            if (last || (outcome.Simulation.PrecisionReached != false && !outcome.Limits.Any(MayYetBeDecided))) return outcome;
        }
    }

    private static bool MayYetBeDecided(LimitResult limit) => limit is { Status: LimitStatus.Inconclusive, Used: not null };

    private LookOutcome LookAt(LossSampler sampler, int look, int scenarios)
    {
        var (record, sampled) = sampler.Look(scenarios);
        var series = SeriesOf(record, sampled);
        var measures = new NodeMeasures(_plan, series);
        var evaluator = new LimitEvaluator(_tree, _plan, measures, _looks.Level);
        var summary = new SimulationSummary(scenarios, _settings.Seed, look + 1, _looks.Scenarios.Count, (double)_looks.Level, PrecisionReached(measures), SummaryOf(sampler, record));
        return new(summary, _looks.Level, measures, [.. _limits.Select(evaluator.Of)], evaluator, record, series, sampler.Edges);
    }

    private IReadOnlyList<LossSeries> SeriesOf(TailRecord record, IReadOnlyList<SampledLoss> sampled) => _plan.Law is HistoricalLaw law
        ? [.. _plan.Rows.Select((row, i) => new HistoricalLoss(record.SortedTail(i), law.Weights, isOverlapping: _plan.Horizons[row.Horizon].Days > 1))]
        : sampled;

    private SurfaceSummary? SummaryOf(LossSampler sampler, TailRecord record)
    {
        if (sampler.Surfaces is not { } surfaces) return sampler.AreSurfacesRefused ? SurfaceSummary.Refused : null;
        var bySurface = record.Count - (Math.Min(sampler.FullyRevalued, record.Count) / Blocks.Size * Blocks.Size);
        return new(surfaces.Count, surfaces.Options, bySurface * _plan.Nodes.Count * _plan.Horizons.Count, record.Revalued);
    }

    private bool? PrecisionReached(NodeMeasures measures)
    {
        if (_settings.Precision is not { } wanted) return null;
        return _measures.Where(m => m.Kind != MeasureKind.Les).Select(m => measures.Of(0, m, _looks.Level)).All(m => (m.High - m.Low) / 2 <= wanted * Math.Abs(m.Value));
    }
}
