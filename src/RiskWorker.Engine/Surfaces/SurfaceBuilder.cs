using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Surfaces;

/// <summary>Builds the price surfaces of a plan, once per run, over the cores given; their bits do not depend on how many.</summary>
public sealed class SurfaceBuilder
{
    private readonly RevaluationPlan _plan;
    private readonly double _error;

    /// <summary>Takes the plan and the largest error wanted, as a fraction of a cell's gross value.</summary>
    public SurfaceBuilder(RevaluationPlan plan, double error) => (_plan, _error) = (plan, error);

    /// <summary>Builds them over the threads of <paramref name="workspace"/>.</summary>
    public SurfaceSet Build(SimulationWorkspace workspace, CancellationToken cancellation)
    {
        var jobs = new List<Job>();
        var groups = new GroupSurfaces[_plan.Horizons.Count][];
        for (var horizon = 0; horizon < groups.Length; horizon++)
        {
            groups[horizon] = new GroupSurfaces[_plan.Groups.Count];
            for (var g = 0; g < _plan.Groups.Count; g++) jobs.AddRange(JobsOf(horizon, g));
        }
        var fitted = new PriceSurface?[jobs.Count];
        workspace.ForEach(jobs.Count, (_, buffers, j, _) =>
        {
            var job = jobs[j];
            fitted[j] = buffers.Fit.Of(_plan.Groups[job.Group], job.Batch, job.Items, job.Underlying, job.Volatility,
                LawOf(_plan.Groups[job.Group].Options[job.Batch].VolatilityFactor).Level, _error);
        }, cancellation);
        var found = jobs.Zip(fitted).ToLookup(j => (j.First.Horizon, j.First.Group, j.First.Batch));
        for (var horizon = 0; horizon < groups.Length; horizon++)
        {
            for (var g = 0; g < _plan.Groups.Count; g++)
            {
                var place = (horizon, g);
                groups[horizon][g] = new(UnderlyingAxis(horizon, _plan.Groups[g].Key) ?? default,
                    [.. _plan.Groups[g].Options.Select((batch, b) => Gathered(horizon, batch, [.. found[(place.horizon, place.g, b)]]))]);
            }
        }
        return new(_plan, groups);
    }

    private readonly record struct Job(int Horizon, int Group, int Batch, ItemRange Items, AxisScale Underlying, AxisScale Volatility);

    // What does not move has no axis, and is cheap to value as it is.
    private IEnumerable<Job> JobsOf(int horizon, int g)
    {
        var group = _plan.Groups[g];
        if (UnderlyingAxis(horizon, group.Key) is not { } underlying) yield break;
        for (var b = 0; b < group.Options.Count; b++)
        {
            var volatility = default(AxisScale);
            if (group.Options[b].VolatilityFactor is var factor and >= 0)
            {
                if (AxisOf(horizon, factor) is not { } axis) continue;
                volatility = axis;
            }
            foreach (var items in ByCell(group.Options[b].Items)) yield return new(horizon, g, b, items, underlying, volatility);
        }
    }

    private static IEnumerable<ItemRange> ByCell(OptionItem[] items)
    {
        for (var from = 0; from < items.Length;)
        {
            var to = from + 1;
            while (to < items.Length && items[to].Cell == items[from].Cell) to++;
            yield return new(from, to);
            from = to;
        }
    }

    private BatchSurfaces Gathered(int horizon, OptionBatch batch, IReadOnlyList<(Job Job, PriceSurface? Surface)> found)
    {
        var volatility = batch.VolatilityFactor >= 0 ? AxisOf(horizon, batch.VolatilityFactor) ?? default : default;
        if (found.Count == 0) return new(volatility, [], [new(0, batch.Items.Length)]);
        return new(volatility, [.. found.Select(f => f.Surface).OfType<PriceSurface>()], [.. found.Where(f => f.Surface is null).Select(f => f.Job.Items)]);
    }

    private AxisScale? UnderlyingAxis(int horizon, in UnderlyingKey key)
    {
        if (!key.IsCross) return AxisOf(horizon, key.Factor);
        List<(int Factor, double Weight)> terms = [];
        if (key.Factor >= 0) terms.Add((key.Factor, 1));
        if (key.Quote >= 0) terms.Add((key.Quote, -1));
        var (days, deviation) = (_plan.Horizons[horizon].Days, _plan.Moves.DeviationOf([.. terms]));
        return deviation > 0 ? AxisScale.Around((LawOf(key.Factor).Drift - LawOf(key.Quote).Drift) * days, deviation * Math.Sqrt(days)) : null;
    }

    private AxisScale? AxisOf(int horizon, int factor)
    {
        var law = LawOf(factor);
        var days = _plan.Horizons[horizon].Days;
        return law.IsLognormal && law.Deviation > 0 && _plan.Moves.RowOf[factor] >= 0 ? AxisScale.Around(law.Drift * days, law.Deviation * Math.Sqrt(days)) : null;
    }

    private FactorLaw LawOf(int factor) => factor < 0 ? default : _plan.Moves.Factors[factor];
}
