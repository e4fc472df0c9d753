using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Surfaces;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Surfaces;

/// <summary>With surfaces in use, the tails are those of full revaluation of every scenario, to the last bit.</summary>
public sealed class ExactTailTests
{
    private const int Scenarios = 60_000;
    private static readonly CompiledBook s_book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
    private static readonly TailDemand s_demand = new(MixedBook.Measures, [0.95m]);
    private static readonly Lazy<(TailRecord Record, IReadOnlyList<SampledLoss> Series)> s_full = new(() => Sampler(RevaluationKind.Full, 1e-7).Look(Scenarios));

    [Theory]
    [InlineData(1e-9)]
    [InlineData(1e-7)]
    [InlineData(1e-3)] // poor surfaces only cost more scenarios
    public void Tails_by_surface_equal_those_of_full_revaluation(double error)
    {
        var sampler = Sampler(RevaluationKind.Surface, error);
        Assert.True(sampler.Surfaces!.Count > 4, $"{sampler.Surfaces.Count} surfaces");
        Assert.False(sampler.AreSurfacesRefused);
        var (record, series) = sampler.Look(Scenarios);
        for (var row = 0; row < series.Count; row++)
        {
            // Cutoffs come from pilots that differ within the bound, so one tail may go a few ranks deeper than the other; both as deep as anything asks.
            var (full, found) = (s_full.Value.Record.SortedTail(row), record.SortedTail(row));
            var common = Math.Min(full.Length, found.Length);
            Assert.True(common + Math.Max(s_full.Value.Record.EqualTo(row), record.EqualTo(row)) >= s_demand.DeepestRank(Scenarios), $"row {row}: {common} ranks");
            Assert.Equal(full[..common], found[..common]);
            foreach (var measure in MixedBook.Measures)
            {
                BitAssert.Equal(s_full.Value.Series[row].Var(measure.Confidence), series[row].Var(measure.Confidence));
                BitAssert.Equal(s_full.Value.Series[row].ExpectedShortfall(measure.Confidence), series[row].ExpectedShortfall(measure.Confidence));
                Assert.Equal(s_full.Value.Series[row].ExpectedShortfallInterval(measure.Confidence, 0.95m), series[row].ExpectedShortfallInterval(measure.Confidence, 0.95m));
                Assert.Equal(s_full.Value.Series[row].VarInterval(measure.Confidence, 0.95m), series[row].VarInterval(measure.Confidence, 0.95m));
            }
        }
        // Eight pairs of node and horizon, of which a tail of a few percent is revalued, and not much more.
        var drawn = 8L * (Scenarios - LossSampler.CheckedScenarios);
        Assert.InRange(record.Revalued, drawn / 100, drawn / 5);
    }

    // The same surfaces, poor as they are, with a bound of nothing: now losses are missed, which shows that the bound does the work.
    [Fact]
    public void Poor_surfaces_with_a_bound_of_zero_miss_part_of_the_tail()
    {
        var surfaces = Surfaces(0.003);
        var (cutoffs, edges) = Cutoffs();
        var reduction = new TailReduction(cutoffs, edges);
        AssertSameTails(Evaluate(reduction, null), Evaluate(reduction, surfaces));
        var overconfident = Changed(surfaces, s => s with { Bound = 0 });
        Assert.ThrowsAny<Xunit.Sdk.XunitException>(() => AssertSameTails(Evaluate(reduction, null), Evaluate(reduction, overconfident)));
    }

    [Fact]
    public void Surfaces_that_lie_further_off_than_they_claim_are_noticed_on_the_pilot()
    {
        var honest = new BlockEvaluator(s_book.Plan, new SimulationWorkspace(2), Surfaces(1e-7));
        honest.Evaluate(BlockRange.From(0, 8_192), new LossSampleReduction(s_book.Plan.Rows.Count, 8_192), null, CancellationToken.None);
        Assert.Equal(0, honest.BoundFaults);
        var shifted = Changed(Surfaces(1e-7), s => s with { Coefficients = [s.Coefficients[0] + (3 * s.Bound), .. s.Coefficients[1..]] });
        var dishonest = new BlockEvaluator(s_book.Plan, new SimulationWorkspace(2), shifted);
        var sample = dishonest.Evaluate(BlockRange.From(0, 8_192), new LossSampleReduction(s_book.Plan.Rows.Count, 8_192), null, CancellationToken.None);
        Assert.True(dishonest.BoundFaults > 0);
        // And what the pilot keeps is full revaluation all the same.
        var expected = s_book.Losses(8_192);
        for (var row = 0; row < expected.Length; row++) BitAssert.Equal(expected[row], sample.Row(row));
    }

    [Fact]
    public void Threads_and_blocks_change_no_bit_of_what_surfaces_give()
    {
        var (cutoffs, edges) = Cutoffs();
        var reduction = new TailReduction(cutoffs, edges);
        var surfaces = Surfaces(1e-7);
        var one = new BlockEvaluator(s_book.Plan, new SimulationWorkspace(1), surfaces).Evaluate(BlockRange.From(0, 20_000), reduction, null, CancellationToken.None);
        var parts = new BlockEvaluator(s_book.Plan, new SimulationWorkspace(3), surfaces).Evaluate(BlockRange.Whole(0, 8_192), reduction, null, CancellationToken.None);
        reduction.Merge(parts, new BlockEvaluator(s_book.Plan, new SimulationWorkspace(2), surfaces).Evaluate(BlockRange.From(2, 20_000), reduction, null, CancellationToken.None));
        AssertSameTails(one, parts);
        Assert.Equal(one.Revalued, parts.Revalued);
        BitAssert.Equal(one.Sums.Total(), parts.Sums.Total());
    }

    // An axis shifted so far that every scenario lies outside: then nothing is left to the polynomials.
    [Fact]
    public void Scenarios_outside_a_surface_are_revalued_fully()
    {
        var plan = s_book.Plan;
        var away = new SurfaceSet(plan, [.. plan.Horizons.Select((_, h) => plan.Groups.Select((_, g) => Surfaces(1e-7).Of(h, g) with { Underlying = new(1, 50) }).ToArray())]);
        var losses = new BlockEvaluator(plan, new SimulationWorkspace(2), away).Evaluate(BlockRange.From(0, 200), new LossesBySurface(plan.Rows.Count), null, CancellationToken.None);
        var expected = s_book.Losses(200);
        for (var row = 0; row < expected.Length; row++) BitAssert.Equal(expected[row], losses[row]);
    }

    [Fact]
    public void Tails_left_to_surfaces_differ_by_no_more_than_the_bound()
    {
        var sampler = new LossSampler(s_book.Plan, new SimulationWorkspace(2), s_demand, new() { Scenarios = Scenarios, ExactTail = false }, null, CancellationToken.None);
        var (record, series) = sampler.Look(Scenarios);
        Assert.Equal(0, record.Revalued);
        for (var row = 0; row < series.Count; row++)
        {
            var bound = Enumerable.Range(0, s_book.Plan.Currencies.Count).Sum(c => 2 * sampler.Surfaces!.BoundOf(s_book.Plan.Rows[row].Horizon, s_book.Plan.Rows[row].Node, c));
            Assert.Equal(s_full.Value.Series[row].Var(new(0.99m)), series[row].Var(new(0.99m)), bound);
        }
    }

    // A swap of a billion is worth next to nothing, but its legs are what the sums round against.
    [Fact]
    public void Bound_holds_the_rounding_of_legs_that_cancel()
    {
        var plan = CompiledBook.Of(WideBook.Holding(new Domain.Books.Position("HOME", "RECEIVER", 1_000_000)).Build(), 1).Plan;
        var surfaces = new SurfaceBuilder(plan, 1e-7).Build(new SimulationWorkspace(1), CancellationToken.None);
        Assert.Equal(0, surfaces.Count);
        Assert.InRange(surfaces.BoundOf(0, 0, 0), 1e-13 * 1e9, 1e-13 * 1e10);
        Assert.True(Math.Abs(plan.Nodes[0].ValueRoot) < 1e8);
    }

    private static LossSampler Sampler(RevaluationKind kind, double error) =>
        new(s_book.Plan, new SimulationWorkspace(2), s_demand, new() { Scenarios = Scenarios, Revaluation = kind, SurfaceError = error }, null, CancellationToken.None);

    private static SurfaceSet Surfaces(double error) => new SurfaceBuilder(s_book.Plan, error).Build(new SimulationWorkspace(2), CancellationToken.None);

    private static SurfaceSet Changed(SurfaceSet surfaces, Func<PriceSurface, PriceSurface> change) => new(s_book.Plan,
        [.. s_book.Plan.Horizons.Select((_, h) => s_book.Plan.Groups.Select((_, g) => surfaces.Of(h, g) with
        {
            Batches = [.. surfaces.Of(h, g).Batches.Select(b => b with { Surfaces = [.. b.Surfaces.Select(change)] })],
        }).ToArray())]);

    private static (double[] Cutoffs, HistogramEdges[] Edges) Cutoffs()
    {
        var losses = s_book.Losses(8_192);
        return ([.. losses.Select(l => l.Order().ElementAt(l.Length - 200))], [.. losses.Select(l => HistogramEdges.Holding(l))]);
    }

    private static TailRecord Evaluate(TailReduction reduction, SurfaceSet? surfaces) =>
        new BlockEvaluator(s_book.Plan, new SimulationWorkspace(2), surfaces).Evaluate(BlockRange.From(0, 40_000), reduction, null, CancellationToken.None);

    private static void AssertSameTails(TailRecord expected, TailRecord found)
    {
        Assert.Equal(expected.Count, found.Count);
        for (var row = 0; row < s_book.Plan.Rows.Count; row++)
        {
            Assert.Equal(expected.SortedTail(row), found.SortedTail(row));
            Assert.Equal(expected.EqualTo(row), found.EqualTo(row));
        }
    }

    /// <summary>The losses of the first block, none of which has to be exact.</summary>
    private sealed class LossesBySurface(int rows) : Reduction<double[][]>
    {
        public override double[] ExactFrom { get; } = [.. Enumerable.Repeat(double.PositiveInfinity, rows)];

        public override double[][] Empty(int blocks = 0) => new double[rows][];

        public override void Accumulate(double[][] record, in LossBlock block)
        {
            for (var row = 0; row < rows; row++) record[row] = block.Row(row).ToArray();
        }

        public override void Merge(double[][] record, double[][] from)
        {
            for (var row = 0; row < rows; row++) record[row] ??= from[row];
        }
    }
}
