using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>P. Christoffersen, Evaluating interval forecasts (1998). Ratios and chi-square tails recomputed with general-purpose libraries (SciPy).</summary>
public sealed class ChristoffersenTestsTests
{
    private readonly NullLaws _laws = new();

    [Theory]
    [InlineData(240, 4, 1, 3.1539892866514436, 0.07574158174658126)]
    [InlineData(220, 12, 5, 9.026772846470138, 0.0026605376532404666)]
    [InlineData(1000, 8, 4, 21.888706923472412, 2.889292697634471e-06)]
    public void Independence_of_transition_counts_has_the_recomputed_ratio_and_tail(int stayed, int fell, int again, double ratio, double tail)
    {
        var series = Series(stayed, fell, again);
        Assert.Equal(new TransitionCounts(stayed, fell, fell, again), TransitionCounts.Of(series));
        var test = ChristoffersenTests.Independence(series, _laws);
        Assert.Equal(ratio, test.Statistic!.Value, 1e-11 * ratio);
        Assert.Equal(tail, Judgement.ChiSquareTail(ratio, 1), 1e-12 * tail);
        Assert.Equal(PValueMethod.Exact, test.Method);
    }

    [Fact]
    public void Independence_where_none_follows_another_and_the_series_begins_after_one_has_ratio_zero() =>
        Assert.Equal(0, LikelihoodRatios.Independence(new(246, 3, 0, 0)), 1e-12);

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    public void Independence_of_less_than_two_exceptions_rejects_nothing(int count)
    {
        var test = ChristoffersenTests.Independence(On(250, Enumerable.Range(100, count)), _laws);
        Assert.False(test.Reject);
        Assert.EndsWith("none can follow another.", test.Note, StringComparison.Ordinal);
    }

    [Fact]
    public void Conditional_says_what_the_other_convention_gives()
    {
        // One exception on the first day: over all days it counts, over transitions it does not.
        var series = On(250, 1, 40, 41);
        var independence = ChristoffersenTests.Independence(series, _laws).Statistic!.Value;
        var test = ChristoffersenTests.Conditional(series, C99, _laws);
        Assert.Equal(LikelihoodRatios.Failures(250, 3, 0.01) + independence, test.Statistic!.Value, 1e-10);
        Assert.Contains($"the statistic is {Significant.Of(LikelihoodRatios.Failures(249, 2, 0.01) + independence)}.", test.Note, StringComparison.Ordinal);
    }

    [Fact]
    public void Conditional_beyond_the_enumerated_days_takes_the_chi_square_tail()
    {
        var test = ChristoffersenTests.Conditional(On(5001, 7, 500, 501, 3000), C99, _laws);
        Assert.Equal(PValueMethod.Asymptotic, test.Method);
        Assert.Equal(Judgement.ChiSquareTail(test.Statistic!.Value, 2), test.PValue!.Value, 1e-10);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(0)]
    public void One_day_or_none_is_not_assessed(int days)
    {
        Assert.Null(ChristoffersenTests.Independence(new bool[days], _laws).Reject);
        Assert.Null(ChristoffersenTests.Conditional(new bool[days], C99, _laws).Reject);
    }

    /// <summary>As many runs of exceptions as there are falls, the first longer by those that follow another.</summary>
    private static bool[] Series(int stayed, int fell, int again)
    {
        var series = new List<bool>(Enumerable.Repeat(false, stayed + 1));
        for (var run = 0; run < fell; run++)
        {
            series.AddRange(Enumerable.Repeat(true, run == 0 ? 1 + again : 1));
            series.Add(false);
        }
        return [.. series];
    }
}
