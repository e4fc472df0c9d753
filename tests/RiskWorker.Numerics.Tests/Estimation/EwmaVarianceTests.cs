using RiskWorker.Numerics.Estimation;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class EwmaVarianceTests
{
    [Fact]
    public void Of_three_days_follows_the_recursion_by_hand()
    {
        var variance = EwmaVariance.Of([1, -2, 4], 0.5);

        Assert.Equal([7, 4, 4], variance.Variances);
        Assert.Equal(10, variance.Forecast);
        Assert.Equal(0, variance.Mean);
    }

    // With weights (1 - λ) λ^k the start weighs λ^n: what is left of it at 1,974 days is nothing.
    [Fact]
    public void Of_a_long_series_forecasts_the_weighted_mean_square()
    {
        var marks = ReturnSeries.MarkPound();
        var (expected, weight) = (0.0, 0.06);
        for (var t = marks.Length - 1; t >= 0; t--, weight *= 0.94) expected += weight * (marks[t] - 0.01) * (marks[t] - 0.01);

        Assert.Equal(expected, EwmaVariance.Of(marks, 0.94, 0.01).Forecast, 1e-15);
    }

    [Fact]
    public void Of_a_day_uses_only_the_days_before_it_beyond_the_start()
    {
        double[] series = [.. ReturnSeries.Normals(50, 1)], other = [.. series];
        (other[30], other[31]) = (series[31], series[30]);

        var (one, two) = (EwmaVariance.Of(series, 0.9), EwmaVariance.Of(other, 0.9));

        for (var t = 0; t <= 30; t++) Assert.Equal(one.Variances[t], two.Variances[t], 1e-15);
        Assert.NotEqual(one.Variances[31], two.Variances[31], 1e-6);
    }

    [Fact]
    public void Of_a_lambda_near_one_tends_to_the_mean_square()
    {
        var series = ReturnSeries.Normals(200, 2);
        Assert.Equal(series.Average(x => x * x), EwmaVariance.Of(series, 1 - 1e-12).Forecast, 1e-9);
    }

    [Fact]
    public void Of_a_series_at_rest_is_zero() => Assert.Equal([0, 0, 0], EwmaVariance.Of([2, 2, 2], 0.94, 2).Variances);

    [Fact]
    public void Of_faulty_arguments_says_what_is_wrong()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => EwmaVariance.Of([1, 2], 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => EwmaVariance.Of([1, 2], double.NaN));
        Assert.Throws<ArgumentException>(() => EwmaVariance.Of([], 0.9));
        Assert.Contains("∞ on day 1", Assert.Throws<ArgumentException>(() => EwmaVariance.Of([1, double.PositiveInfinity], 0.9)).Message.Replace("Infinity", "∞", StringComparison.Ordinal), StringComparison.Ordinal);
    }
}
