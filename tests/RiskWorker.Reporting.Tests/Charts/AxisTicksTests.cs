using RiskWorker.Reporting.Charts;

namespace RiskWorker.Reporting.Tests.Charts;

public sealed class AxisTicksTests
{
    [Theory]
    [InlineData(0, 10, 5, 1, "0,2,4,6,8,10")]
    [InlineData(-450_000, 450_000, 9, 1000, "−400,−300,−200,−100,0,100,200,300,400")]
    [InlineData(0, 0.043, 4, 0.01, "0,2,4")]
    [InlineData(0, 0.9, 4, 1, "0.0,0.5")]
    [InlineData(0, 0.04, 4, 1, "0.00,0.01,0.02,0.03,0.04")]
    public void Between_steps_by_one_two_or_five(double low, double high, int most, double unit, string labels)
    {
        var ticks = AxisTicks.Between(low, high, most, unit);
        Assert.Equal(labels, string.Join(',', ticks.Labels));
        Assert.All(ticks.Positions, position => Assert.InRange(position, low - 1e-9, high + 1e-9));
    }

    [Theory]
    [InlineData(1e-9, 3)]
    [InlineData(7.3e14, 9)]
    [InlineData(2.0000001, 2)]
    public void Between_never_exceeds_the_steps_asked_for(double high, int most) =>
        Assert.InRange(AxisTicks.Between(0, high, most, 1).Positions.Length, 1, most + 1);
}
