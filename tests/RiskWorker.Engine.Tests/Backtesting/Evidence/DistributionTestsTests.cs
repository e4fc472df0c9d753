using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>
/// Tests of forecast probabilities against general-purpose libraries (SciPy), on seeded series of 250 days: uniforms, and their 1.3rd power.
/// Kolmogorov's tails from 100 days on by the matrix of Marsaglia, Tsang and Wang (2003) in 80-bit numbers: SciPy's own are approximations there.
/// </summary>
public sealed class DistributionTestsTests
{
    private static readonly double[] s_uniform = Uniforms(7, 250);
    private static readonly double[] s_power = [.. Uniforms(8, 250).Select(u => Math.Pow(u, 1.3))];

    [Theory]
    [InlineData(1, 0.7, 0.6)]
    [InlineData(5, 0.3, 0.664)]
    [InlineData(10, 0.4, 0.05898924519999926)]
    [InlineData(50, 0.15, 0.19026366518248072)]
    [InlineData(100, 0.1, 0.25269275700639005)]
    [InlineData(100, 0.3, 1.7719869892662917e-08)]
    [InlineData(250, 0.02, 0.9999303176086239)]
    [InlineData(250, 0.05, 0.5427411686321693)]
    [InlineData(250, 0.0863, 0.0454467399094174)]
    [InlineData(250, 0.12, 0.0013550102439420912)]
    [InlineData(500, 0.04, 0.390251016326406)]
    [InlineData(500, 0.0607, 0.0481592342142678)]
    [InlineData(500, 0.1, 8.342293067263533e-05)]
    [InlineData(1000, 0.03, 0.32269024641329985)]
    [InlineData(2000, 0.03, 0.05354694548336652)]
    public void Kolmogorov_tail_is_exact_for_a_finite_number_of_days(int days, double distance, double tail) =>
        Assert.Equal(tail, KolmogorovSmirnovLaw.AtLeast(days, distance), 1e-9 * tail);

    [Theory]
    [InlineData(3000, 0.02, 0.17889813623188955)]
    [InlineData(5000, 0.015, 0.20846142096186204)]
    public void Kolmogorov_tail_of_many_days_is_the_limit_law_moved(int days, double distance, double tail) =>
        Assert.Equal(tail, KolmogorovSmirnovLaw.AtLeast(days, distance), 2e-4);

    [Fact]
    public void Kolmogorov_tail_is_continuous_where_its_formula_changes()
    {
        var at = Math.Sqrt(4.0 / 250);
        Assert.Equal(KolmogorovSmirnovLaw.AtLeast(250, at - 1e-12), KolmogorovSmirnovLaw.AtLeast(250, at + 1e-12), 1e-12);
    }

    [Fact]
    public void Kolmogorov_smirnov_has_the_recomputed_distance_and_tail()
    {
        Holds(0.0508659342631235, 0.5206380235392554, DistributionTests.KolmogorovSmirnov(s_uniform));
        Holds(0.09371930668123252, 0.02314858992785336, DistributionTests.KolmogorovSmirnov(s_power));
    }

    [Fact]
    public void Anderson_darling_has_the_recomputed_statistic()
    {
        Assert.Equal(0.5689337149262599, DistributionTests.AndersonDarling(s_uniform).Statistic!.Value, 1e-10);
        Assert.Equal(4.238032920175442, DistributionTests.AndersonDarling(s_power).Statistic!.Value, 1e-10);
    }

    [Theory]
    [InlineData(5, 0.4, 0.84248, 400_000)]
    [InlineData(5, 0.8, 0.4741725, 400_000)]
    [InlineData(5, 2.5, 0.05229, 400_000)]
    [InlineData(5, 4.0, 0.00942, 400_000)]
    [InlineData(10, 0.8, 0.476205, 400_000)]
    [InlineData(10, 1.5, 0.1758625, 400_000)]
    [InlineData(10, 4.0, 0.0090325, 400_000)]
    [InlineData(50, 0.4, 0.84891, 100_000)]
    [InlineData(50, 2.5, 0.05064, 100_000)]
    public void Anderson_darling_tail_is_that_of_simulated_samples(int days, double statistic, double tail, int samples) => // NumPy
        Assert.Equal(tail, AndersonDarlingLaw.AtLeast(days, statistic), 4 * Math.Sqrt(tail * (1 - tail) / samples));

    [Theory]
    [InlineData(1.933, 0.09999462321475971)]
    [InlineData(2.492, 0.0500221863656406)]
    [InlineData(3.878125, 0.010000000248663432)]
    [InlineData(6, 0.0009674519395806991)]
    [InlineData(10, 1.3815038296172144e-05)]
    public void Anderson_darling_limit_is_that_of_the_inverted_characteristic_function(double statistic, double tail) => // 4,000 terms by quadrature, SciPy
        Assert.Equal(tail, 1 - AndersonDarlingLaw.Limit(statistic), 2e-9);

    [Fact]
    public void Anderson_darling_far_tail_goes_on_where_the_series_ends() =>
        Assert.InRange(AndersonDarlingLaw.AtLeast(250, 30.0001) / AndersonDarlingLaw.AtLeast(250, 29.9), 0.5, 1.1);

    [Fact]
    public void Berkowitz_has_the_ratio_of_a_search_over_all_three_numbers()
    {
        var test = DistributionTests.Berkowitz(s_uniform);
        Holds(3.062508563569395, 0.38208763664912737, test);
        Assert.StartsWith("Mean 0.03759, deviation 0.9843, correlation with the day before 0.1025;", test.Note, StringComparison.Ordinal);
        Holds(14.805237957291183, 0.001990882153270723, DistributionTests.Berkowitz(s_power));
    }

    [Theory]
    [InlineData(false, 0.975, 1.0514492729367149)]
    [InlineData(false, 0.99, 1.9837353839185887)]
    [InlineData(false, 0.9, 0.729922361009244)]
    [InlineData(true, 0.975, 14.823642065958268)]
    [InlineData(true, 0.99, 11.086100350170739)]
    [InlineData(true, 0.9, 15.427378747449609)]
    public void Berkowitz_tail_has_the_ratio_of_a_search_over_both_numbers(bool power, double confidence, double ratio)
    {
        var test = BerkowitzTailTest.Of(power ? s_power : s_uniform, new((decimal)confidence), new NullLaws());
        Assert.Equal(ratio, test.Statistic!.Value, 1e-8 * ratio);
        Assert.Equal(PValueMethod.Simulated, test.Method);
        Assert.Equal(power, test.Reject);
    }

    [Fact]
    public void Berkowitz_tail_without_a_day_in_it_is_the_ratio_of_none() =>
        Assert.Equal(5.025167926750726, BerkowitzTailTest.Of([.. Enumerable.Repeat(0.5, 250)], C99, new NullLaws()).Statistic!.Value, 1e-10);

    [Fact]
    public void Series_that_is_too_short_or_does_not_vary_is_not_assessed()
    {
        Assert.Null(DistributionTests.KolmogorovSmirnov([]).Statistic);
        Assert.Null(DistributionTests.AndersonDarling([]).Statistic);
        Assert.Null(DistributionTests.Berkowitz(Uniforms(1, 19)).Reject);
        Assert.Null(DistributionTests.Berkowitz([.. Enumerable.Repeat(0.25, 100)]).Reject);
    }

    private static void Holds(double statistic, double tail, StatisticalTest test)
    {
        Assert.Equal(statistic, test.Statistic!.Value, 1e-9 * statistic);
        Assert.Equal(tail, test.PValue!.Value, 1e-8 * tail);
    }
}
