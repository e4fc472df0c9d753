using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class MovedOptionTests
{
    private const double Precision = 4e-16;

    // mpmath at 120 digits (Data/README.md). A value is held to the levels it is the difference of.
    [Fact]
    public void Value_seeded_terms_are_within_the_stated_error()
    {
        int rows = 0;
        foreach (ClosedFormReference row in ClosedFormReference.Rows("moved-reference.csv").Where(row => row.Name.StartsWith("plain", StringComparison.Ordinal)))
        {
            double value = MovedOption.Value(new(row.Spot0, row.Strike, row.Name == "plain-call"), row.At);
            Assert.True(row.ErrorOf(value) <= Precision * row.Levels, $"{row}: error {row.ErrorOf(value) / row.Levels:R} of the levels.");
            rows++;
        }

        Assert.Equal(100, rows);
    }

    [Fact]
    public void Value_of_today_is_that_of_the_kernel_for_moved_underlyings_alone()
    {
        var numbers = new SeededNumbers(94);
        for (int i = 0; i < 10_000; i++)
        {
            double spot0 = numbers.Between(50, 150), strike = numbers.Between(20, 300), years = numbers.Between(0.01, 5), volatility = numbers.Between(0.01, 1);
            double rate = numbers.Between(-0.02, 0.1), carry = numbers.Between(-0.05, 0.1), x = numbers.Between(-0.5, 0.5);
            MarketPoint at = MarketBlock.Point(x, spot0, rate * years, (rate - carry) * years, volatility * Math.Sqrt(years));
            double other = EuropeanOption.Value(new(spot0, strike, years, volatility, rate, carry, i % 2 == 0), x, at.Spot);
            Assert.Equal(other, MovedOption.Value(new(spot0, strike, i % 2 == 0), at), 4 * Precision * ((at.Spot * Math.Exp(-at.Carry)) + (strike * Math.Exp(-at.Discount))));
        }
    }

    [Fact]
    public void Value_call_less_put_is_the_forward()
    {
        MarketSpans market = MarketBlock.Seeded(95, 100, 2000).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            MarketPoint at = market[s];
            double asset = at.Spot * Exponential.Of(-at.Carry), cash = 103 * Exponential.Of(-at.Discount);
            Assert.Equal(asset - cash, MovedOption.Value(new(100, 103, true), at) - MovedOption.Value(new(100, 103, false), at), 3 * Precision * (asset + cash));
        }
    }

    [Fact]
    public void Value_rises_with_volatility_and_scales_with_spot_and_strike()
    {
        MarketSpans market = MarketBlock.Seeded(96, 100, 2000).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            MarketPoint at = market[s];
            foreach (bool isCall in new[] { true, false })
            {
                double value = MovedOption.Value(new(100, 103, isCall), at);
                Assert.True(MovedOption.Value(new(100, 103, isCall), at with { Deviation = at.Deviation * 1.01 }) >= value - 1e-13);
                Assert.Equal(8 * value, MovedOption.Value(new(800, 824, isCall), at with { Spot = 8 * at.Spot }));
            }
        }
    }

    [Fact]
    public void Value_no_deviation_is_the_discounted_intrinsic_value_of_the_forward()
    {
        foreach (double spot in new[] { 0.5, 60.0, 94.9, 95, 95.1, 140 })
        {
            var now = new MarketPoint(Logarithm.Of(spot / 100), spot, 0, 0, 0);
            Assert.Equal(Math.Max(spot - 95, 0), MovedOption.Value(new(100, 95, true), now), 1e-14);
            Assert.Equal(Math.Max(95 - spot, 0), MovedOption.Value(new(100, 95, false), now), 1e-14);
            MarketPoint later = now with { Discount = 0.06, Carry = 0.02 };
            Assert.Equal(Math.Max((spot * Math.Exp(-0.02)) - (95 * Math.Exp(-0.06)), 0), MovedOption.Value(new(100, 95, true), later), 1e-13);
        }
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void AccumulateValue_every_length_and_odd_scenario_equals_the_scalar_form(bool isCall)
    {
        var terms = new MovedOptionTerms(100, 103, isCall);
        MarketBlock.AssertLanesEqualTwin(
            100,
            (in MarketSpans market, double quantity, double baseValue, Span<double> profit) => MovedOption.AccumulateValue(terms, market, quantity, baseValue, profit),
            (in MarketPoint at, double quantity, double baseValue, double profit) => MovedOption.Profit(terms, at, quantity, baseValue, profit));
    }

    [Fact]
    public void AccumulateValue_scenario_without_a_move_adds_nothing_and_allocates_nothing()
    {
        var terms = new MovedOptionTerms(100, 105, false);
        double[] x = new double[200], spot = new double[200], rate = new double[200], deviation = new double[200], profit = new double[200];
        spot.AsSpan().Fill(100);
        deviation.AsSpan().Fill(0.2);
        double today = MovedOption.Value(terms, new(0, 100, 0, 0, 0.2));
        Assert.Equal(0, Allocations.FewestOf(() => MovedOption.AccumulateValue(terms, new(x, spot, rate, rate, deviation), 1e6, today, profit)));
        Assert.All(profit, value => BitAssert.Equal(0.0, value));
    }

    [Fact]
    public void Value_not_a_number_stays_one()
    {
        foreach (bool isCall in new[] { true, false })
            MarketBlock.AssertNaNStays((in MarketPoint at, double quantity, double baseValue, double profit) => MovedOption.Profit(new(100, 103, isCall), at, quantity, baseValue, profit));
    }

    [Fact]
    public void AccumulateValue_faulty_spans_are_refused() => MarketBlock.AssertFaultySpansAreRefused(
        (in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
            MovedOption.AccumulateValue(new(100, 100, true), market, quantity, baseValue, profit));

    [Theory]
    [InlineData(0, 100, "spot0")]
    [InlineData(double.NaN, 100, "spot0")]
    [InlineData(100, -1, "strike")]
    [InlineData(100, double.PositiveInfinity, "strike")]
    public void New_faulty_term_is_refused_by_name(double spot0, double strike, string name) =>
        Assert.Throws<ArgumentOutOfRangeException>(name, () => new MovedOptionTerms(spot0, strike, true));

    [Fact]
    public void CopyTo_tells_different_terms_apart()
    {
        MovedOptionTerms[] terms = [new(100, 100, true), new(100, 100, false), new(100, 101, true), new(101, 100, true)];
        var seen = terms.Select(t =>
        {
            double[] numbers = new double[MovedOptionTerms.NumberCount];
            t.CopyTo(numbers);
            return string.Join(' ', numbers);
        });
        Assert.Equal(terms.Length, seen.Distinct().Count());
    }
}
