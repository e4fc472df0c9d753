using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Paths;

namespace RiskWorker.Numerics.Tests.Paths;

public sealed class ArithmeticAsianPayoffTests
{
    // Randomised Sobol points (16 times 2^17) with the geometric control; standard errors 6.0e-6 and 6.6e-6 (computed).
    [Theory]
    [InlineData(4, 6.939479036879248, 6.0e-6)]
    [InlineData(52, 5.8538750627422615, 6.6e-6)]
    public void Price_discrete_average_is_within_its_error_of_the_reference(int fixings, double expected, double referenceError)
    {
        var payoff = ArithmeticAsianPayoff.OfFixings(Dates.Flat(fixings, 1, 0.05, 0), 0, 0, 100, true);
        (double value, double error) = Dates.Price(payoff, 0.2, 100, pairs: 4096);
        Assert.InRange(error, 1e-5, 1e-3);
        Assert.InRange(Math.Abs(value - expected), 0, 4 * (error + referenceError));
    }

    // Linetsky (2004), Zhang (2001), Rogers and Shi (1995), Vecer (2001): the tables' cases, recomputed by inverting the transform of
    // Geman and Yor (1993) in mpmath. Ten parts in a million are left for the trapezoid.
    [Theory]
    [InlineData("L2", 2, 2, 1, 0.18, 0.3, 0.21838754659556803)]
    [InlineData("L3", 2, 2, 2, 0.0125, 0.25, 0.17226874101801665)]
    [InlineData("L4", 1.9, 2, 1, 0.05, 0.5, 0.19317379028589185)]
    [InlineData("L6", 2.1, 2, 1, 0.05, 0.5, 0.3062203647943653)]
    [InlineData("L7", 2, 2, 2, 0.05, 0.5, 0.350095218965402)]
    [InlineData("Z1", 100, 95, 1, 0.09, 0.1, 8.911850819391145)]
    [InlineData("Z2", 100, 100, 1, 0.09, 0.1, 4.915116616410507)]
    [InlineData("Z5", 100, 100, 1, 0.09, 0.2, 6.777347990028861)]
    [InlineData("Z6", 100, 105, 1, 0.09, 0.2, 4.2964625453237515)]
    [InlineData("Z7", 100, 95, 1, 0.09, 0.3, 11.655884771589562)]
    [InlineData("Z8", 100, 100, 1, 0.09, 0.3, 8.82875822380661)]
    [InlineData("Z9", 100, 105, 1, 0.09, 0.3, 6.517790457233402)]
    [InlineData("Z10", 100, 95, 1, 0.09, 0.5, 15.442713959282356)]
    [InlineData("Z11", 100, 100, 1, 0.09, 0.5, 13.028155510227728)]
    [InlineData("Z12", 100, 105, 1, 0.09, 0.5, 10.92962413276615)]
    [InlineData("V1", 100, 90, 1, 0.15, 0.2, 15.64175732892324)]
    [InlineData("V3", 100, 110, 1, 0.15, 0.2, 3.555610029258247)]
    [InlineData("V4", 100, 90, 1, 0.15, 0.3, 16.512910179577588)]
    [InlineData("V6", 100, 110, 1, 0.15, 0.3, 5.73012242250275)]
    [InlineData("V9", 100, 110, 1, 0.15, 0.1, 1.4136149667405247)]
    public void Price_continuous_average_is_within_its_error_of_the_reference(
        string id, double spot, double strike, double years, double rate, double volatility, double expected)
    {
        var payoff = ArithmeticAsianPayoff.Continuous(rate, 0, years, 0, 0, strike, true);
        (double value, double error) = Dates.Price(payoff, volatility, spot, pairs: 2048);
        Assert.InRange(error / value, 1e-6, 1e-3);
        Assert.True(Math.Abs(value - expected) <= (4 * error) + (1e-5 * expected), $"{id}: {value:R} with error {error:E1}, expected {expected:R}.");
    }

    // Log-normal law of the discrete geometric mean (computed); Kemna and Vorst (1990), the continuous one.
    [Fact]
    public void ControlMeans_geometric_option_is_the_closed_form()
    {
        double discount = Math.Exp(-0.05);
        double[] means = new double[3];
        foreach ((int fixings, double expected) in new[] { (12, 5.94020022163352), (252, 5.565508831349356) })
        {
            ArithmeticAsianPayoff.OfFixings(Dates.Flat(fixings, 1, 0.05, 0), 0, 0, 100, true).ControlMeans(100, 0.2, means);
            Assert.Equal(expected, discount * means[2], 1e-10);
        }

        ArithmeticAsianPayoff.Continuous(0.05, 0, 1, 0, 0, 100, true).ControlMeans(100, 0.2, means);
        Assert.Equal(5.546818633789201, discount * means[2], 5e-5);
    }

    [Theory]
    [InlineData(60, 0.05, 0.01, 10, 985.0)]
    [InlineData(100, -0.01, 0.03, 0, 0.0)]
    [InlineData(150, 0.02, 0.02, 40, 4200.0)]
    public void Price_call_less_put_is_the_forward_of_the_average(double spot, double rate, double yield, int pastCount, double pastSum)
    {
        PathSchedule schedule = Dates.Flat(12, 1.5, rate, yield);
        (double call, _) = Dates.Price(ArithmeticAsianPayoff.OfFixings(schedule, pastCount, pastSum, 100, true), 0.3, spot, pairs: 1024);
        (double put, _) = Dates.Price(ArithmeticAsianPayoff.OfFixings(schedule, pastCount, pastSum, 100, false), 0.3, spot, pairs: 1024);
        double average = (pastSum + Dates.Equal(12, 1.5).Sum(t => spot * Math.Exp((rate - yield) * t))) / (12 + pastCount);
        Assert.Equal(Math.Exp(-rate * 1.5) * (average - 100), call - put, 1e-10);
    }

    [Fact]
    public void Price_sure_exercise_has_no_error()
    {
        PathSchedule schedule = Dates.Flat(3, 0.25, 0.03, 0);
        (double call, double error) = Dates.Price(ArithmeticAsianPayoff.OfFixings(schedule, 7, 1100, 100, true), 0.4, 90, pairs: 1024);
        double average = (1100 + Dates.Equal(3, 0.25).Sum(t => 90 * Math.Exp(0.03 * t))) / 10;
        Assert.Equal(Math.Exp(-0.0075) * (average - 100), call, 1e-11);
        Assert.InRange(error, 0, 1e-7);
        Assert.Equal(0, Dates.Price(ArithmeticAsianPayoff.OfFixings(schedule, 7, 1100, 100, false), 0.4, 90, pairs: 1024).Value, 1e-11);
    }

    [Fact]
    public void Price_beyond_the_reach_of_any_path_is_that_of_the_geometric_average()
    {
        var payoff = ArithmeticAsianPayoff.OfFixings(Dates.Flat(12, 1, 0.05, 0), 0, 0, 100, true);
        double[] means = new double[3];
        payoff.ControlMeans(63, 0.2, means);
        (double value, _) = Dates.Price(payoff, 0.2, 63, pairs: 512);
        Assert.InRange(value, 1e-12, 1e-3);
        Assert.Equal(1, value / (Math.Exp(-0.05) * means[2]), 1e-12);
    }

    [Fact]
    public void Price_one_fixing_at_expiry_is_the_european_option()
    {
        foreach (bool isCall in new[] { true, false })
        {
            (double value, _) = Dates.Price(ArithmeticAsianPayoff.OfFixings(Dates.Flat(1, 0.75, 0.04, 0.02), 0, 0, 105, isCall), 0.25, 100, pairs: 512);
            Assert.Equal(EuropeanOption.Value(new EuropeanOptionTerms(100, 105, 0.75, 0.25, 0.04, 0.02, isCall), 0, 100), value, 1e-10);
        }
    }

    [Fact]
    public void Price_fixing_of_today_is_the_spot()
    {
        double[] later = [0.25, 0.5];
        var withToday = Dates.Price(ArithmeticAsianPayoff.OfFixings(PathSchedule.Flat([0, .. later], 0.03, 0, 0.5), 2, 190, 100, true), 0.3, 104, pairs: 2048);
        var asPast = Dates.Price(ArithmeticAsianPayoff.OfFixings(PathSchedule.Flat(later, 0.03, 0, 0.5), 3, 294, 100, true), 0.3, 104, pairs: 2048);
        // The draws are the same; the geometric averages that help are not.
        Assert.InRange(Math.Abs(withToday.Value - asPast.Value), 0, 4 * Math.Max(withToday.Error, asPast.Error));
        Assert.InRange(withToday.Error, 1e-6, 5e-3);
    }

    [Fact]
    public void Price_no_volatility_is_the_discounted_intrinsic_value()
    {
        var payoff = ArithmeticAsianPayoff.OfFixings(Dates.Flat(4, 1, 0.05, 0.01), 0, 0, 90, true);
        (double value, double error) = Dates.Price(payoff, 0, 100, pairs: 512);
        double average = Dates.Equal(4, 1).Average(t => 100 * Math.Exp(0.04 * t));
        Assert.Equal(Math.Exp(-0.05) * (average - 90), value, 1e-11);
        Assert.InRange(error, 0, 1e-6);
    }

    [Fact]
    public void Price_past_average_of_a_continuous_one_shifts_the_strike()
    {
        // A third of the life is past at 110: (110/3 + 2/3 A - 100)⁺ = 2/3 (A - 95)⁺.
        (double whole, _) = Dates.Price(ArithmeticAsianPayoff.Continuous(0.03, 0, 1, 0.5, 110, 100, true), 0.3, 97, pairs: 512);
        (double alone, _) = Dates.Price(ArithmeticAsianPayoff.Continuous(0.03, 0, 1, 0, 0, 95, true), 0.3, 97, pairs: 512);
        Assert.Equal(alone * 2 / 3, whole, 1e-9);
    }

    [Fact]
    public void Price_rises_with_spot_and_volatility()
    {
        var payoff = ArithmeticAsianPayoff.OfFixings(Dates.Flat(12, 1, 0.03, 0.01), 0, 0, 100, true);
        double[] volatilities = [0, 0.05, 0.1, 0.2, 0.4], spots = [80, 90, 100, 110, 120], values = new double[25], errors = new double[25];
        new PathPricer(3, 1024).Price(payoff, volatilities, spots, values, errors);
        for (int v = 0; v < 5; v++)
        {
            for (int s = 0; s < 5; s++)
            {
                Assert.True(s == 0 || values[(v * 5) + s] >= values[(v * 5) + s - 1]);
                Assert.True(v == 0 || values[(v * 5) + s] >= values[(v * 5) + s - 5] - (4 * errors[(v * 5) + s]));
            }
        }
    }

    [Fact]
    public void New_faulty_terms_are_refused_by_name()
    {
        PathSchedule schedule = Dates.Flat(2, 1, 0.03, 0);
        Assert.Throws<ArgumentOutOfRangeException>("strike", () => new ArithmeticAsianPayoff(schedule, [0.5, 0.5], 0, 0, true));
        Assert.Throws<ArgumentOutOfRangeException>("past", () => new ArithmeticAsianPayoff(schedule, [0.5, 0.5], -1, 100, true));
        Assert.Throws<ArgumentOutOfRangeException>("weights", () => new ArithmeticAsianPayoff(schedule, [0.5, 0], 0, 100, true));
        Assert.Throws<ArgumentException>("weights", () => new ArithmeticAsianPayoff(schedule, [1.0], 0, 100, true));
        Assert.Throws<ArgumentOutOfRangeException>("pastSum", () => ArithmeticAsianPayoff.OfFixings(schedule, 0, 5, 100, true));
        Assert.Throws<ArgumentOutOfRangeException>("pastCount", () => ArithmeticAsianPayoff.OfFixings(schedule, -1, 0, 100, true));
        Assert.Throws<ArgumentOutOfRangeException>("years", () => ArithmeticAsianPayoff.Continuous(0, 0, 0, 1, 90, 100, true));
        Assert.Throws<ArgumentOutOfRangeException>("elapsedYears", () => ArithmeticAsianPayoff.Continuous(0, 0, 1, -1, 90, 100, true));
        Assert.Throws<ArgumentOutOfRangeException>("steps", () => ArithmeticAsianPayoff.Continuous(0, 0, 1, 0, 0, 100, true, 0));
    }
}
