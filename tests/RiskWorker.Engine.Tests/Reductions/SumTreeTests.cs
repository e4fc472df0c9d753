using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Tests.Reductions;

public sealed class SumTreeTests
{
    private const int BlockCount = 37;

    // Magnitudes far apart, so that another order of adding would show in the last bits.
    private static double[] SumsOf(int block) => [Math.ScaleB(1.0 / (block + 3), block % 23), -Math.ScaleB(1.7 * (block + 1), -(block % 11))];

    private static SumTree TreeOf(IEnumerable<int> blocks)
    {
        var tree = new SumTree();
        foreach (var block in blocks) tree.Add(block, SumsOf(block));
        return tree;
    }

    [Fact]
    public void Total_is_equal_to_the_last_bit_for_any_split_and_any_order_of_merging()
    {
        var expected = TreeOf(Enumerable.Range(0, BlockCount)).Total();
        for (var seed = 0; seed < 200; seed++)
        {
            var random = new Random(seed);
            var parts = Enumerable.Range(0, 1 + random.Next(6)).Select(_ => new List<int>()).ToList();
            foreach (var block in Enumerable.Range(0, BlockCount)) parts[random.Next(parts.Count)].Add(block);
            var trees = parts.Select(p => TreeOf(p.OrderBy(_ => random.Next()))).OrderBy(_ => random.Next()).ToList();
            var merged = new SumTree();
            foreach (var tree in trees) merged.Merge(tree);
            Assert.Equal(expected, merged.Total());
        }
    }

    [Fact]
    public void Total_follows_the_fixed_tree_worked_by_hand()
    {
        // Five blocks: ((0+1)+(2+3))+4, the maximal subtrees added from the right.
        var expected = SumsOf(0)[0] + SumsOf(1)[0] + (SumsOf(2)[0] + SumsOf(3)[0]) + SumsOf(4)[0];
        Assert.Equal(expected, TreeOf([4, 2, 0, 3, 1]).Total()[0]);
    }

    [Fact]
    public void Merge_leaves_the_other_tree_as_it_was()
    {
        var other = TreeOf([2, 3]);
        var before = other.Total();
        var tree = TreeOf([0, 1]);
        tree.Merge(other);
        Assert.Equal(before, other.Total());
    }

    [Fact]
    public void Add_refuses_a_block_that_is_there_already() =>
        Assert.Throws<InvalidOperationException>(() => TreeOf([5, 5]));
}
