using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>Under every law a scenario's losses are a function of its number alone: neither the tile that it stands in nor what was drawn before changes a bit.</summary>
public sealed class ScenarioIndependenceTests
{
    public static TheoryData<string> Laws => [.. MixedHistory.Laws];

    [Theory]
    [MemberData(nameof(Laws))]
    public void Evaluate_tiles_of_any_width_give_the_bits_of_the_block(string model)
    {
        var (book, expected, count) = Block(model, 700);
        var tile = new ScenarioTile(book.Plan);
        foreach (var width in new[] { 1, 7, 8, 61, ScenarioTile.Width })
        {
            // A stride and a start of another kind than a block's, and tiles from the last to the first.
            var (stride, offset) = (count + 13, 5);
            var losses = new double[book.Plan.Rows.Count * stride];
            for (var first = (count - 1) / width * width; first >= 0; first -= width)
                tile.Evaluate(first, Math.Min(width, count - first), losses, offset + first, stride);
            for (var row = 0; row < expected.Length; row++)
                BitAssert.Equal(expected[row], losses.AsSpan((row * stride) + offset, count), $"{model}, width {width}, row {row}:");
        }
    }

    [Theory]
    [MemberData(nameof(Laws))]
    public void Evaluate_a_single_scenario_gives_the_bits_of_the_block(string model)
    {
        var (book, expected, count) = Block(model, 4_200);
        var tile = new ScenarioTile(book.Plan);
        var losses = new double[book.Plan.Rows.Count];
        foreach (var scenario in new[] { count - 1, 0, count / 2, 257 % count })
        {
            tile.Evaluate(scenario, 1, losses, 0, 1);
            for (var row = 0; row < losses.Length; row++) BitAssert.Equal(expected[row][scenario], losses[row]);
        }
    }

    // A tile that served another law, whose buffers are used again, is as good as a new one.
    [Fact]
    public void Serve_after_other_laws_leaves_nothing_behind()
    {
        ScenarioTile? tile = null;
        foreach (var model in MixedHistory.Laws.Concat(MixedHistory.Laws.Reverse()))
        {
            var (book, expected, _) = Block(model, 100);
            if (tile is null) tile = new(book.Plan);
            else tile.Serve(book.Plan);
            var losses = new double[book.Plan.Rows.Count * 100];
            tile.Evaluate(0, 100, losses, 0, 100);
            for (var row = 0; row < expected.Length; row++) BitAssert.Equal(expected[row], losses.AsSpan(row * 100, 100), $"{model}, row {row}:");
        }
    }

    private static (CompiledBook Book, double[][] Losses, int Count) Block(string model, int most)
    {
        var book = CompiledBook.Of(MixedHistory.Of(model), 1, 3, 10);
        var count = Math.Min(most, book.Plan.Law.ScenarioCount ?? most);
        return (book, book.Losses(count), count);
    }
}
