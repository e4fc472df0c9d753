using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Simulation;

public sealed class SimulationWorkspaceTests
{
    // Two whole blocks beyond the pilot's four, and a short one.
    private const int Scenarios = LossSampler.PilotScenarios + (2 * Blocks.Size) + 1_000;

    private static readonly TailDemand s_demand = new([new(MeasureKind.Var, new(0.99m), new(1)), new(MeasureKind.Es, new(0.975m), new(1))], [0.95m]);
    private static readonly RevaluationPlan s_twoHorizons = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10).Plan;
    private static readonly RevaluationPlan s_oneHorizon = CompiledBook.Of(MixedBook.Whole().Build(), 1).Plan;

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(5)]
    public void Workspace_used_for_other_plans_before_moves_no_bit(int threads)
    {
        var workspace = new SimulationWorkspace(threads);
        foreach (var plan in new[] { s_oneHorizon, s_twoHorizons, s_oneHorizon with { Seed = 99 }, s_twoHorizons with { Seed = 7 }, s_oneHorizon })
        {
            // Not every run of a workspace is as long as the one before.
            foreach (var scenarios in new[] { Scenarios, 5_000, Scenarios - 2_000 })
                AssertSame(Look(plan, new SimulationWorkspace(2), scenarios), Look(plan, workspace, scenarios), plan.Rows.Count);
        }
    }

    [Fact]
    public void Look_returns_what_later_looks_and_later_samplers_leave_as_it_is()
    {
        var workspace = new SimulationWorkspace(2);
        // Whole blocks alone, where nothing would have to be drawn anew.
        const int Whole = 6 * Blocks.Size;
        var sampler = new LossSampler(s_oneHorizon, workspace, s_demand, new() { Scenarios = Whole }, null, CancellationToken.None);
        var (record, series) = sampler.Look(Whole);
        var expected = Look(s_oneHorizon, new SimulationWorkspace(1), Whole);
        sampler.Look(2 * Whole);
        Look(s_oneHorizon with { Seed = 5 }, workspace, Scenarios);
        AssertSame(expected, (record, series), s_oneHorizon.Rows.Count);
    }

    [Fact]
    public void Look_is_refused_once_another_sampler_has_begun_on_the_workspace()
    {
        var workspace = new SimulationWorkspace(1);
        var first = new LossSampler(s_oneHorizon, workspace, s_demand, new() { Scenarios = 5_000 }, null, CancellationToken.None);
        var second = new LossSampler(s_oneHorizon, workspace, s_demand, new() { Scenarios = 5_000 }, null, CancellationToken.None);
        Assert.Throws<InvalidOperationException>(() => first.Look(5_000));
        Assert.Equal(5_000, second.Look(5_000).Record.Count);
    }

    [Fact]
    public void Evaluation_is_refused_while_another_is_under_way_and_served_after_it()
    {
        var workspace = new SimulationWorkspace(2);
        var evaluator = new BlockEvaluator(s_oneHorizon, workspace);
        var (range, reduction) = (BlockRange.From(0, 10_000), new LossSampleReduction(s_oneHorizon.Rows.Count, 10_000));
        var fault = Assert.Throws<InvalidOperationException>(() =>
            evaluator.Evaluate(range, reduction, _ => evaluator.Evaluate(range, reduction, null, CancellationToken.None), CancellationToken.None));
        Assert.Contains("one evaluation at a time", fault.Message, StringComparison.Ordinal);
        Assert.Equal(10_000, evaluator.Evaluate(range, reduction, null, CancellationToken.None).Row(0).Length);
    }

    [Fact]
    public void Look_after_a_fault_counts_no_block_twice()
    {
        var told = 0;
        var sampler = new LossSampler(s_oneHorizon, new SimulationWorkspace(2), s_demand, new() { Scenarios = Scenarios }, _ => Tell(), CancellationToken.None);
        // The pilot has told of its four blocks; the second of the look's own three fails.
        Assert.Throws<NotSupportedException>(() => sampler.Look(Scenarios));
        AssertSame(Look(s_oneHorizon, new SimulationWorkspace(1), Scenarios), sampler.Look(Scenarios), s_oneHorizon.Rows.Count);

        void Tell()
        {
            if (Interlocked.Increment(ref told) == 6) throw new NotSupportedException();
        }
    }

    [Fact]
    public void Progress_of_one_thread_rises_from_block_to_block_to_all_scenarios()
    {
        var told = new List<long>();
        var sampler = new LossSampler(s_oneHorizon, new SimulationWorkspace(1), s_demand, new() { Scenarios = Scenarios }, told.Add, CancellationToken.None);
        sampler.Look(Scenarios);
        Assert.Equal([4_096, 8_192, 12_288, 16_384, 20_480, 24_576, 25_576], told);
    }

    // What is returned is new: 16 bytes a kept scenario in the record and 8 in the series. The rest is a few objects a look and not
    // the blocks, the pilot and the threads' records, which are 300 kB a series.
    [Fact]
    public void Sampler_on_a_used_workspace_allocates_little_beyond_what_it_returns()
    {
        var workspace = new SimulationWorkspace(1);
        var kept = Look(s_oneHorizon, workspace, Scenarios).Series.Sum(s => s.Known);
        Look(s_oneHorizon, workspace, Scenarios);
        var bytes = Allocations.FewestOf(() => Look(s_oneHorizon, workspace, Scenarios));
        Assert.InRange(bytes, 24 * kept, (24 * kept) + 60_000);
    }

    [Fact]
    public void Workspace_refuses_to_have_no_thread() =>
        Assert.Throws<ArgumentOutOfRangeException>(() => new SimulationWorkspace(0));

    private static (TailRecord Record, IReadOnlyList<SampledLoss> Series) Look(RevaluationPlan plan, SimulationWorkspace workspace, int scenarios) =>
        new LossSampler(plan, workspace, s_demand, new() { Scenarios = scenarios }, null, CancellationToken.None).Look(scenarios);

    private static void AssertSame((TailRecord Record, IReadOnlyList<SampledLoss> Series) expected, (TailRecord Record, IReadOnlyList<SampledLoss> Series) actual, int rows)
    {
        Assert.Equal(expected.Record.Count, actual.Record.Count);
        BitAssert.Equal(expected.Record.Sums.Total(), actual.Record.Sums.Total(), "sums");
        for (var row = 0; row < rows; row++)
        {
            Assert.Equal(expected.Record.SortedTail(row), actual.Record.SortedTail(row));
            Assert.Equal(expected.Record.EqualTo(row), actual.Record.EqualTo(row));
            Assert.Equal(expected.Record.Histogram(row), actual.Record.Histogram(row));
            Assert.Equal(expected.Series[row].ExpectedShortfallInterval(new(0.975m), 0.95m), actual.Series[row].ExpectedShortfallInterval(new(0.975m), 0.95m));
            Assert.Equal(expected.Series[row].VarInterval(new(0.99m), 0.95m), actual.Series[row].VarInterval(new(0.99m), 0.95m));
        }
    }
}
