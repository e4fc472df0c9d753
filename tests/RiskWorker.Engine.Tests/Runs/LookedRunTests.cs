using RiskWorker.Domain.Books;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Limits;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Tests.Runs;

public sealed class LookedRunTests
{
    private const int Seeds = 1_000;
    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));

    // One lognormal factor of 2% a day and a long position of 100: VaR 99% = 100(1 - exp(-sigma²/2 + sigma z)), z = Phi^-1(0.01).
    private static readonly double s_exactVar = 100 * (1 - Math.Exp((-0.02 * 0.02 / 2) + (0.02 * InverseNormal.Of(0.01))));

    private static readonly SimulationSettings s_settings = new() { Scenarios = 2_000, Looks = 5, Cap = 32_000 };

    // Whatever is declared where the limit is the exact VaR is noise: the promise is that this happens in at most 5% of runs.
    [Fact]
    public void Run_stopped_at_a_look_decides_wrongly_in_at_most_5_percent_of_seeds_when_the_limit_equals_the_exact_var()
    {
        var (tree, plan) = PlanOfOne();
        var decided = Enumerable.Range(1, Seeds).Count(seed => Look(tree, plan, seed, s_exactVar).Limits[0].Status != LimitStatus.Inconclusive);
        Assert.True(decided <= 0.05 * Seeds, $"{decided} of {Seeds} runs decided");
    }

    // The same looks, each at a plain 95%, decide far more often: the adjustment is what keeps the promise above.
    [Fact]
    public void Looks_without_the_adjusted_level_would_decide_wrongly_more_often()
    {
        var (_, plan) = PlanOfOne();
        var decided = Enumerable.Range(1, Seeds).Count(seed =>
        {
            var sampler = new LossSampler(plan with { Seed = (ulong)seed }, 1, new([s_var], [0.95m]), s_settings.Scenarios, null, CancellationToken.None);
            return new LookSchedule(s_settings, true).Scenarios.Any(n => sampler.Look(n).Series[0].VarInterval(s_var.Confidence, 0.95m) is var (low, high) && (low > s_exactVar || high <= s_exactVar));
        });
        Assert.True(decided > 0.08 * Seeds, $"{decided} of {Seeds} runs decided");
    }

    [Theory]
    [InlineData(0.5, LimitStatus.Breached, 1)]
    [InlineData(2.0, LimitStatus.Within, 1)]
    [InlineData(1.15, LimitStatus.Warning, 1)]
    public void Limit_far_from_the_measure_is_decided_at_the_first_looks(double multiple, LimitStatus expected, int fewestLooks)
    {
        var (tree, plan) = PlanOfOne();
        var outcome = Look(tree, plan, 1, multiple * s_exactVar);
        Assert.Equal(expected, outcome.Limits[0].Status);
        Assert.InRange(outcome.Simulation.Looks, fewestLooks, 5);
        Assert.Equal(0.99, outcome.Simulation.Level);
    }

    [Fact]
    public void Undecided_limit_takes_every_look_and_stops_at_the_cap()
    {
        var (tree, plan) = PlanOfOne();
        var outcome = Look(tree, plan, 3, s_exactVar);
        Assert.Equal((5, 5, 32_000), (outcome.Simulation.Looks, outcome.Simulation.LooksPlanned, outcome.Simulation.Scenarios));
    }

    // Looks at 2,000, 4,000, ... 32,000: within each the count climbs to its scenarios and never beyond.
    [Fact]
    public void Progress_of_each_look_climbs_to_its_scenarios_and_never_beyond()
    {
        var (tree, plan) = PlanOfOne();
        var steps = new Steps();
        new LookedRun(tree, plan with { Seed = 3 }, [new("line", "ALL", s_var, s_exactVar)], [s_var], s_settings).Run(1, steps, CancellationToken.None);
        Assert.Equal([2_000L, 4_000, 8_000, 16_000, 32_000], steps.Reported.Select(r => r.Planned).Distinct());
        foreach (var look in steps.Reported.GroupBy(r => r.Planned))
        {
            Assert.Equal(look.Key, look.Last().Done);
            Assert.Equal(look.Select(r => r.Done).Order(), look.Select(r => r.Done));
        }
    }

    // The half-width of an order-statistic interval falls with the root of N: the first look that has it ends the run.
    [Theory]
    [InlineData(0.5, 1, true)]
    [InlineData(0.001, 5, false)]
    public void Wanted_precision_ends_the_looks_or_is_reported_as_missed(double precision, int looks, bool reached)
    {
        var (tree, plan) = PlanOfOne();
        var summary = new LookedRun(tree, plan, [], [s_var], s_settings with { Precision = precision }).Run(1, null, CancellationToken.None).Simulation;
        Assert.Equal((looks, 5, (bool?)reached), (summary.Looks, summary.LooksPlanned, summary.PrecisionReached));
    }

    [Fact]
    public void Wanted_precision_takes_as_many_looks_as_its_interval_needs()
    {
        var (tree, plan) = PlanOfOne();
        var sampler = new LossSampler(plan, 1, new([s_var], [0.99m]), 2_000, null, CancellationToken.None);
        var widths = new LookSchedule(s_settings, true).Scenarios.Select(n => sampler.Look(n).Series[0]).Select(s => s.VarInterval(s_var.Confidence, 0.99m) is var (low, high) ? (high - low) / 2 / s.Var(s_var.Confidence) : null).ToArray();
        for (var look = 0; look < widths.Length; look++)
        {
            // Asked for exactly what the look has: the run ends at the first look that has as much.
            var summary = new LookedRun(tree, plan, [], [s_var], s_settings with { Precision = Math.BitIncrement(widths[look]!.Value) }).Run(1, null, CancellationToken.None).Simulation;
            Assert.Equal(1 + Array.FindIndex(widths, w => w <= Math.BitIncrement(widths[look]!.Value)), summary.Looks);
            Assert.True(summary.PrecisionReached);
        }
    }

    // A breached limit is decided at once, but the precision asked for is not reached yet: the run goes on.
    [Fact]
    public void Run_ends_only_when_limits_and_precision_are_both_served()
    {
        var (tree, plan) = PlanOfOne();
        var settings = s_settings with { Precision = 0.04 };
        var outcome = new LookedRun(tree, plan, [new("line", "ALL", s_var, 0.5 * s_exactVar)], [s_var], settings).Run(1, null, CancellationToken.None);
        var alone = new LookedRun(tree, plan, [], [s_var], settings).Run(1, null, CancellationToken.None);
        Assert.Equal(LimitStatus.Breached, outcome.Limits[0].Status);
        Assert.InRange(outcome.Simulation.Looks, 2, 5);
        Assert.Equal(alone.Simulation, outcome.Simulation);
    }

    // Relative to a value that is not positive: no number of scenarios decides it, so none is spent on it.
    [Fact]
    public void Undecidable_limit_asks_for_no_further_look()
    {
        var (tree, plan) = PlanOfOne();
        var shortPlan = plan with { Nodes = [plan.Nodes[0] with { ValueRoot = -100 }] };
        var outcome = new LookedRun(tree, shortPlan, [new("nav", "ALL", s_var, 0.1, LimitBasis.Nav)], [s_var], s_settings).Run(1, null, CancellationToken.None);
        Assert.Equal((1, LimitStatus.Inconclusive, (double?)null), (outcome.Simulation.Looks, outcome.Limits[0].Status, outcome.Limits[0].Used));
        Assert.Null(outcome.Simulation.PrecisionReached);
    }

    // A later look adds scenarios to those of the looks before: it must see what one pass over all of them sees.
    [Fact]
    public void Looks_see_what_one_pass_over_all_scenarios_sees()
    {
        var (_, plan) = PlanOfOne();
        var demand = new TailDemand([s_var, new(MeasureKind.Es, new(0.975m), new(1))], [0.99m]);
        var stepped = new LossSampler(plan, 2, demand, 2_000, null, CancellationToken.None);
        foreach (var scenarios in new[] { 2_000, 4_000, 8_000, 16_000 }) stepped.Look(scenarios);
        var (record, series) = stepped.Look(32_000);
        var (whole, single) = new LossSampler(plan, 1, demand, 2_000, null, CancellationToken.None).Look(32_000);
        Assert.Equal(whole.Sums.Total(), record.Sums.Total());
        Assert.Equal(whole.Histogram(0), record.Histogram(0));
        Assert.Equal(single[0].ExpectedShortfall(new(0.975m)), series[0].ExpectedShortfall(new(0.975m)));
        Assert.Equal(single[0].VarInterval(new(0.99m), 0.99m), series[0].VarInterval(new(0.99m), 0.99m));
    }

    private sealed class Steps : IProgress<RunProgress>
    {
        public List<RunProgress> Reported { get; } = [];

        public void Report(RunProgress value) => Reported.Add(value);
    }

    private static LookOutcome Look(BookTree tree, RevaluationPlan plan, int seed, double amount) =>
        new LookedRun(tree, plan with { Seed = (ulong)seed }, [new("line", "ALL", s_var, amount)], [s_var], s_settings).Run(1, null, CancellationToken.None);

    private static (BookTree Tree, RevaluationPlan Plan) PlanOfOne()
    {
        var snapshot = SmallBooks.OneFactor(0.02, 100);
        var (tree, _) = BookTree.Build(snapshot.Books);
        var model = Calibrator.Calibrate(snapshot);
        var binder = new InstrumentBinder("EUR", model.Factors);
        var lines = LineValuation.Of(snapshot.Positions, snapshot.Instruments, binder, model.Levels, snapshot.AsOf);
        return (tree!, new PlanCompiler(tree!, model, binder.Currencies, [new(1)]).Compile(1, lines));
    }
}
