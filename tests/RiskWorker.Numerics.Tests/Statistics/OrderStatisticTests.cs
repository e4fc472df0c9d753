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
        var random = new Random(17);
        for (var length = 1; length <= 60; length++)
        {
            var values = Enumerable.Range(0, length).Select(_ => distinct == 0 ? random.NextDouble() - 0.5 : random.Next(distinct)).ToArray();
            var sorted = values.OrderDescending().ToArray();
            for (var rank = 1; rank <= length; rank++) Assert.Equal(sorted[rank - 1], OrderStatistic.Largest((double[])values.Clone(), rank));
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
