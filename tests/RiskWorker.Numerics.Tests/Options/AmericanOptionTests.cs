using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Options;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Options;

public sealed class AmericanOptionTests
{
    private const double Precision = 2e-7;
    private const double LatticePrecision = 3e-6;

    // Binomial trees of up to 17,001 steps (Data/README.md); four times the spread of their fit is theirs.
    [Fact]
    public void Value_reference_terms_are_within_the_stated_error()
    {
        int rows = 0;
        foreach (string[] row in Table.Rows("american-reference.csv"))
        {
            double[] n = [.. row.Skip(1).Select(Table.Number)];
            var option = new AmericanOption(n[1], n[2], n[3], n[4], n[5], row[0] == "call");
            (double put, double yield) = row[0] == "call" ? (n[5], n[4]) : (n[4], n[5]);
            double allowed = ((put < 0 && yield < put ? LatticePrecision : Precision) * n[1]) + (4 * n[7]);
            double value = option.Value(n[0]);
            Assert.True(Math.Abs(value - n[6]) <= allowed, $"{string.Join(',', row)}: {value:R} is {value - n[6]:E1} away, at most {allowed:E1} is allowed.");
            rows++;
        }

        Assert.Equal(46, rows);
    }

    // Richardson limit of Bermudan values with 50 to 400 dates a year, tolerance 2e-5 (computed; put, K = 40, r = 0.06, q = 0).
    [Theory]
    [InlineData(36, 0.2, 1, 4.48667)]
    [InlineData(44, 0.2, 1, 1.112961)]
    [InlineData(36, 0.4, 1, 7.108982)]
    [InlineData(40, 0.4, 2, 6.923459)]
    public void Value_limit_of_many_exercise_dates_is_reproduced(double spot, double volatility, double years, double expected) =>
        Assert.Equal(expected, new AmericanOption(40, years, volatility, 0.06, 0, false).Value(spot), 2e-5);

    // Longstaff and Schwartz (2001), table 1: with 50 dates a year it is worth less than with any date, by spectral recursion.
    [Theory]
    [InlineData(36, 0.2, 2, 4.840225539840257)]
    [InlineData(36, 0.4, 1, 7.101265449935253)]
    [InlineData(38, 0.2, 1, 3.2501238742884135)]
    [InlineData(38, 0.4, 1, 6.14758538324176)]
    [InlineData(38, 0.4, 2, 7.66802709395756)]
    [InlineData(40, 0.2, 1, 2.314068484764892)]
    [InlineData(40, 0.4, 2, 6.917070600091323)]
    [InlineData(44, 0.2, 2, 1.6898276115906343)]
    public void Value_any_date_is_worth_a_little_more_than_fifty_a_year(double spot, double volatility, double years, double bermudan) =>
        Assert.InRange(new AmericanOption(40, years, volatility, 0.06, 0, false).Value(spot) - bermudan, 1e-4, 1e-2);

    [Fact]
    public void Value_any_terms_are_no_less_than_european_and_exercise()
    {
        var numbers = new SeededNumbers(101);
        for (int i = 0; i < 300; i++)
        {
            (double years, double volatility) = (numbers.Between(0.002, 6), numbers.Between(0.01, 1));
            (double rate, double yield, bool isCall) = (numbers.Between(-0.02, 0.12), numbers.Between(-0.02, 0.12), i % 2 == 0);
            if (isCall ? yield < 0 && rate < yield : rate < 0 && yield < rate)
                continue;
            var option = new AmericanOption(100, years, volatility, rate, yield, isCall);
            for (double spot = 30; spot < 300; spot *= 1.37)
            {
                double held = European(spot, 100, years, volatility, rate, yield, isCall), value = option.Value(spot);
                Assert.True(value >= held - (4e-16 * (spot + 100)), $"{value:R} is below the European {held:R}.");
                Assert.True(value >= (isCall ? spot - 100 : 100 - spot) - 1e-13, $"{value:R} is below exercise at {spot:R}.");
            }
        }
    }

    [Theory]
    [InlineData(true, 0.05, 0.0)]
    [InlineData(true, 0.0, 0.0)]
    [InlineData(true, 0.05, -0.02)]
    [InlineData(true, -0.03, -0.02 - 0.02)]
    [InlineData(false, 0.0, 0.03)]
    [InlineData(false, -0.01, 0.03)]
    [InlineData(false, -0.03, -0.01)]
    [InlineData(false, 0.0, 0.0)]
    public void Value_never_exercised_early_is_the_european_one(bool isCall, double rate, double yield)
    {
        var option = new AmericanOption(100, 1.5, 0.3, rate, yield, isCall);
        Assert.Null(option.ExerciseSpot);
        foreach (double spot in new[] { 50.0, 95, 100, 180 })
            Assert.Equal(European(spot, 100, 1.5, 0.3, rate, yield, isCall), option.Value(spot), 1e-12);
    }

    // McDonald and Schroder (1998).
    [Fact]
    public void Value_call_is_the_put_with_everything_exchanged()
    {
        var numbers = new SeededNumbers(102);
        for (int i = 0; i < 100; i++)
        {
            (double years, double volatility) = (numbers.Between(0.01, 4), numbers.Between(0.05, 0.8));
            (double rate, double yield, double spot, double strike) =
                (numbers.Between(0, 0.1), numbers.Between(0, 0.1), numbers.Between(60, 150), numbers.Between(60, 150));
            double call = new AmericanOption(strike, years, volatility, rate, yield, true).Value(spot);
            double put = new AmericanOption(spot, years, volatility, yield, rate, false).Value(strike);
            Assert.Equal(put, call, 1e-11 * strike);
        }
    }

    [Fact]
    public void Value_spot_and_strike_scale_together()
    {
        foreach (bool isCall in new[] { true, false })
        {
            double one = new AmericanOption(1.1, 0.7, 0.25, 0.04, 0.06, isCall).Value(1.0);
            Assert.Equal(1e6 * one, new AmericanOption(1.1e6, 0.7, 0.25, 0.04, 0.06, isCall).Value(1e6), 1e-7);
        }
    }

    [Theory]
    [InlineData(false, 0.05, 0.0)]
    [InlineData(false, 0.02, 0.08)]
    [InlineData(true, 0.03, 0.06)]
    [InlineData(true, 0.08, 0.02)]
    [InlineData(false, 0.0, -0.02)]
    public void Value_rises_with_time_and_volatility_and_is_convex_in_spot(bool isCall, double rate, double yield)
    {
        foreach (double spot in new[] { 80.0, 100, 125 })
        {
            double before = 0;
            foreach (double years in new[] { 0.0, 0.001, 0.02, 0.3, 1, 4, 15 })
                AssertRises(new AmericanOption(100, years, 0.25, rate, yield, isCall).Value(spot), ref before);
            before = 0;
            foreach (double volatility in new[] { 0.0, 1e-8, 1e-5, 0.001, 0.01, 0.05, 0.2, 0.6, 1.5 })
                AssertRises(new AmericanOption(100, 1, volatility, rate, yield, isCall).Value(spot), ref before);
        }

        var option = new AmericanOption(100, 1, 0.25, rate, yield, isCall);
        for (double spot = 40; spot < 220; spot += 3)
        {
            double left = option.Value(spot - 3), middle = option.Value(spot), right = option.Value(spot + 3);
            Assert.True(left + right - (2 * middle) > -1e-6, $"Not convex at {spot}.");
            Assert.InRange((right - left) * (isCall ? 1 : -1), -1e-9, 6 + 1e-6);
        }
    }

    [Fact]
    public void Value_meets_exercise_smoothly_at_the_boundary()
    {
        foreach ((bool isCall, double rate, double yield) in new[] { (false, 0.05, 0.01), (true, 0.03, 0.06), (false, 0.02, 0.05) })
        {
            var option = new AmericanOption(100, 2, 0.3, rate, yield, isCall);
            double edge = option.ExerciseSpot!.Value, sign = isCall ? 1 : -1;
            Assert.Equal(sign * (edge - 100), option.Value(edge * (1 + (sign * 1e-9))), 1e-6);
            Assert.Equal(sign * (edge - 100), option.Value(edge * (1 - (sign * 1e-9))), 1e-5);
            double slope = (option.Value(edge * (1 - (sign * 2e-4))) - option.Value(edge * (1 - (sign * 1e-4)))) / (edge * -sign * 1e-4);
            Assert.Equal(sign, slope, 3e-3);
        }
    }

    // Perpetual put, McKean (1965): boundary K m/(m - 1), m the negative root of v²m(m - 1)/2 + (r - q)m = r.
    [Fact]
    public void ExerciseSpot_very_long_life_is_the_perpetual_one()
    {
        double m = 0.5 - ((0.05 - 0.01) / 0.09) - Math.Sqrt(Math.Pow(((0.05 - 0.01) / 0.09) - 0.5, 2) + (2 * 0.05 / 0.09));
        var option = new AmericanOption(100, 400, 0.3, 0.05, 0.01, false);
        double edge = 100 * m / (m - 1);
        Assert.Equal(edge, option.ExerciseSpot!.Value, 1e-3);
        Assert.Equal((100 - edge) * Math.Pow(120 / edge, m), option.Value(120), 1e-3);
    }

    [Fact]
    public void Value_no_volatility_is_the_best_fixed_date()
    {
        // Falling forward: waiting until S e^((r - q)t) = K r/q is best, t = 2.7726 here, worth K e^(-rt) - S e^(-qt).
        double t = Math.Log(0.02 / 0.04 / 0.6) / (0.02 - 0.04), best = (100 * Math.Exp(-0.02 * t)) - (60 * Math.Exp(-0.04 * t));
        Assert.Equal(best, new AmericanOption(100, 20, 0, 0.02, 0.04, false).Value(60), 1e-12);
        Assert.Equal(best, new AmericanOption(100, 20, 1e-5, 0.02, 0.04, false).Value(60), 5e-4);
        Assert.Equal(40, new AmericanOption(100, 20, 0, 0.05, 0.01, false).Value(60), 1e-12);
        Assert.Equal(0, new AmericanOption(100, 20, 0, 0.05, 0.01, false).Value(101), 1e-12);
        Assert.Equal(100 - (60 * Math.Exp(-0.2)), new AmericanOption(100, 20, 0, 0, 0.01, false).Value(60), 1e-12);
    }

    [Fact]
    public void Value_no_time_left_is_the_intrinsic_value()
    {
        Assert.Equal(5, new AmericanOption(100, 0, 0.3, 0.05, 0.02, true).Value(105), 1e-13);
        Assert.Equal(0, new AmericanOption(100, 0, 0.3, 0.05, 0.02, false).Value(105));
    }

    [Fact]
    public void Value_far_spots_are_finite_and_the_limits()
    {
        var put = new AmericanOption(100, 1, 0.2, 0.05, 0.03, false);
        Assert.Equal(100, put.Value(1e-280), 1e-12);
        Assert.Equal(0, put.Value(1e280), 1e-40);
        Assert.Equal(1e12 - 100, new AmericanOption(100, 1, 0.2, 0.03, 0.05, true).Value(1e12), 1e-3);
    }

    [Fact]
    public void Value_span_equals_one_by_one()
    {
        var option = new AmericanOption(100, 1, 0.2, 0.05, 0.03, true);
        double[] spots = [60, 99, 100, 101, 250], values = new double[5];
        option.Value(spots, values);
        for (int i = 0; i < spots.Length; i++)
            BitAssert.Equal(option.Value(spots[i]), values[i]);
        Assert.Throws<ArgumentException>("values", () => option.Value(spots, values.AsSpan(0, 4)));
    }

    [Theory]
    [InlineData(0, 1, 0.2, 0, 0, "strike")]
    [InlineData(100, -0.1, 0.2, 0, 0, "years")]
    [InlineData(100, 1, double.NaN, 0, 0, "volatility")]
    [InlineData(100, 1, 0.2, double.PositiveInfinity, 0, "rate")]
    [InlineData(100, 1, 0.2, 0, double.NaN, "carryYield")]
    public void New_faulty_term_is_refused_by_name(double strike, double years, double volatility, double rate, double yield, string name) =>
        Assert.Throws<ArgumentOutOfRangeException>(name, () => new AmericanOption(strike, years, volatility, rate, yield, true));

    [Theory]
    [InlineData(0.0)]
    [InlineData(-1.0)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void Value_faulty_spot_is_refused(double spot) =>
        Assert.Throws<ArgumentOutOfRangeException>(nameof(spot), () => new AmericanOption(100, 1, 0.2, 0.05, 0, true).Value(spot));

    private static double European(double spot, double strike, double years, double volatility, double rate, double yield, bool isCall) =>
        EuropeanOption.Value(new EuropeanOptionTerms(spot, strike, years, volatility, rate, rate - yield, isCall), 0, spot);

    private static void AssertRises(double value, ref double before)
    {
        Assert.True(value >= before - (1e-7 * 100), $"{value:R} after {before:R}.");
        before = value;
    }
}
