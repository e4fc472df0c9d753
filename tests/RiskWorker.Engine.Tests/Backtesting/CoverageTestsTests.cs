using System.Globalization;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;

namespace RiskWorker.Engine.Tests.Backtesting;

/// <summary>
/// Likelihood ratios and p-values against figures computed with SciPy from the formulas of Kupiec (1995) and Christoffersen (1998), and against
/// Kupiec's published table of the counts that are not rejected at 5% (read from memory and recomputed: all cells agree).
/// </summary>
public sealed class CoverageTestsTests
{
    private const double Critical = 3.841458820694124; // chi-square, 1 degree of freedom, 5%

    [Theory]
    [InlineData(0, 250, "0.99", 5.025167926750726)]
    [InlineData(7, 250, "0.99", 5.496990447792683)]
    [InlineData(10, 250, "0.99", 12.955491062356018)]
    [InlineData(20, 252, "0.95", 3.9125508275532184)]
    [InlineData(7, 255, "0.99", 5.316341340978191)]
    [InlineData(17, 1000, "0.99", 4.090972554545601)]
    public void Coverage_ratio_is_that_of_Kupiec(int exceptions, int days, string confidence, double expected) =>
        Assert.Equal(expected, Coverage(exceptions, days, confidence).Statistic, 1e-10);

    [Theory]
    [InlineData(1, 250, 0.2780714900139528)]
    [InlineData(5, 250, 0.1618549171960387)]
    [InlineData(7, 250, 0.019049230890526535)]
    [InlineData(10, 250, 0.0003189845082133835)]
    [InlineData(7, 255, 0.02112632378977111)]
    [InlineData(17, 1000, 0.043112828006510305)]
    public void Coverage_probability_is_that_of_chi_square(int exceptions, int days, double expected) =>
        Assert.Equal(expected, Coverage(exceptions, days, "0.99").PValue, 1e-12);

    [Theory]
    [InlineData("0.99", 255, 1, 6)]
    [InlineData("0.99", 510, 2, 10)]
    [InlineData("0.99", 1000, 5, 16)]
    [InlineData("0.99", 250, 1, 6)]
    [InlineData("0.975", 255, 3, 11)]
    [InlineData("0.975", 510, 7, 20)]
    [InlineData("0.95", 255, 7, 20)]
    [InlineData("0.95", 1000, 38, 64)]
    [InlineData("0.9", 255, 17, 35)]
    public void Counts_that_are_not_rejected_are_those_of_the_table(string confidence, int days, int first, int last)
    {
        var kept = Enumerable.Range(0, days + 1).Where(x => Coverage(x, days, confidence).Statistic < Critical).ToArray();
        Assert.Equal((first, last, last - first + 1), (kept[0], kept[^1], kept.Length));
    }

    [Theory]
    [InlineData(240, 4, 1, 3.1539892866514436, 0.07574158174658126)]
    [InlineData(220, 12, 5, 9.026772846470138, 0.0026605376532404666)]
    [InlineData(1000, 8, 4, 21.888706923472412, 2.889292697634471e-06)]
    public void Independence_ratio_is_that_of_Christoffersen(int quiet, int runs, int again, double statistic, double p)
    {
        var result = CoverageTests.Independence(Series(quiet, runs, again))!;
        Assert.Equal(statistic, result.Statistic, 1e-10);
        Assert.Equal(p, result.PValue, 1e-12);
    }

    // The statistic is the sum, its law chi-square with two degrees of freedom: the tail of that is exp(-x/2).
    [Fact]
    public void Conditional_coverage_is_the_sum_with_two_degrees_of_freedom()
    {
        var (series, confidence) = (Series(240, 4, 1), new Confidence(0.99m));
        var sum = CoverageTests.Coverage(series, confidence)!.Statistic + CoverageTests.Independence(series)!.Statistic;
        var both = CoverageTests.Conditional(series, confidence)!;
        Assert.Equal(sum, both.Statistic, 1e-10);
        Assert.Equal(Math.Exp(-sum / 2), both.PValue, 1e-12);
    }

    [Fact]
    public void Series_without_or_of_nothing_but_exceptions_has_finite_ratios()
    {
        Assert.Equal(new Domain.Runs.TestResult(0, 1), CoverageTests.Independence(new bool[250]));
        Assert.Equal(new Domain.Runs.TestResult(0, 1), CoverageTests.Independence([.. Enumerable.Repeat(true, 250)]));
        Assert.Equal(-2 * 250 * Math.Log(0.01), CoverageTests.Coverage([.. Enumerable.Repeat(true, 250)], new(0.99m))!.Statistic, 1e-8);
        // An exception on the last day only: no day follows it.
        Assert.True(double.IsFinite(CoverageTests.Independence([.. Enumerable.Range(0, 250).Select(t => t == 249)])!.Statistic));
    }

    [Fact]
    public void Too_few_days_give_no_test()
    {
        Assert.Null(CoverageTests.Coverage([], new(0.99m)));
        Assert.Null(CoverageTests.Independence([true]));
        Assert.Null(CoverageTests.Conditional([true], new(0.99m)));
        Assert.NotNull(CoverageTests.Coverage([true], new(0.99m)));
    }

    private static Domain.Runs.TestResult Coverage(int exceptions, int days, string confidence) =>
        CoverageTests.Coverage([.. Enumerable.Range(0, days).Select(t => t < exceptions)], new(decimal.Parse(confidence, CultureInfo.InvariantCulture)))!;

    // `runs` runs of exceptions between quiet days, the first one longer by `again`: so many days stay quiet, turn, and stay exceptions.
    private static bool[] Series(int quiet, int runs, int again)
    {
        var series = new List<bool> { false };
        for (var run = 0; run < runs; run++)
        {
            series.AddRange(Enumerable.Repeat(true, run == 0 ? 1 + again : 1));
            series.Add(false);
        }
        series.AddRange(new bool[quiet]);
        return [.. series];
    }
}
