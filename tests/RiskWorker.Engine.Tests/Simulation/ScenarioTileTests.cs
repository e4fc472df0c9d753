using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Simulation;

public sealed class ScenarioTileTests
{
    private const int Count = 1_000;

    [Theory]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(8)]
    [InlineData(61)]
    [InlineData(239)]
    [InlineData(ScenarioTile.Width)]
    public void Evaluate_width_of_a_tile_changes_no_bit(int width)
    {
        var book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
        var expected = book.Losses(Count);
        var tile = new ScenarioTile(book.Plan);
        // A stride and a start of another kind than a block's, and tiles from the last to the first.
        var (stride, offset) = (Count + 13, 5);
        var losses = new double[book.Plan.Rows.Count * stride];
        for (var first = (Count - 1) / width * width; first >= 0; first -= width)
            tile.Evaluate(first, Math.Min(width, Count - first), losses, offset + first, stride);
        for (var row = 0; row < expected.Length; row++)
            BitAssert.Equal(expected[row], losses.AsSpan((row * stride) + offset, Count), $"width {width}, row {row}:");
    }

    [Fact]
    public void Evaluate_any_single_scenario_can_be_made_again()
    {
        var book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
        var expected = book.Losses(9_000);
        var tile = new ScenarioTile(book.Plan);
        var losses = new double[book.Plan.Rows.Count];
        foreach (var scenario in new[] { 8_999, 0, 4_096, 4_095, 257 })
        {
            tile.Evaluate(scenario, 1, losses, 0, 1);
            for (var row = 0; row < losses.Length; row++) BitAssert.Equal(expected[row][scenario], losses[row]);
        }
    }
}
