using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Surfaces;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Simulation;

public sealed class AllocationTests
{
    // Garbage per block would grow with the scenarios and stop every thread while it is collected.
    [Fact]
    public void Block_is_drawn_revalued_and_reduced_without_an_allocation()
    {
        var plan = MixedPlan();
        var tile = new ScenarioTile(plan);
        var losses = new double[plan.Rows.Count * Blocks.Size];
        var reduction = new TailReduction([.. plan.Rows.Select(_ => 0.0)], [.. plan.Rows.Select(_ => new HistogramEdges(-1, 1))], mass: 1);
        var (record, next) = (reduction.Empty(24), 0);
        Assert.Equal(0, Allocations.FewestOf(() =>
        {
            for (var last = next + 4; next < last; next++) Block(next);
        }));

        void Block(int block)
        {
            for (var offset = 0; offset < Blocks.Size; offset += ScenarioTile.Width)
                tile.Evaluate(((long)block * Blocks.Size) + offset, Math.Min(ScenarioTile.Width, Blocks.Size - offset), losses, offset, Blocks.Size);
            reduction.Accumulate(record, new(block, Blocks.Size, losses));
        }
    }

    // The same by surface, the queues of the exact pass included; what a call allocates by itself does not grow with its blocks.
    [Fact]
    public void Block_is_valued_by_surface_and_its_tail_exactly_without_an_allocation()
    {
        var plan = MixedPlan();
        var workspace = new SimulationWorkspace(1);
        var surfaces = new SurfaceBuilder(plan, 1e-7).Build(workspace, CancellationToken.None);
        Assert.True(surfaces.Count > 0);
        var evaluator = new BlockEvaluator(plan, workspace, surfaces);
        var (few, many) = (Allocations.FewestOf(() => Evaluate(2)), Allocations.FewestOf(() => Evaluate(12)));
        Assert.Equal(few, many);

        void Evaluate(int blocks) => evaluator.Evaluate(BlockRange.From(0, blocks * Blocks.Size), new Nothing(plan.Rows.Count), null, CancellationToken.None);
    }

    /// <summary>Keeps nothing, and wants every loss exact: about half of all scenarios.</summary>
    private sealed class Nothing(int rows) : Reduction<object>
    {
        public override double[] ExactFrom { get; } = new double[rows];

        public override object Empty(int blocks = 0) => this;

        public override void Accumulate(object record, in LossBlock block)
        {
        }

        public override void Merge(object record, object from)
        {
        }
    }

    private static RevaluationPlan MixedPlan() => CompiledBook.Of(MixedBook.Whole().Build(), 1, 10).Plan;
}
