using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;

namespace RiskWorker.Engine.Tests.Backtesting;

public sealed class RecordedForecastsTests
{
    private static readonly Quantile[] s_quantiles = [new(0.01, -200, true), new(0.05, -100, true), new(0.5, 0, false), new(0.99, 150, false)];

    [Theory]
    [InlineData(-300, 0.005)]
    [InlineData(-200, 0.01)]
    [InlineData(-150, 0.03)]
    [InlineData(-50, 0.275)]
    [InlineData(75, 0.745)]
    [InlineData(150, 0.995)]
    [InlineData(1000, 0.995)]
    public void ProbabilityOf_is_linear_between_quantiles_and_halves_what_is_left_beyond(double profit, double expected) =>
        Assert.Equal(expected, RecordedForecasts.ProbabilityOf(s_quantiles, profit)!.Value, 1e-12);

    [Fact]
    public void ProbabilityOf_is_unknown_without_quantiles() => Assert.Null(RecordedForecasts.ProbabilityOf([], 1));

    // A riskless book has one profit at every probability.
    [Fact]
    public void ProbabilityOf_equal_quantiles_is_no_division_by_zero()
    {
        Quantile[] flat = [new(0.01, 0, true), new(0.5, 0, true), new(0.99, 0, true)];
        Assert.Equal(0.005, RecordedForecasts.ProbabilityOf(flat, -1));
        Assert.Equal(0.995, RecordedForecasts.ProbabilityOf(flat, 0));
    }
}
