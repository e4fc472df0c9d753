using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>
/// C. Acerbi and B. Szekely, Backtesting expected shortfall (2014). Critical values of 250 days at 97.5% recomputed with 20 million
/// simulated years each by general-purpose libraries; -0.70 of Z2 is the paper's own for most laws.
/// </summary>
public sealed class AcerbiSzekelyTestsTests
{
    private const int Days = 250;
    private const int Many = 40_000;

    [Theory]
    [InlineData(0, -0.7006, 0.05)]
    [InlineData(0, -1.0379, 0.01)]
    [InlineData(3, -0.8155, 0.05)]
    [InlineData(3, -1.3310, 0.01)]
    [InlineData(5, -0.7365, 0.05)]
    [InlineData(10, -0.7108, 0.05)]
    [InlineData(100, -0.7013, 0.05)]
    public void Z2_at_a_critical_value_has_its_probability(int freedom, double critical, double level)
    {
        // As many equal losses as bring the statistic there, each beyond VaR.
        const int losses = 8;
        var loss = (1 - critical) * Days * 0.025 / losses;
        var test = AcerbiSzekelyTests.Of(Year(freedom, losses, loss), C975, Many).Z2;
        Assert.Equal(critical, test.Statistic!.Value, 1e-11);
        Assert.Equal(PValueMethod.Simulated, test.Method);
        Assert.Equal(level, test.PValue!.Value, 4 * Math.Sqrt(level * (1 - level) / Many));
    }

    [Theory]
    [InlineData(0, -0.1138)]
    [InlineData(3, -0.4263)]
    [InlineData(5, -0.2557)]
    [InlineData(10, -0.1700)]
    [InlineData(100, -0.1183)]
    public void Z1_at_a_critical_value_has_its_probability(int freedom, double critical)
    {
        var test = AcerbiSzekelyTests.Of(Year(freedom, 6, 1 - critical), C975, Many).Z1;
        Assert.Equal(critical, test.Statistic!.Value, 1e-11);
        Assert.Equal(0.05, test.PValue!.Value, (4 * Math.Sqrt(0.05 * 0.95 / Many)) + 0.0003);
    }

    [Fact]
    public void Law_by_two_hundred_quantiles_gives_the_same_probabilities_as_its_formula()
    {
        decimal[] probabilities = [0.0001m, 0.0002m, 0.0003m, 0.0005m, 0.0007m, .. Enumerable.Range(2, 99).Select(i => i * 0.0005m), .. Enumerable.Range(6, 90).Select(i => i * 0.01m), 0.99m];
        var table = new QuantileTable([.. probabilities.Select(p => (double)p)], [.. probabilities.Select(p => InverseNormal.Of((double)p))]);
        var year = Year(0, 8, 1.7 * Days * 0.025 / 8);
        var formula = AcerbiSzekelyTests.Of(year, C975, Many);
        var tabulated = AcerbiSzekelyTests.Of([.. year.Select(d => d with { Inverse = table.At })], C975, Many);
        Assert.Equal(formula.Z2.PValue!.Value, tabulated.Z2.PValue!.Value, 0.001);
        Assert.Equal(formula.Z1.PValue!.Value, tabulated.Z1.PValue!.Value, 0.003);
    }

    [Fact]
    public void Both_do_not_depend_on_the_unit_of_each_day()
    {
        var year = Year(3, 9, 1.2);
        var scaled = year.Select((d, t) => new ShortfallDay(d.Profit * (t + 1), d.Var * (t + 1), d.Shortfall * (t + 1), u => d.Inverse(u) * (t + 1)));
        var (z1, z2) = AcerbiSzekelyTests.Of(year, C975, 2000);
        var (scaled1, scaled2) = AcerbiSzekelyTests.Of([.. scaled], C975, 2000);
        Assert.Equal(z1.PValue, scaled1.PValue);
        Assert.Equal(z2.PValue, scaled2.PValue);
        Assert.Equal(z2.Statistic!.Value, scaled2.Statistic!.Value, 1e-10);
    }

    [Fact]
    public void Year_without_loss_beyond_var_has_no_z1_and_a_z2_of_one_that_rejects_nothing()
    {
        var (z1, z2) = AcerbiSzekelyTests.Of(Year(0, 0, 0), C975);
        Assert.Equal((null, null, null, "No loss beyond VaR: Z1 has no value."), (z1.Statistic, z1.PValue, z1.Reject, z1.Note));
        Assert.Equal((1, 1, false), (z2.Statistic, z2.PValue, z2.Reject));
    }

    [Fact]
    public void Forecast_of_no_loss_leaves_both_unassessed()
    {
        ShortfallDay[] days = [.. Year(0, 3, 1.5).Select((d, t) => t == 7 ? d with { Shortfall = 0 } : d)];
        var (z1, z2) = AcerbiSzekelyTests.Of(days, C975);
        Assert.Equal(z1.Note, z2.Note);
        Assert.Equal("Expected shortfall is not a loss on 1 of 250 days: its ratio to a loss says nothing.", z2.Note);
        Assert.Null(z2.Reject);
    }

    [Fact]
    public void Number_that_is_not_finite_is_refused_with_its_day()
    {
        var days = Year(0, 3, 1.5).ToArray();
        days[4] = days[4] with { Profit = double.NaN };
        var error = Assert.Throws<ArgumentException>(() => AcerbiSzekelyTests.Of(days, C975));
        Assert.StartsWith("Day 4 has profit NaN", error.Message, StringComparison.Ordinal);
    }

    /// <summary>Days of a standard normal law (0) or Student's t, some with a loss in multiples of expected shortfall.</summary>
    private static ShortfallDay[] Year(int freedom, int losses, double loss)
    {
        Func<double, double> inverse = freedom == 0 ? InverseNormal.Of : Raw(new StudentT(freedom));
        var (var, shortfall) = (-inverse(0.025), Shortfall(freedom, -inverse(0.025)));
        return [.. Enumerable.Range(0, Days).Select(t => new ShortfallDay(t < losses ? -loss * shortfall : 0, var, shortfall, inverse))];

        static Func<double, double> Raw(StudentT law) => law.Quantile;
    }

    // Closed forms: φ(v)/p; f(v) (ν + v²)/((ν - 1) p) (A. McNeil, R. Frey and P. Embrechts, Quantitative Risk Management, 2015, section 2.3.4).
    private static double Shortfall(int freedom, double v) => freedom == 0
        ? NormalDensity.Of(v) / 0.025
        : new StudentT(freedom).Density(v) * (freedom + (v * v)) / ((freedom - 1) * 0.025);
}
