using System.Numerics;
using MathNet.Numerics.Distributions;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Numerics.Tests.Statistics;

public sealed class BinomialTailTests
{
    // First yellow and first red count of the supervisory zones: cumulative probability of 95% and 99.99%
    // (BCBS, Supervisory framework for the use of backtesting, January 1996, section III; boundaries recomputed exactly).
    [Theory]
    [InlineData(125, 3, 7, 6, 11, 10, 17)]
    [InlineData(250, 5, 10, 11, 17, 18, 27)]
    [InlineData(500, 9, 15, 18, 27, 33, 45)]
    [InlineData(750, 12, 20, 26, 37, 48, 61)]
    [InlineData(1000, 15, 24, 33, 45, 62, 77)]
    [InlineData(1250, 19, 27, 41, 54, 75, 93)]
    public void FirstReaching_zone_probabilities_gives_the_zone_boundaries(int days, params int[] boundaries)
    {
        decimal[] exceptionRates = [0.01m, 0.025m, 0.05m];
        for (var i = 0; i < exceptionRates.Length; i++)
        {
            var exceptions = new BinomialTail(days, exceptionRates[i]);
            Assert.Equal(boundaries[2 * i], exceptions.FirstReaching(0.95m));
            Assert.Equal(boundaries[(2 * i) + 1], exceptions.FirstReaching(0.9999m));
        }
    }

    // BCBS 1996, table 2 (99% coverage, 250 days), to the digits of the recomputation.
    [Theory]
    [InlineData(0, 0.0810585161621813, 1)]
    [InlineData(2, 0.543168973315725, 0.714248261206048)]
    [InlineData(4, 0.892187626903625, 0.241883302235117)]
    [InlineData(5, 0.958816815930151, 0.107812373096375)]
    [InlineData(9, 0.99974980993126, 0.00105653249735683)]
    [InlineData(10, 0.999946101370953, 0.00025019006874051)]
    [InlineData(15, 0.99999999247488, 5.12607372364159e-08)]
    public void Cumulative_of_250_days_at_one_percent_gives_the_published_table(int k, double atMost, double atLeast)
    {
        var exceptions = new BinomialTail(250, 0.01m);

        Assert.Equal(atMost, exceptions.AtMost(k), 2e-15);
        Assert.InRange(exceptions.AtLeast(k) / atLeast, 1 - 5e-14, 1 + 5e-14);
    }

    [Theory]
    [InlineData(1, "0.5")]
    [InlineData(7, "0.3")]
    [InlineData(400, "0.99")]
    [InlineData(1000, "0.025")]
    [InlineData(3000, "0.5")]
    [InlineData(20, "0.000001")]
    [InlineData(20, "0.999999")]
    public void Cumulative_equals_exact_rational_arithmetic(int n, string success)
    {
        var p = decimal.Parse(success, System.Globalization.CultureInfo.InvariantCulture);
        var tail = new BinomialTail(n, p);
        var (hits, misses) = ((BigInteger)(p * 1_000_000), (BigInteger)((1 - p) * 1_000_000));
        var weight = BigInteger.Pow(misses, n); // C(n, k) hits^k misses^(n-k), exact
        var total = BigInteger.Pow(1_000_000, n);
        var below = BigInteger.Zero;
        for (var k = 0; k <= n; k++)
        {
            Close(Ratio(total - below, total), tail.AtLeast(k));
            below += weight;
            Close(Ratio(below, total), tail.AtMost(k));
            weight = weight * (n - k) * hits / ((k + 1) * misses);
        }
        Assert.Equal(total, below);
    }

    [Theory]
    [InlineData(100_000, "0.99")]
    [InlineData(1_000_000, "0.975")]
    [InlineData(10_000_000, "0.99")]
    [InlineData(10_000_000, "0.5")]
    public void AtMost_of_many_trials_equals_the_incomplete_beta_function(int n, string success)
    {
        var p = decimal.Parse(success, System.Globalization.CultureInfo.InvariantCulture);
        var tail = new BinomialTail(n, p);
        var (mean, deviation) = (n * (double)p, Math.Sqrt(n * (double)(p * (1 - p))));
        foreach (var sigmas in new[] { -4, -2.6, -2, -0.5, 0, 1, 2.6, 4 })
        {
            var k = (int)(mean + (sigmas * deviation));
            Assert.Equal(Binomial.CDF((double)p, n, k), tail.AtMost(k), 1e-8); // MathNet's continued fraction is the coarser of the two
        }
    }

    // P(B ≤ k) for n = 10^7, by 40-digit arithmetic (mpmath), k at about -3 and +3 standard deviations.
    [Theory]
    [InlineData("0.99", 9899056, 0.0013744361528168479, 0.99862556384718315)]
    [InlineData("0.99", 9900943, 0.99866248603243629, 0.0013375139675637138)]
    [InlineData("0.975", 9748518, 0.0013579570077939604, 0.99864204299220604)]
    [InlineData("0.975", 9751481, 0.99866474549767997, 0.0013352545023200288)]
    [InlineData("0.5", 4995256, 0.0013496630904937396, 0.99865033690950626)]
    [InlineData("0.5", 5004743, 0.99865033690950626, 0.0013496630904937396)]
    public void Tails_of_ten_million_trials_equal_forty_digit_arithmetic(string success, int k, double atMost, double above)
    {
        var tail = new BinomialTail(10_000_000, decimal.Parse(success, System.Globalization.CultureInfo.InvariantCulture));

        Assert.InRange(tail.AtMost(k) / atMost, 1 - 1e-12, 1 + 1e-12);
        Assert.InRange(tail.AtLeast(k + 1) / above, 1 - 1e-12, 1 + 1e-12);
    }

    [Fact]
    public void FirstReaching_probability_met_exactly_takes_the_count_that_meets_it()
    {
        Assert.Equal(0, new BinomialTail(5, 0.5m).FirstReaching(0.03125m)); // P(B = 0) = 1/32
        Assert.Equal(1, new BinomialTail(5, 0.5m).FirstReaching(0.0312501m));
        Assert.Equal(1, new BinomialTail(2, 0.1m).FirstReaching(0.99m)); // P(B ≤ 1) = 1 - 0.1²
        Assert.Equal(2, new BinomialTail(2, 0.1m).FirstReaching(0.9900001m));
    }

    [Fact]
    public void Constructor_outside_its_range_names_the_value()
    {
        Assert.Contains("1.5", Assert.Throws<ArgumentOutOfRangeException>(() => new BinomialTail(10, 1.5m)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => new BinomialTail(10, 0m));
        Assert.Throws<ArgumentOutOfRangeException>(() => new BinomialTail(0, 0.5m));
        Assert.Throws<ArgumentOutOfRangeException>(() => new BinomialTail(10, 0.5m).FirstReaching(1m));
    }

    private static double Ratio(BigInteger part, BigInteger whole)
    {
        if (part.IsZero) return 0;
        var shift = (int)(whole.GetBitLength() - part.GetBitLength()) + 80;
        return Math.ScaleB((double)((part << shift) / whole), -shift);
    }

    /// <summary>Equal to 2e-13 relative; below 1e-40 nothing is promised but that it is small.</summary>
    private static void Close(double exact, double actual)
    {
        if (exact < 1e-40) Assert.InRange(actual, 0, 1.001e-40);
        else Assert.InRange(actual / exact, 1 - 2e-13, 1 + 2e-13);
    }
}
