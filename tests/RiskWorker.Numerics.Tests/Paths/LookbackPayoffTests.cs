using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Paths;

namespace RiskWorker.Numerics.Tests.Paths;

public sealed class LookbackPayoffTests
{
    // Haug (2007), ch. 4, floating-strike call: printed 25.3533 (from memory), recomputed 25.353355271810198.
    [Fact]
    public void Price_textbook_example_is_reproduced()
    {
        Assert.Equal(25.353355271810198, FloatingCall(120, 100, 0.5, 0.10, 0.04, 0.30), 1e-9);
        (double value, double error) = Dates.Price(new LookbackPayoff(Dates.Flat(1, 0.5, 0.10, 0.06), true, null, 100, true), 0.3, 120, pairs: 512);
        Assert.Equal(25.353355271810198, value, 1e-9);
        Assert.InRange(error, 0, 1e-6);
    }

    // The draws alone, without the control that is the payoff itself: one step, and several, give the one law.
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(7)]
    public void Price_continuous_extreme_by_simulation_is_within_its_error_of_the_closed_form(int steps)
    {
        var payoff = new LookbackPayoff(Dates.Flat(steps, 0.5, 0.10, 0.06), true, null, 100, true, withExtremeControl: false);
        (double value, double error) = Dates.Price(payoff, 0.3, 120, pairs: 4096);
        Assert.InRange(error, 1e-3, 1e-1);
        Assert.InRange(Math.Abs(value - 25.353355271810198), 0, 4 * error);
    }

    // Goldman, Sosin and Gatto (1979), with a cost of carry.
    [Theory]
    [InlineData(120, 100, 0.5, 0.10, 0.04, 0.30)]
    [InlineData(100, 100, 1, 0.03, 0.03, 0.20)]
    [InlineData(100, 85, 2, 0.01, -0.03, 0.40)]
    [InlineData(1.2, 1.19, 0.1, -0.005, -0.02, 0.08)]
    [InlineData(100, 99, 3, 0.08, 0.08, 0.02)]
    public void Price_floating_call_is_the_closed_form(double spot, double lowest, double years, double rate, double carry, double volatility)
    {
        var payoff = new LookbackPayoff(Dates.Flat(1, years, rate, rate - carry), true, null, lowest, true);
        Assert.Equal(FloatingCall(spot, lowest, years, rate, carry, volatility), Dates.Price(payoff, volatility, spot, pairs: 512).Value, 1e-10 * spot);
    }

    [Theory]
    [InlineData(true, null, 100.0)]
    [InlineData(false, null, 112.0)]
    [InlineData(true, 105.0, 101.0)]
    [InlineData(true, 95.0, 103.0)]
    [InlineData(false, 95.0, 98.0)]
    [InlineData(false, 105.0, 98.0)]
    [InlineData(true, null, null)]
    [InlineData(false, null, null)]
    [InlineData(true, 105.0, null)]
    [InlineData(false, 100.0, null)]
    public void Price_every_kind_agrees_with_simulation_alone(bool isCall, double? strike, double? extreme)
    {
        PathSchedule schedule = Dates.Flat(1, 0.5, 0.04, 0.01);
        (double exact, _) = Dates.Price(new LookbackPayoff(schedule, true, strike, extreme, isCall), 0.3, 104, pairs: 512);
        var payoff = new LookbackPayoff(schedule, true, strike, extreme, isCall, withExtremeControl: false);
        (double value, double error) = Dates.Price(payoff, 0.3, 104, seed: 5, pairs: 4096);
        Assert.InRange(error, 1e-4, 1e-1);
        Assert.InRange(Math.Abs(value - exact), 0, 4 * error);
    }

    // Broadie, Glasserman and Kou (1999): looking m times is looking always with the past maximum raised by e^(0.5826 v √(T/m)) and
    // the resulting maximum lowered by as much, but for less than 1/√m.
    [Fact]
    public void Price_daily_maximum_is_the_continuous_one_less_its_correction()
    {
        const int Days = 252;
        var daily = new LookbackPayoff(PathSchedule.Flat([0, .. Dates.Equal(Days, 1)], 0.05, 0, 1), false, null, null, false);
        double shift = Math.Exp(0.5826 * 0.3 / Math.Sqrt(Days));
        var continuous = new LookbackPayoff(Dates.Flat(1, 1, 0.05, 0), true, null, 100 * shift, false);
        (double value, double error) = Dates.Price(daily, 0.3, 100, pairs: 1024);
        double maximum = Dates.Price(continuous, 0.3, 100, pairs: 512).Value + 100;
        double corrected = (maximum / shift) - 100;
        Assert.InRange(error / value, 1e-6, 1e-3);
        Assert.InRange(Math.Abs(value - corrected), 0, (4 * error) + 0.01);
    }

    [Fact]
    public void Price_daily_lies_between_the_vanilla_option_and_continuous_monitoring()
    {
        var numbers = new TestKit.SeededNumbers(121);
        for (int i = 0; i < 12; i++)
        {
            (double strike, double volatility, bool isCall) = (numbers.Between(80, 120), numbers.Between(0.1, 0.5), i % 2 == 0);
            PathSchedule schedule = Dates.Flat(10, 0.4, 0.04, 0.02);
            (double daily, double error) = Dates.Price(new LookbackPayoff(schedule, false, strike, null, isCall), volatility, 100, pairs: 1024);
            (double continuous, _) = Dates.Price(new LookbackPayoff(schedule, true, strike, null, isCall), volatility, 100, pairs: 512);
            double vanilla = EuropeanOption.Value(new EuropeanOptionTerms(100, strike, 0.4, volatility, 0.04, 0.02, isCall), 0, 100);
            Assert.InRange(daily, vanilla, continuous + (4 * error));
            Assert.True(daily > vanilla && continuous > daily - (4 * error));
        }
    }

    [Fact]
    public void Price_carry_that_changes_with_time_counts()
    {
        // The forward rises by 10% and comes back: the maximum sees it, the flat control does not.
        var schedule = new PathSchedule([0.5, 1.0], [Math.Log(1.1), 0], 1);
        (double value, double error) = Dates.Price(new LookbackPayoff(schedule, true, null, null, false), 0.01, 100, pairs: 1024);
        (double certain, _) = Dates.Price(new LookbackPayoff(schedule, true, null, null, false), 0, 100, pairs: 512);
        Assert.Equal(10, certain, 1e-9);
        Assert.InRange(value, 10, 11);
        Assert.InRange(error, 1e-6, 0.05);
    }

    [Fact]
    public void Price_past_extreme_out_of_reach_is_a_forward()
    {
        PathSchedule schedule = Dates.Flat(5, 0.1, 0.03, 0.01);
        (double call, double error) = Dates.Price(new LookbackPayoff(schedule, false, null, 10, true), 0.2, 100, pairs: 512);
        Assert.Equal((100 * Math.Exp(-0.001)) - (10 * Math.Exp(-0.003)), call, 1e-10);
        Assert.Equal(0, error);
    }

    [Fact]
    public void Price_floating_strike_scales_with_spot_and_extreme()
    {
        PathSchedule schedule = Dates.Flat(10, 0.5, 0.03, 0.01);
        (double one, _) = Dates.Price(new LookbackPayoff(schedule, false, null, 0.97, true), 0.3, 1, pairs: 1024);
        (double hundred, _) = Dates.Price(new LookbackPayoff(schedule, false, null, 97, true), 0.3, 100, pairs: 1024);
        Assert.Equal(100 * one, hundred, 1e-10);
    }

    [Fact]
    public void New_faulty_terms_are_refused_by_name()
    {
        PathSchedule schedule = Dates.Flat(2, 1, 0.03, 0);
        Assert.Throws<ArgumentOutOfRangeException>("strike", () => new LookbackPayoff(schedule, true, 0, null, true));
        Assert.Throws<ArgumentOutOfRangeException>("extreme", () => new LookbackPayoff(schedule, true, null, double.NaN, true));
        Assert.Throws<ArgumentException>("schedule", () => new LookbackPayoff(PathSchedule.Flat([0], 0, 0, 0), true, null, null, true));
    }

    private static double FloatingCall(double spot, double lowest, double years, double rate, double carry, double volatility)
    {
        double deviation = volatility * Math.Sqrt(years);
        double a1 = (Math.Log(spot / lowest) + ((carry + (volatility * volatility / 2)) * years)) / deviation, a2 = a1 - deviation;
        double discount = Math.Exp(-rate * years), forward = spot * Math.Exp((carry - rate) * years);
        double reflected = (Math.Pow(spot / lowest, -2 * carry / (volatility * volatility)) * NormalCdf.Of(-a1 + (2 * carry / volatility * Math.Sqrt(years))))
            - (Math.Exp(carry * years) * NormalCdf.Of(-a1));
        return (forward * NormalCdf.Of(a1)) - (lowest * discount * NormalCdf.Of(a2))
            + (spot * discount * volatility * volatility / (2 * carry) * reflected);
    }
}
