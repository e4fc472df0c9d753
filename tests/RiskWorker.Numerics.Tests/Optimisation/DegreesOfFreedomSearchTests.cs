using RiskWorker.Numerics.Optimisation;

namespace RiskWorker.Numerics.Tests.Optimisation;

public sealed class DegreesOfFreedomSearchTests
{
    // A parabola in the reciprocal: the maximum is known, and so is where twice the fall is 3.841458820694124 (the 95% quantile of χ²₁).
    [Theory]
    [InlineData(0.2)]
    [InlineData(0.4871)]
    [InlineData(0.0051)]
    [InlineData(0.1 / 0.7)]
    public void Maximise_a_parabola_finds_its_top_and_its_interval(double top)
    {
        const double curvature = 4000;
        DegreesOfFreedomFit fit = DegreesOfFreedomSearch.Maximise(nu => -curvature * ((1 / nu) - top) * ((1 / nu) - top), -curvature * top * top, 500);
        double half = Math.Sqrt(3.841458820694124 / 2 / curvature);
        Assert.Equal(top, 1 / fit.Nu, 1e-8);
        Assert.Equal(0, fit.LogLikelihood, 1e-12);
        Assert.Equal(Math.Min(top + half, 1 / 2.05), 1 / fit.IntervalLow, 1e-7);
        Assert.Equal(Math.Max(top - half, 1 / 200.0), 1 / fit.IntervalHigh, 1e-7);
        Assert.False(fit.AtLowerEnd || fit.AtUpperEnd);
        Assert.Equal(-curvature * top * top, fit.NormalLogLikelihood);
        Assert.Equal(500, fit.Days);
    }

    [Fact]
    public void Maximise_a_slope_says_which_end_it_reached()
    {
        DegreesOfFreedomFit up = DegreesOfFreedomSearch.Maximise(nu => -100 / nu, 0, 10), down = DegreesOfFreedomSearch.Maximise(nu => 100 / nu, 0, 10);
        Assert.True(up.AtUpperEnd && !up.AtLowerEnd && down.AtLowerEnd && !down.AtUpperEnd);
        Assert.Equal(200, up.Nu);
        Assert.Equal(200, up.IntervalHigh);
        Assert.Equal(1 / ((1 / 200.0) + (3.841458820694124 / 200)), up.IntervalLow, 1e-6);
        Assert.Equal(2.05, down.Nu);
        Assert.Equal(2.05, down.IntervalLow);
        Assert.Equal(1 / ((1 / 2.05) - (3.841458820694124 / 200)), down.IntervalHigh, 1e-6);
    }

    [Fact]
    public void Maximise_what_says_nothing_has_the_whole_range_as_its_interval()
    {
        DegreesOfFreedomFit fit = DegreesOfFreedomSearch.Maximise(nu => -1 / nu, 0, 10);
        Assert.Equal(2.05, fit.IntervalLow);
        Assert.Equal(200, fit.IntervalHigh);
    }

    [Fact]
    public void Maximise_a_NaN_is_refused() =>
        Assert.Contains("not a number", Assert.Throws<ArgumentException>(() => DegreesOfFreedomSearch.Maximise(_ => double.NaN, 0, 1)).Message, StringComparison.Ordinal);
}
