using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Reductions;

/// <summary>The order of a tail against sorting by the definition: worst loss first, then the lower scenario number.</summary>
public sealed class SortedTailTests
{
    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(255)]
    [InlineData(256)]
    [InlineData(257)]
    [InlineData(2_000)]
    [InlineData(20_000)]
    public void SortedTail_equals_the_entries_ordered_by_loss_and_scenario(int count)
    {
        var random = new Random(count);
        AssertSorted(count, _ => (random.NextDouble() - 0.3) * 1e6);                                       // both signs
        AssertSorted(count, _ => 1e6 + random.NextDouble());                                               // keys close together
        AssertSorted(count, _ => Math.ScaleB(random.NextDouble() - 0.5, random.Next(-900, 900)));          // and far apart
        AssertSorted(count, _ => random.Next(5));                                                          // hardly anything but ties
        AssertSorted(count, _ => random.Next(3) switch { 0 => 0.0, 1 => -0.0, _ => -double.Epsilon });     // one loss, and one just below
        AssertSorted(count, _ => 7);                                                                       // nothing but ties
        AssertSorted(count, i => i == count / 2 ? double.MaxValue : 1 + (random.Next(4) * 1e-15));         // one far from the rest, which fall into one digit
        AssertSorted(count, i => i);
        AssertSorted(count, i => -i);
    }

    // The blocks come in a mixed order, as threads would bring them.
    private static void AssertSorted(int count, Func<int, double> lossOf)
    {
        var losses = Enumerable.Range(0, count).Select(lossOf).ToArray();
        var reduction = new TailReduction([double.NegativeInfinity], [new(0, 1)]);
        var record = reduction.Empty();
        var blocks = losses.Chunk(Blocks.Size).Index().OrderBy(b => (b.Index * 3) % 5).ThenBy(b => b.Index);
        foreach (var (index, values) in blocks) reduction.Accumulate(record, new(index, values.Length, values));
        var expected = losses.Select((loss, scenario) => new TailEntry(loss, scenario)).OrderByDescending(t => t.Loss == 0 ? 0 : t.Loss).ThenBy(t => t.Scenario).ToArray();
        var actual = record.SortedTail(0);
        Assert.Equal(expected.Select(t => t.Scenario), actual.Select(t => t.Scenario));
        BitAssert.Equal(expected.Select(t => t.Loss).ToArray(), actual.Select(t => t.Loss).ToArray(), $"{count} losses"); // -0 stays as it was
    }
}
