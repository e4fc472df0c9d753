using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class EuropeanOptionTests
{
    private const double Precision = 4e-16;

    // mpmath at 60 digits (Data/README.md). A value is held to the levels it is the difference of.
    [Fact]
    public void Value_seeded_terms_are_within_the_stated_error()
    {
        int rows = 0;
        foreach (string[] row in Table.Rows("option-reference.csv"))
        {
            double[] n = [.. row.Skip(1).Select(Table.Number)];
            (double spot0, double x, double spot, double strike, double years, double volatility, double rate, double carry) =
                (n[0], n[1], n[2], n[3], n[4], n[5], n[6], n[7]);
            var terms = new EuropeanOptionTerms(spot0, strike, years, volatility, rate, carry, row[0] == "call");
            double levels = (spot * Math.Exp((carry - rate) * years)) + (strike * Math.Exp(-rate * years));
            foreach (double value in new[] { EuropeanOption.Value(terms, x, spot), EuropeanOption.Value(terms, x, spot, volatility) })
            {
                double error = Math.Abs(value - n[8] - n[9]);
                Assert.True(error <= Precision * levels, $"{string.Join(',', row)}: error {error:R}, {error / levels:R} of the levels.");
            }

            rows++;
        }

        Assert.Equal(400, rows);
    }

    // Haug and Hull (Data/README.md): Black-Scholes, Merton, Black 76, Garman-Kohlhagen.
    [Theory]
    [InlineData("VAN-01", 60, 65, 0.25, 0.30, 0.08, 0.08, true)]
    [InlineData("VAN-02", 42, 40, 0.5, 0.20, 0.10, 0.10, true)]
    [InlineData("VAN-03", 42, 40, 0.5, 0.20, 0.10, 0.10, false)]
    [InlineData("VAN-04", 100, 95, 0.5, 0.20, 0.10, 0.05, false)]
    [InlineData("VAN-06", 19, 19, 0.75, 0.28, 0.10, 0, false)]
    [InlineData("VAN-07", 1.56, 1.60, 0.5, 0.12, 0.06, -0.02, true)]
    [InlineData("VAN-10", 100, 100, 1, 0.20, 0.05, 0.05, false)]
    [InlineData("GRK-01", 49, 50, 0.3846, 0.20, 0.05, 0.05, true)]
    public void Value_textbook_example_is_reproduced(
        string id, double spot, double strike, double years, double volatility, double rate, double carry, bool isCall)
    {
        string[] row = Table.Rows("option-examples.csv").Single(row => row[0] == id);
        double value = EuropeanOption.Value(new EuropeanOptionTerms(spot, strike, years, volatility, rate, carry, isCall), 0, spot);
        Assert.Equal(Table.Number(row[3]), value, Precision * (spot + strike));
        string printed = row[7];
        int decimals = printed.Length - printed.IndexOf('.', StringComparison.Ordinal) - 1;
        Assert.Equal(Table.Number(printed), Math.Round(value, decimals), 1e-12);
    }

    [Fact]
    public void Value_call_less_put_is_the_forward()
    {
        var numbers = new SeededNumbers(91);
        for (int i = 0; i < 10_000; i++)
        {
            double spot0 = numbers.Between(50, 150), strike = numbers.Between(20, 300), years = numbers.Between(0.01, 5);
            double volatility = numbers.Between(0.01, 1), rate = numbers.Between(-0.02, 0.1), carry = numbers.Between(-0.05, 0.1);
            double x = numbers.Between(-0.5, 0.5), spot = LogNormalMoves.Spot(x, spot0);
            double call = EuropeanOption.Value(new(spot0, strike, years, volatility, rate, carry, true), x, spot);
            double put = EuropeanOption.Value(new(spot0, strike, years, volatility, rate, carry, false), x, spot);
            double asset = spot * Exponential.Of((carry - rate) * years), cash = strike * Exponential.Of(-rate * years);
            // Two values within the precision each, and as much again for the roundings of the forward itself.
            Assert.Equal(asset - cash, call - put, 3 * Precision * (asset + cash));
        }
    }

    [Fact]
    public void AccumulateValue_every_length_equals_the_scalar_form()
    {
        foreach (bool isCall in new[] { true, false })
        {
            foreach (double years in new[] { 0.0, 0.002, 0.75, 20 })
            {
                foreach (double volatility in new[] { 0.0, 1e-8, 0.2, 1.5 })
                    AssertLengths(new EuropeanOptionTerms(100, 103, years, volatility, 0.03, 0.01, isCall));
            }
        }
    }

    [Fact]
    public void AccumulateValue_far_tails_and_odd_scenarios_equal_the_scalar_form()
    {
        double[] x = [-700, -50, -5, -1, -0.0, 0, 1, 5, 50, 700, double.NaN, double.NegativeInfinity, 1e-300, -1e-300, 0.03, -0.03];
        double[] spot = new double[x.Length], profit = new double[x.Length], expected = new double[x.Length];
        LogNormalMoves.Spots(x, 100, spot);
        foreach (bool isCall in new[] { true, false })
        {
            var terms = new EuropeanOptionTerms(100, 100, 0.3, 0.15, 0.02, 0.02, isCall);
            profit.AsSpan().Clear();
            EuropeanOption.AccumulateValue(terms, x, spot, -3, 0.5, profit);
            for (int s = 0; s < x.Length; s++)
                expected[s] = EuropeanOption.Profit(terms, x[s], spot[s], -3, 0.5, 0);
            BitAssert.Equal(expected, profit);
        }
    }

    [Fact]
    public void Value_worthless_and_certain_ends_are_the_limits()
    {
        var call = new EuropeanOptionTerms(100, 100, 0.25, 0.2, 0.03, 0.03, true);
        var put = new EuropeanOptionTerms(100, 100, 0.25, 0.2, 0.03, 0.03, false);
        double cash = 100 * Exponential.Of(-0.0075);
        Assert.Equal(0.0, EuropeanOption.Value(call, double.NegativeInfinity, 0));
        Assert.Equal(cash, EuropeanOption.Value(put, double.NegativeInfinity, 0));
        Assert.Equal(1e6 - cash, EuropeanOption.Value(call, Math.Log(1e4), 1e6));
        Assert.Equal(0.0, EuropeanOption.Value(put, Math.Log(1e4), 1e6));
    }

    [Fact]
    public void Value_is_never_negative()
    {
        var numbers = new SeededNumbers(93);
        for (int i = 0; i < 20_000; i++)
        {
            double strike = numbers.Between(1, 1000), x = numbers.Between(-3, 3);
            var terms = new EuropeanOptionTerms(100, strike, numbers.Between(0, 0.1), numbers.Between(0, 0.4), 0.03, 0.01, i % 2 == 0);
            Assert.InRange(EuropeanOption.Value(terms, x, LogNormalMoves.Spot(x, 100)), 0, double.MaxValue);
        }
    }

    [Fact]
    public void Value_no_time_left_is_the_intrinsic_value()
    {
        var call = new EuropeanOptionTerms(100, 95, 0, 0.2, 0.03, 0.03, true);
        var put = new EuropeanOptionTerms(100, 95, 0, 0.2, 0.03, 0.03, false);
        foreach (double spot in new[] { 0.5, 94.9, 95, 95.1, 1000 })
        {
            double x = Logarithm.Of(spot / 100);
            Assert.Equal(Math.Max(spot - 95, 0), EuropeanOption.Value(call, x, spot));
            Assert.Equal(Math.Max(95 - spot, 0), EuropeanOption.Value(put, x, spot));
            Assert.Equal(Math.Max(95 - spot, 0), EuropeanOption.Value(put, x, spot, 0.4));
        }
    }

    [Fact]
    public void Value_no_volatility_is_the_discounted_intrinsic_value_of_the_forward()
    {
        foreach (double spot in new[] { 60.0, 92, 93, 140 })
        {
            double forward = (spot * Exponential.Of(-0.01 * 2)) - (95 * Exponential.Of(-0.03 * 2));
            double x = Logarithm.Of(spot / 100);
            var terms = new EuropeanOptionTerms(100, 95, 2, 0, 0.03, 0.02, true);
            Assert.Equal(Math.Max(forward, 0), EuropeanOption.Value(terms, x, spot), Precision * 200);
            Assert.Equal(Math.Max(forward, 0), EuropeanOption.Value(terms, x, spot, 0), Precision * 200);
        }
    }

    [Fact]
    public void AccumulateValue_scenario_without_a_move_adds_nothing()
    {
        var terms = new EuropeanOptionTerms(100, 105, 0.5, 0.25, 0.03, 0.03, false);
        double today = EuropeanOption.Value(terms, 0, 100);
        double[] profit = new double[19], spot = new double[19];
        spot.AsSpan().Fill(100);
        EuropeanOption.AccumulateValue(terms, new double[19], spot, 1e6, today, profit);
        Assert.All(profit, value => BitAssert.Equal(0.0, value));
    }

    [Theory]
    [InlineData(0, 100, 1, 0.2, 0, 0, "spot0")]
    [InlineData(100, -1, 1, 0.2, 0, 0, "strike")]
    [InlineData(100, 100, -0.1, 0.2, 0, 0, "years")]
    [InlineData(100, 100, 1, -0.2, 0, 0, "volatility")]
    [InlineData(100, 100, 1, 0.2, double.NaN, 0, "rate")]
    [InlineData(100, 100, 1, 0.2, 0, double.PositiveInfinity, "costOfCarry")]
    public void New_faulty_term_is_refused_by_name(
        double spot0, double strike, double years, double volatility, double rate, double carry, string name) =>
        Assert.Throws<ArgumentOutOfRangeException>(name, () => new EuropeanOptionTerms(spot0, strike, years, volatility, rate, carry, true));

    [Fact]
    public void AccumulateValue_faulty_spans_are_refused()
    {
        var terms = new EuropeanOptionTerms(100, 105, 0.5, 0.25, 0.03, 0.03, false);
        double[] memory = new double[40];
        Assert.Throws<ArgumentException>("spot", () => EuropeanOption.AccumulateValue(terms, memory.AsSpan(0, 8), memory.AsSpan(8, 7), 1, 0, memory.AsSpan(20, 8)));
        Assert.Throws<ArgumentException>("profit", () => EuropeanOption.AccumulateValue(terms, memory.AsSpan(0, 8), memory.AsSpan(8, 8), 1, 0, memory.AsSpan(15, 8)));
        Assert.Throws<ArgumentException>("volatility", () => EuropeanOption.AccumulateValue(
            terms, memory.AsSpan(0, 8), memory.AsSpan(8, 8), memory.AsSpan(16, 7), 1, 0, memory.AsSpan(30, 8)));
    }

    private static void AssertLengths(EuropeanOptionTerms terms)
    {
        var numbers = new SeededNumbers(92);
        for (int length = 0; length <= 257; length += length < 20 ? 1 : 79)
        {
            double[] x = numbers.Between(-0.4, 0.4, length), spot = new double[length], start = numbers.Between(-10, 10, length);
            double[] volatility = numbers.Between(0.0, 0.5, length);
            LogNormalMoves.Spots(x, 100, spot);
            var profit = new GuardedBuffer<double>(length, 1e9, length % 5);
            var profitAtOwn = new GuardedBuffer<double>(length, 1e9, length % 3);
            start.CopyTo(profit.Span);
            start.CopyTo(profitAtOwn.Span);
            EuropeanOption.AccumulateValue(terms, x, spot, 12.5, 3.25, profit.Span);
            EuropeanOption.AccumulateValue(terms, x, spot, volatility, 12.5, 3.25, profitAtOwn.Span);
            for (int s = 0; s < length; s++)
            {
                BitAssert.Equal(EuropeanOption.Profit(terms, x[s], spot[s], 12.5, 3.25, start[s]), profit.Span[s]);
                BitAssert.Equal(EuropeanOption.Profit(terms, x[s], spot[s], volatility[s], 12.5, 3.25, start[s]), profitAtOwn.Span[s]);
            }

            profit.AssertIntact();
            profitAtOwn.AssertIntact();
        }
    }
}
