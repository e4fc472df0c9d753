using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Numerics.Tests.Statistics;

public sealed class OrderStatisticTests
{
    [Theory]
    [InlineData(0)]
    [InlineData(3)]
    [InlineData(1)]
    public void Largest_equals_the_sorted_values_at_every_rank(int distinct)
    {
        var random = new System.Random(17);
        for (var length = 1; length <= 60; length++)
        {
            var values = Enumerable.Range(0, length).Select(_ => distinct == 0 ? random.NextDouble() - 0.5 : random.Next(distinct)).ToArray();
            var sorted = values.OrderDescending().ToArray();
            for (var rank = 1; rank <= length; rank++) Assert.Equal(sorted[rank - 1], OrderStatistic.Largest((double[])values.Clone(), rank));
        }
    }

    // Enough values for a pivot from a sample: of any order, with ties, and where the sample misleads about the rest.
    [Theory]
    [InlineData(2_049)]
    [InlineData(5_000)]
    [InlineData(16_384)]
    public void Largest_of_many_equals_the_sorted_values(int length)
    {
        var random = new System.Random(length);
        double[][] all =
        [
            [.. Enumerable.Range(0, length).Select(_ => random.NextDouble() - 0.5)],
            [.. Enumerable.Range(0, length).Select(_ => (double)random.Next(4))],
            [.. Enumerable.Range(0, length).Select(i => (double)i)],
            [.. Enumerable.Range(0, length).Select(i => -(double)i)],
            [.. Enumerable.Range(0, length).Select(_ => 3.0)],
            [.. Enumerable.Range(0, length).Select(i => i % (length / 128) == 0 ? -1e9 - i : random.NextDouble())],
            [.. Enumerable.Range(0, length).Select(i => i % (length / 128) == 0 ? 1e9 + i : random.NextDouble())],
        ];
        int[] ranks = [1, 2, length / 100, length / 30, length / 3, length / 2, (length / 2) + 1, length - (length / 30), length - 1, length];
        foreach (var values in all)
        {
            var sorted = values.OrderDescending().ToArray();
            foreach (var rank in ranks) Assert.Equal(sorted[rank - 1], OrderStatistic.Largest((double[])values.Clone(), rank));
        }
    }

    [Fact]
    public void Largest_handles_sorted_and_infinite_values()
    {
        double[] values = [double.NegativeInfinity, -1, 0, 0, 2, double.PositiveInfinity];
        Assert.Equal(2, OrderStatistic.Largest((double[])values.Clone(), 2));
        Assert.Equal(double.NegativeInfinity, OrderStatistic.Largest((double[])values.Clone(), 6));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(4)]
    public void Largest_refuses_a_rank_outside(int rank) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => OrderStatistic.Largest([1.0, 2.0, 3.0], rank));
}
