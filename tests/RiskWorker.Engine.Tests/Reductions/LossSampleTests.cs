using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;

namespace RiskWorker.Engine.Tests.Reductions;

public sealed class LossSampleTests
{
    // The last block is short.
    private const int Scenarios = (2 * Blocks.Size) + 100;

    private static readonly LossSampleReduction s_reduction = new(rows: 2, Scenarios);

    [Fact]
    public void Records_of_any_split_merge_to_the_losses_by_scenario()
    {
        foreach (var split in new int[][] { [0, 0, 0], [0, 1, 0], [1, 0, 1], [0, 1, 2], [2, 1, 0] })
        {
            LossSample[] parts = [s_reduction.Empty(), s_reduction.Empty(), s_reduction.Empty()];
            for (var block = 2; block >= 0; block--) s_reduction.Accumulate(parts[split[block]], BlockOf(block));
            var merged = s_reduction.Empty();
            foreach (var part in parts) s_reduction.Merge(merged, part);
            for (var row = 0; row < 2; row++) Assert.Equal(Enumerable.Range(0, Scenarios).Select(i => Loss(row, i)), merged.Row(row));
        }
    }

    [Fact]
    public void Empty_records_share_nothing()
    {
        var (one, other) = (s_reduction.Empty(), s_reduction.Empty());
        for (var block = 0; block < 3; block++) s_reduction.Accumulate(one, BlockOf(block));
        Assert.Equal(Scenarios, one.Row(0).Length);
        Assert.Throws<InvalidOperationException>(() => other.Row(0));
    }

    [Fact]
    public void Merge_leaves_the_other_record_to_itself()
    {
        var (record, from) = (s_reduction.Empty(), s_reduction.Empty());
        for (var block = 0; block < 3; block++) s_reduction.Accumulate(from, BlockOf(block));
        s_reduction.Merge(record, from);
        var changed = BlockOf(0);
        Array.Fill(changed.Values, -1);
        s_reduction.Accumulate(from, changed);
        Assert.Equal(Loss(0, 0), record.Row(0)[0]);
    }

    [Fact]
    public void Row_names_the_block_that_is_missing()
    {
        var record = s_reduction.Empty();
        s_reduction.Accumulate(record, BlockOf(0));
        s_reduction.Accumulate(record, BlockOf(2));
        Assert.Contains("Block 1", Assert.Throws<InvalidOperationException>(() => record.Row(0)).Message, StringComparison.Ordinal);
    }

    private static double Loss(int row, int scenario) => (row * 1e6) + scenario;

    private static LossBlock BlockOf(int index)
    {
        var (values, width) = (new double[2 * Blocks.Size], BlockRange.From(0, Scenarios).WidthOf(index));
        for (var row = 0; row < 2; row++)
        {
            for (var i = 0; i < width; i++) values[(row * Blocks.Size) + i] = Loss(row, (index * Blocks.Size) + i);
        }
        return new(index, width, values);
    }
}
