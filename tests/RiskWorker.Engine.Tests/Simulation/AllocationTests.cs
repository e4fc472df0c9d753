using RiskWorker.Engine.Plans;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
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

    private static RevaluationPlan MixedPlan() => CompiledBook.Of(MixedBook.Whole().Build(), 1, 10).Plan;
}
