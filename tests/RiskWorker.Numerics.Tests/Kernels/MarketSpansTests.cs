using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class MarketSpansTests
{
    [Theory]
    [InlineData("spot", 7, 8, 8, 8)]
    [InlineData("discount", 8, 9, 8, 8)]
    [InlineData("carry", 8, 8, 0, 8)]
    [InlineData("deviation", 8, 8, 8, 7)]
    public void New_span_of_another_length_is_refused_by_name(string name, int spot, int discount, int carry, int deviation) =>
        Assert.Throws<ArgumentException>(name, () =>
        {
            var _ = new MarketSpans(new double[8], new double[spot], new double[discount], new double[carry], new double[deviation]);
        });

    [Fact]
    public void Index_gives_the_scenario()
    {
        var market = new MarketSpans([1, 2], [3, 4], [5, 6], [7, 8], [9, 10]);
        Assert.Equal((2, new MarketPoint(2, 4, 6, 8, 10)), (market.Length, market[1]));
    }
}
