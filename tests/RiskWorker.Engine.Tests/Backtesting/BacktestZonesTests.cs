using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;

namespace RiskWorker.Engine.Tests.Backtesting;

/// <summary>
/// Boundaries for 250 days: Basel Committee, Supervisory framework for the use of backtesting (January 1996), table 2, and MAR32.9.
/// The other sample sizes were recomputed by the same rule with another binomial distribution (SciPy).
/// </summary>
public sealed class BacktestZonesTests
{
    private static readonly Confidence s_99 = new(0.99m);

    [Theory]
    [InlineData(125, 0.99, 3, 7)]
    [InlineData(250, 0.99, 5, 10)]
    [InlineData(500, 0.99, 9, 15)]
    [InlineData(750, 0.99, 12, 20)]
    [InlineData(1000, 0.99, 15, 24)]
    [InlineData(1250, 0.99, 19, 27)]
    [InlineData(125, 0.975, 6, 11)]
    [InlineData(250, 0.975, 11, 17)]
    [InlineData(500, 0.975, 18, 27)]
    [InlineData(750, 0.975, 26, 37)]
    [InlineData(1000, 0.975, 33, 45)]
    [InlineData(1250, 0.975, 41, 54)]
    [InlineData(125, 0.95, 10, 17)]
    [InlineData(250, 0.95, 18, 27)]
    [InlineData(500, 0.95, 33, 45)]
    [InlineData(750, 0.95, 48, 61)]
    [InlineData(1000, 0.95, 62, 77)]
    [InlineData(1250, 0.95, 75, 93)]
    public void Boundaries_of_a_sample_size_are_those_of_the_cumulative_rule(int days, double confidence, int yellow, int red) =>
        Assert.Equal((yellow, red), BacktestZones.Boundaries(days, new((decimal)confidence)));

    [Theory]
    [InlineData(0, BacktestZone.Green)]
    [InlineData(4, BacktestZone.Green)]
    [InlineData(5, BacktestZone.Yellow)]
    [InlineData(9, BacktestZone.Yellow)]
    [InlineData(10, BacktestZone.Red)]
    [InlineData(250, BacktestZone.Red)]
    public void Of_a_count_in_250_days_is_the_published_zone(int exceptions, BacktestZone zone) =>
        Assert.Equal(zone, BacktestZones.Of(exceptions, 250, s_99));

    [Fact]
    public void Of_fewer_than_125_days_is_no_zone()
    {
        Assert.Null(BacktestZones.Of(0, 0, s_99));
        Assert.Null(BacktestZones.Of(100, 124, s_99));
        Assert.Equal(BacktestZone.Green, BacktestZones.Of(2, 125, s_99));
    }
}
