using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>
/// N. Costanzino and M. Curran (2015, 2018). Critical sums of the exact mixture and the standardised sums recomputed with general-purpose
/// libraries (mpmath in many digits).
/// </summary>
public sealed class CostanzinoCurranTestTests
{
    [Theory]
    [InlineData(0.975, 250, 3.125, 5.67049329658, 9.83663250751)]
    [InlineData(0.975, 500, 6.25, 9.77302146398, 15.2018148788)]
    [InlineData(0.99, 250, 1.25, 2.93602054086, 5.99939208526)]
    [InlineData(0.99, 500, 2.5, 4.81125911823, 8.69700211696)]
    public void Critical_sums_of_the_law_are_the_recomputed_ones(double confidence, int days, double mean, double yellow, double red)
    {
        var law = new WeightedBreachLaw(days, new((decimal)confidence));
        Assert.Equal(mean, law.Mean, 1e-12);
        Assert.Equal(yellow, law.Quantile(0.95), 1e-10);
        Assert.Equal(red, law.Quantile(0.9999), 1e-9);
    }

    [Theory]
    [InlineData(250, 1.6610947199933568)]
    [InlineData(500, -0.37091726548435994)]
    public void Sum_of_five_and_a_half_has_the_recomputed_statistic(int days, double z)
    {
        // Six days halfway into the tail and five a half more than that: 6·0.5 + 2.5.
        double[] transforms = [.. Enumerable.Repeat(0.0125, 11), .. Enumerable.Repeat(0.5, days - 11)];
        var test = CostanzinoCurranTest.Of(transforms, C975);
        Assert.Equal(z, test.Statistic!.Value, 1e-11);
        Assert.Equal(PValueMethod.Exact, test.Method);
        Assert.Equal(new WeightedBreachLaw(days, C975).AtLeast(5.5), test.PValue!.Value, 1e-11);
    }

    [Theory]
    [InlineData(0.3)]
    [InlineData(1.0)]
    [InlineData(1.7)]
    public void Tail_of_two_days_is_that_of_the_triangle(double sum)
    {
        // P(N = 1) of one uniform and P(N = 2) of two, by hand: p = 0.2.
        var one = Math.Max(1 - sum, 0);
        var two = sum <= 1 ? 1 - (sum * sum / 2) : (2 - sum) * (2 - sum) / 2;
        Assert.Equal((0.32 * one) + (0.04 * two), new WeightedBreachLaw(2, new(0.8m)).AtLeast(sum), 1e-14);
    }

    [Fact]
    public void Tail_of_many_exceptions_tends_to_the_normal_one()
    {
        var law = new WeightedBreachLaw(10_000, new(0.95m));
        Assert.True(law.IsExact);
        Assert.Equal(0.5, law.AtLeast(law.Mean), 0.01);
        Assert.Equal(0.02275, law.AtLeast(law.Mean + (2 * Math.Sqrt(law.Variance))), 0.002);
        Assert.False(new WeightedBreachLaw(100_000, new(0.95m)).IsExact);
    }

    [Fact]
    public void Year_without_a_day_in_the_tail_has_probability_one() =>
        Assert.Equal((1, false), (CostanzinoCurranTest.Of([0.5, 0.3, 0.9], C975).PValue, CostanzinoCurranTest.Of([0.5, 0.3, 0.9], C975).Reject));

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(double.NaN)]
    public void Probability_outside_the_open_interval_is_refused(double u) => Assert.StartsWith(
        $"The forecast probability of day 1 is {u}", Assert.Throws<ArgumentException>(() => CostanzinoCurranTest.Of([0.5, u], C975)).Message, StringComparison.Ordinal);
}
