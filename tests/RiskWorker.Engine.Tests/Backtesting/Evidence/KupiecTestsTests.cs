using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>
/// P. Kupiec, Techniques for verifying the accuracy of risk measurement models (1995). Ratios and exact probabilities recomputed with
/// general-purpose libraries (SciPy); the regions are the paper's tables in strict form, as remembered, which that recomputation agrees with.
/// </summary>
public sealed class KupiecTestsTests
{
    private const double Critical = 3.841458820694124; // chi-square with 1 degree of freedom, 5%
    private readonly NullLaws _laws = new();

    [Theory]
    [InlineData(0, 250, 0.01, 5.025167926750726)]
    [InlineData(7, 250, 0.01, 5.496990447792683)]
    [InlineData(10, 250, 0.01, 12.955491062356018)]
    [InlineData(20, 252, 0.05, 3.9125508275532184)]
    [InlineData(7, 255, 0.01, 5.316341340978191)]
    [InlineData(17, 1000, 0.01, 4.090972554545601)]
    public void Failures_of_a_count_have_the_recomputed_ratio(int count, int days, double p, double ratio) =>
        Assert.Equal(ratio, Failures(days, count, p).Statistic!.Value, 1e-10 * ratio);

    [Theory]
    [InlineData(255, 0.01, 1, 6)]
    [InlineData(510, 0.01, 2, 10)]
    [InlineData(1000, 0.01, 5, 16)]
    [InlineData(250, 0.01, 1, 6)]
    [InlineData(500, 0.01, 2, 9)]
    [InlineData(255, 0.025, 3, 11)]
    [InlineData(510, 0.025, 7, 20)]
    [InlineData(1000, 0.025, 16, 35)]
    [InlineData(250, 0.025, 3, 11)]
    [InlineData(500, 0.025, 7, 19)]
    [InlineData(255, 0.05, 7, 20)]
    [InlineData(510, 0.05, 17, 35)]
    [InlineData(1000, 0.05, 38, 64)]
    [InlineData(255, 0.075, 12, 27)]
    [InlineData(510, 0.1, 39, 64)]
    [InlineData(1000, 0.1, 82, 119)]
    public void Failures_ratio_stays_below_the_critical_value_in_the_published_region(int days, double p, int first, int last)
    {
        var inside = Enumerable.Range(0, last + 5).Where(x => LikelihoodRatios.Failures(days, x, p) < Critical);
        Assert.Equal((first, last), (inside.Min(), inside.Max()));
    }

    [Theory]
    [InlineData(250, 0.01, 0, 0.09475996401738493)]
    [InlineData(250, 0.01, 2, 0.7850522755508424)]
    [InlineData(250, 0.01, 5, 0.18887088925855594)]
    [InlineData(250, 0.01, 7, 0.013701447855203655)]
    [InlineData(250, 0.01, 14, 3.264615476595372e-07)]
    [InlineData(250, 0.025, 0, 0.0020043730756121435)]
    [InlineData(250, 0.025, 10, 0.22654627561089102)]
    [InlineData(500, 0.01, 5, 1.0)]
    [InlineData(500, 0.01, 14, 0.00064634794511034)]
    [InlineData(500, 0.025, 0, 3.419294163934308e-06)]
    [InlineData(500, 0.025, 5, 0.02251672075188958)]
    public void Failures_have_the_probability_of_all_counts_with_as_large_a_ratio(int days, double p, int count, double expected)
    {
        var test = Failures(days, count, p);
        Assert.Equal(PValueMethod.Exact, test.Method);
        Assert.Equal(expected, test.PValue!.Value, 1e-9 * expected);
        Assert.Equal(expected <= 0.05, test.Reject);
    }

    [Theory]
    [InlineData(1, 9.210340371976182)]
    [InlineData(6, 3.904109224115541)]
    [InlineData(438, 3.832180931715457)]
    [InlineData(439, 3.847715389409819)]
    public void First_failure_on_a_day_has_the_recomputed_ratio(int day, double ratio) =>
        Assert.Equal(ratio, KupiecTests.FirstFailure(On(500, day), C99, _laws).Statistic!.Value, 1e-11 * ratio);

    [Theory]
    [InlineData(0.005, 12, 878)]
    [InlineData(0.01, 7, 438)]
    [InlineData(0.015, 5, 291)]
    [InlineData(0.02, 4, 218)]
    [InlineData(0.025, 3, 174)]
    [InlineData(0.03, 3, 145)]
    [InlineData(0.035, 3, 124)]
    [InlineData(0.04, 2, 108)]
    [InlineData(0.045, 2, 96)]
    [InlineData(0.05, 2, 86)]
    public void First_failure_ratio_stays_below_the_critical_value_in_the_published_region(double p, int first, int last)
    {
        var inside = Enumerable.Range(1, last + 50).Where(v => LikelihoodRatios.FirstFailure(v, p) < Critical);
        Assert.Equal((first, last), (inside.Min(), inside.Max()));
    }

    [Fact]
    public void First_failure_that_never_came_takes_the_ratio_of_none_and_says_so()
    {
        var test = KupiecTests.FirstFailure(new bool[250], C99, _laws);
        Assert.Equal(5.025167926750726, test.Statistic!.Value, 1e-11);
        Assert.StartsWith("No exception in 250 days", test.Note, StringComparison.Ordinal);
    }

    [Fact]
    public void No_day_is_not_assessed()
    {
        var tests = new[] { KupiecTests.Failures([], C99, _laws), KupiecTests.FirstFailure([], C99, _laws) };
        Assert.All(tests, t => Assert.Equal((null, null, null, null, "No day to count."), (t.Statistic, t.PValue, t.Method, t.Reject, t.Note)));
    }

    private StatisticalTest Failures(int days, int count, double p) => KupiecTests.Failures(Count(days, count), new(1 - (decimal)p), _laws);
}
