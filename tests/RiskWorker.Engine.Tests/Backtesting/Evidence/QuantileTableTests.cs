using RiskWorker.Engine.Backtesting.Evidence;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

public sealed class QuantileTableTests
{
    private static readonly QuantileTable s_table = new([0.01, 0.05, 0.5, 0.9], [-30, -20, 0, 10]);

    [Theory]
    [InlineData(0.01, -30)]
    [InlineData(0.03, -25)]
    [InlineData(0.05, -20)]
    [InlineData(0.275, -10)]
    [InlineData(0.9, 10)]
    [InlineData(0.99, 10)]
    public void At_a_probability_within_the_table_is_linear_and_ends_with_it(double probability, double profit) =>
        Assert.Equal(profit, s_table.At(probability), 1e-12);

    [Fact]
    public void At_a_probability_below_the_first_falls_as_fast_for_each_fifth_as_before_it() => Assert.Equal(-40, s_table.At(0.002), 1e-12);

    [Theory]
    [InlineData(new[] { 0.1 }, new[] { 1.0 }, "There are 1 probabilities and 1 profits")]
    [InlineData(new[] { 0.1, 0.1 }, new[] { 1.0, 2.0 }, "Probability 1 is 0.1")]
    [InlineData(new[] { 0.1, 1.0 }, new[] { 1.0, 2.0 }, "Probability 1 is 1")]
    [InlineData(new[] { 0.1, 0.2 }, new[] { 1.0, 0.5 }, "Profit 1 is 0.5")]
    public void Table_out_of_order_is_refused(double[] probabilities, double[] profits, string message) =>
        Assert.StartsWith(message, Assert.Throws<ArgumentException>(() => new QuantileTable(probabilities, profits)).Message, StringComparison.Ordinal);
}
