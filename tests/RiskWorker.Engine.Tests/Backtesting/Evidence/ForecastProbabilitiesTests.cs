using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

public sealed class ForecastProbabilitiesTests
{
    [Theory]
    [InlineData(0, 0, 0.5)]
    [InlineData(37, 0, 37.5)]
    [InlineData(100, 0, 100.5)]
    [InlineData(40, 20, 50.5)]
    public void Randomised_in_the_middle_of_a_step_is_the_projects_own_p_value(long below, long equal, double of101) =>
        Assert.Equal(of101 / 101, ForecastProbabilities.Randomised(below, equal, 100, 0.5), 1e-15);

    [Fact]
    public void Randomised_of_a_discrete_model_is_uniform()
    {
        // A coin that shows 0 three times in ten, 999 scenarios of it, and a seeded year of profits from the same coin.
        var profits = Uniforms(11, 500);
        double[] transforms =
        [
            .. profits.Select((u, t) => u < 0.3
                ? ForecastProbabilities.Randomised(0, 300, 999, ForecastProbabilities.Position(1, new DateOnly(2026, 1, 1).AddDays(t), 2))
                : ForecastProbabilities.Randomised(300, 699, 999, ForecastProbabilities.Position(1, new DateOnly(2026, 1, 1).AddDays(t), 2))),
        ];
        Assert.False(DistributionTests.KolmogorovSmirnov(transforms).Reject);
        Assert.True(DistributionTests.KolmogorovSmirnov([.. profits.Select(u => u < 0.3 ? 0.15 : 0.65)]).Reject);
    }

    [Fact]
    public void Position_belongs_to_seed_day_and_book()
    {
        var day = new DateOnly(2026, 11, 27);
        var one = ForecastProbabilities.Position(1, day, 3);
        Assert.Equal(one, ForecastProbabilities.Position(1, day, 3));
        double[] others = [ForecastProbabilities.Position(2, day, 3), ForecastProbabilities.Position(1, day.AddDays(1), 3), ForecastProbabilities.Position(1, day, 4)];
        Assert.DoesNotContain(one, others);
    }

    [Theory]
    [InlineData(-1, 0, 10, 0.5)]
    [InlineData(5, 6, 10, 0.5)]
    [InlineData(0, 0, 0, 0.5)]
    [InlineData(0, 0, 10, 0.0)]
    [InlineData(0, 0, 10, 1.0)]
    public void Randomised_of_impossible_counts_is_refused(long below, long equal, long count, double position) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => ForecastProbabilities.Randomised(below, equal, count, position));

    [Fact]
    public void Histogram_counts_every_day_once_with_the_binomial_band()
    {
        var histogram = ForecastProbabilities.Histogram([0.05, 0.1, 0.15, 0.95, 0.999], 10);
        Assert.Equal([1, 2, 0, 0, 0, 0, 0, 0, 0, 2], histogram.Counts);
        var year = ForecastProbabilities.Histogram(Uniforms(5, 250), 10);
        Assert.Equal((250, 16, 35), (year.Counts.Sum(), year.Low, year.High)); // quantiles of Bin(250, 0.1), SciPy
    }
}
