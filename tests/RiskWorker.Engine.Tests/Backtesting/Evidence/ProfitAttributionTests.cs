using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>MAR32.35 to MAR32.45. Figures recomputed with general-purpose libraries (SciPy); the ten rows are a public illustration's, which prints 0.98788 and 0.1.</summary>
public sealed class ProfitAttributionTests
{
    private static readonly double[] s_hypothetical = [-3.2, -1.8, -0.9, -0.4, 0.2, 0.7, 1.1, 1.6, 2.4, 3.9];
    private static readonly double[] s_theoretical = [-2.9, -2.1, -0.6, -0.7, 0.4, 0.5, 1.3, 1.4, 2.8, 3.5];

    [Fact]
    public void Ten_days_have_the_published_correlation_and_distance()
    {
        var result = ProfitAttribution.Of(s_hypothetical, s_theoretical);
        Assert.Equal(0.9878787878787878, result.Spearman.Statistic!.Value, 1e-12);
        Assert.Equal(0.1, result.KolmogorovSmirnov.Statistic!.Value, 1e-12);
        Assert.Equal(AttributionZone.Amber, result.Zone); // 0.1 is not below 0.09
        Assert.EndsWith("The supervisory test has 250 days, this one 10.", result.Spearman.Note, StringComparison.Ordinal);
    }

    [Fact]
    public void Ties_take_their_average_rank() =>
        Assert.Equal(0.9256265453136692, ProfitAttribution.Of([1, 2, 2, 3, 4, 4, 4, 5], [2, 1, 3, 3, 5, 4, 4, 6]).Spearman.Statistic!.Value, 1e-12);

    [Fact]
    public void Year_of_many_ties_has_the_recomputed_figures()
    {
        var numbers = new SeededNumbers(3);
        double[] first = [.. Enumerable.Range(0, 250).Select(_ => Math.Floor(numbers.Unit() * 40))];
        double[] second = [.. first.Select(f => f + Math.Floor(numbers.Unit() * 20))];
        var result = ProfitAttribution.Of(first, second);
        Assert.Equal(0.881139960550785, result.Spearman.Statistic!.Value, 1e-12);
        Assert.Equal(0.28, result.KolmogorovSmirnov.Statistic!.Value, 1e-12);
        Assert.Equal(AttributionZone.Red, result.Zone);
    }

    [Theory]
    [InlineData(22, 0.2881115627437688, AttributionZone.Green)]
    [InlineData(23, 0.24091783209210701, AttributionZone.Amber)]
    [InlineData(30, 0.05456740040448037, AttributionZone.Amber)] // exactly 0.12
    [InlineData(31, 0.04272221964148606, AttributionZone.Red)]
    public void Distance_of_250_days_is_compared_in_whole_steps(int steps, double tail, AttributionZone zone)
    {
        // Moved up by so many steps: the ranks stay as they are.
        double[] days = [.. Enumerable.Range(0, 250).Select(t => (double)t)];
        var result = ProfitAttribution.Of(days, [.. days.Select(d => d + steps - 0.5)]);
        Assert.Equal(1, result.Spearman.Statistic!.Value, 1e-12);
        Assert.Equal(steps / 250.0, result.KolmogorovSmirnov.Statistic!.Value, 1e-12);
        Assert.Equal(tail, result.KolmogorovSmirnov.PValue!.Value, 1e-10);
        Assert.Equal(zone, result.Zone);
    }

    [Theory]
    [InlineData(116, AttributionZone.Green)]
    [InlineData(117, AttributionZone.Amber)]
    [InlineData(132, AttributionZone.Amber)]
    [InlineData(133, AttributionZone.Red)]
    public void Correlation_of_250_days_with_some_reversed_has_its_zone(int reversed, AttributionZone zone)
    {
        // Σ d² = m (m² - 1)/3 for m reversed days, and 1 - 6 Σ d²/(n (n² - 1)) = 1 - 2 m (m² - 1)/(n (n² - 1)): 0.8 and 0.7 lie between.
        double[] first = [.. Enumerable.Range(0, 250).Select(t => (double)t)];
        double[] second = [.. first];
        Array.Reverse(second, 0, reversed);
        var result = ProfitAttribution.Of(first, second);
        Assert.Equal(1 - (2.0 * reversed * ((reversed * reversed) - 1) / (250 * ((250 * 250) - 1))), result.Spearman.Statistic!.Value, 1e-11);
        Assert.Equal((0, zone), (result.KolmogorovSmirnov.Statistic, result.Zone));
    }

    [Fact]
    public void Correlation_that_is_exactly_a_threshold_is_neither_above_nor_below_it()
    {
        // Five days, two neighbours swapped twice: Σ d² = 4, 1 - 24/120 = 0.8.
        var moments = RankMoments.Of(AverageRanks.Doubled([1, 2, 3, 4, 5]), AverageRanks.Doubled([2, 1, 4, 3, 5]));
        Assert.Equal((0, 1, -1), (moments.CompareTo(8, 10), Math.Sign(moments.CompareTo(7, 10)), Math.Sign(moments.CompareTo(9, 10))));
        Assert.Equal(AttributionZone.Amber, ProfitAttribution.Of([1, 2, 3, 4, 5], [2, 1, 4, 3, 5]).Zone);
    }

    [Fact]
    public void Without_a_hypothetical_series_of_the_firm_nothing_is_assessed()
    {
        var result = ProfitAttribution.Of(null, s_theoretical);
        Assert.Null(result.Zone);
        Assert.All([result.Spearman, result.KolmogorovSmirnov], t => Assert.StartsWith("Not assessable: the firm supplies no hypothetical profit", t.Note, StringComparison.Ordinal));
        Assert.All([result.Spearman, result.KolmogorovSmirnov], t => Assert.Equal((null, null, null), (t.Statistic, t.PValue, t.Reject)));
    }

    [Fact]
    public void Series_of_one_value_has_no_correlation_and_no_zone()
    {
        var result = ProfitAttribution.Of([1, 2, 3], [5, 5, 5]);
        Assert.Null(result.Zone);
        Assert.Null(result.Spearman.Statistic);
        Assert.Equal(1, result.KolmogorovSmirnov.Statistic);
    }

    [Fact]
    public void Series_of_other_days_are_refused()
    {
        Assert.StartsWith("There are 10 hypothetical and 9", Assert.Throws<ArgumentException>(() => ProfitAttribution.Of(s_hypothetical, s_theoretical[1..])).Message, StringComparison.Ordinal);
        Assert.StartsWith("Day 1 has hypothetical profit NaN", Assert.Throws<ArgumentException>(() => ProfitAttribution.Of([1, double.NaN], [1, 2])).Message, StringComparison.Ordinal);
    }
}
