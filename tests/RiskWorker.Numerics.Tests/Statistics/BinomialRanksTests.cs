using MathNet.Numerics.Distributions;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Numerics.Tests.Statistics;

public sealed class BinomialRanksTests
{
    [Theory]
    [InlineData(100_000, "0.99", 99_000, "1000")]
    [InlineData(250, "0.99", 248, "2.5")]
    [InlineData(1_000, "0.975", 975, "25")]
    [InlineData(16_384, "0.975", 15_975, "409.6")]
    [InlineData(1_600_000, "0.999", 1_598_400, "1600")]
    [InlineData(1, "0.99", 1, "0.01")]
    [InlineData(2_000_000_000, "0.999999", 1_999_998_000, "2000")]
    public void VarRank_and_TailWeight_are_exact_decimals(int n, string alpha, int rank, string weight)
    {
        Assert.Equal(rank, BinomialRanks.VarRank(n, Decimal(alpha)));
        Assert.Equal(Decimal(weight), BinomialRanks.TailWeight(n, Decimal(alpha)));
    }

    [Fact]
    public void VarRank_of_every_count_up_to_1000_equals_integer_arithmetic()
    {
        for (var n = 1; n <= 1000; n++)
        {
            Assert.Equal(((99 * n) + 99) / 100, BinomialRanks.VarRank(n, 0.99m));
            Assert.Equal(((975 * n) + 999) / 1000, BinomialRanks.VarRank(n, 0.975m));
        }
    }

    // The median of 10: the 2nd and 9th of order, coverage 1 - 2(1 + 10)/1024 = 97.9% (David and Nagaraja 2003, section 7.1).
    [Fact]
    public void Interval_of_the_median_of_ten_is_from_the_second_to_the_ninth() =>
        Assert.Equal(new RankInterval(2, 9), BinomialRanks.Interval(10, 0.5m, 0.95m));

    // P(B = 0) = P(B = n) = 2^-n: the extremes of 6 cover 1 - 2/64 = 96.875%, those of 5 cover 93.75%.
    [Theory]
    [InlineData(6, "0.95", 1, 6)]
    [InlineData(5, "0.95", null, null)]
    [InlineData(5, "0.9375", 1, 5)] // met exactly: rounding must not decide
    [InlineData(5, "0.93750001", null, null)]
    public void Interval_of_the_median_of_few_follows_the_powers_of_two(int n, string level, int? low, int? high) =>
        Assert.Equal(new RankInterval(low, high), BinomialRanks.Interval(n, 0.5m, Decimal(level)));

    // The upper end needs alpha^n ≤ 2.5%: 0.99^368 = 0.0248, 0.99^367 = 0.0250099.
    [Fact]
    public void Interval_at_99_percent_has_an_upper_end_from_368_losses_on()
    {
        Assert.Null(BinomialRanks.Interval(367, 0.99m, 0.95m).High);
        Assert.Equal(368, BinomialRanks.Interval(368, 0.99m, 0.95m).High);
        Assert.NotNull(BinomialRanks.Interval(367, 0.99m, 0.95m).Low);
    }

    [Theory]
    [InlineData("0.95")]
    [InlineData("0.99")]
    public void Interval_equals_the_definition_on_another_distribution_function(string level)
    {
        foreach (var alpha in new[] { 0.01m, 0.5m, 0.9m, 0.95m, 0.975m, 0.99m, 0.999m })
        {
            for (var n = 1; n <= 1200; n = (n * 5 / 4) + 1) Assert.Equal(ByDefinition(n, (double)alpha, (double)Decimal(level)), BinomialRanks.Interval(n, alpha, Decimal(level)));
        }
    }

    [Theory]
    [InlineData(100_000, "0.99")]
    [InlineData(1_600_000, "0.975")]
    [InlineData(10_000_000, "0.99")]
    public void Interval_of_many_losses_straddles_the_rank_as_the_normal_limit_says(int n, string alpha)
    {
        var a = Decimal(alpha);
        var (low, high) = BinomialRanks.Interval(n, a, 0.95m);
        var half = Normal.InvCDF(0, 1, 0.975) * Math.Sqrt(n * (double)(a * (1 - a)));

        // Skewness moves both ends by (z² - 1)(1 - 2 alpha)/6 < 0.5, discreteness by 1 (Cornish and Fisher).
        Assert.InRange(low!.Value, (n * (double)a) - half - 2, (n * (double)a) - half + 2);
        Assert.InRange(high!.Value, (n * (double)a) + half - 2, (n * (double)a) + half + 2);
    }

    [Fact]
    public void Interval_of_an_impossible_level_names_it() =>
        Assert.Contains("1.2", Assert.Throws<ArgumentOutOfRangeException>(() => BinomialRanks.Interval(10, 0.5m, 1.2m)).Message, StringComparison.Ordinal);

    private static RankInterval ByDefinition(int n, double alpha, double level)
    {
        var outside = (1 - level) / 2 * (1 + 1e-12); // 0.975 and 95% meet exactly at one loss
        var low = 0;
        while (low < n && Binomial.CDF(alpha, n, low) <= outside) low++;
        var high = n + 1;
        while (high > 1 && 1 - Binomial.CDF(alpha, n, high - 2) <= outside) high--;
        return new(low >= 1 ? low : null, high <= n ? high : null);
    }

    private static decimal Decimal(string text) => decimal.Parse(text, System.Globalization.CultureInfo.InvariantCulture);
}
