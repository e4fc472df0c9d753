using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

/// <summary>Published examples of bonds and swaps (Data/rates/README.md), their times in halves of a year put on a calendar's days.</summary>
public sealed class WorkedRateExamplesTests
{
    private static readonly DateOnly s_today = new(2026, 3, 15);

    private static DateOnly Half(int count) => s_today.AddMonths(6 * count);

    private static Bond BondOf(double coupon, int years) =>
        new(new(coupon, coupon == 0 ? 0 : 2, DayCount.Thirty360), s_today, s_today.AddYears(years), RateTerm.From("C"), 100, null) { Name = "B", Currency = "USD" };

    /// <summary>Price, modified duration and convexity for a yield compounded twice a year, from the flows.</summary>
    private static (double Price, double Duration, double Convexity) Measures(double coupon, int years, double yield)
    {
        var market = new DatedCurve(s_today, [.. Enumerable.Range(1, 2 * years).Select(k => (Half(k), k * Math.Log(1 + (yield / 2))))]);
        Assert.Null(RateFlows.Of(BondOf(coupon, years), s_today, market.Curves, out var flows));
        double price = 0, first = 0, second = 0;
        foreach (var flow in flows)
        {
            var k = Enumerable.Range(1, 2 * years).Single(i => Half(i) == flow.Paid);
            var value = flow.Flow.ValueAt(market.Levels);
            (price, first, second) = (price + value, first + (k / 2.0 * value), second + (k / 2.0 * (k + 1) / 2.0 * value));
        }
        Assert.Equal(price, RateFlows.DirtyValue(flows, market.Levels), 1e-12);
        return (price, first / price / (1 + (yield / 2)), second / price / ((1 + (yield / 2)) * (1 + (yield / 2))));
    }

    [Theory]
    [InlineData("9%5y", 0.09, 5, false)]
    [InlineData("9%25y", 0.09, 25, false)]
    [InlineData("6%5y", 0.06, 5, true)]
    [InlineData("6%25y", 0.06, 25, true)]
    [InlineData("0%5y", 0, 5, true)]
    [InlineData("0%25y", 0, 25, false)]
    public void Flows_of_a_bond_give_the_textbook_price_duration_and_convexity(string name, double coupon, int years, bool hasPrice)
    {
        var (price, duration, convexity) = Measures(coupon, years, 0.09);
        if (hasPrice) AssertExample($"BND-P-{name}", price);
        else if (coupon == 0.09) Assert.Equal(100, price, 1e-12);
        if (name is not ("6%25y" or "0%25y")) AssertExample($"BND-D-{name}", duration);
        AssertExample($"BND-C-{name}", convexity);
    }

    [Fact]
    public void Flows_of_a_par_bond_give_the_textbook_value_of_a_basis_point() =>
        AssertExample("BND-DV1", (Measures(0.09, 5, 0.0899).Price - Measures(0.09, 5, 0.0901).Price) / 2);

    // Hull's duration table: 10% twice a year for 3 years at a continuous yield of 12%: 94.213; at 12.1%: 93.963.
    [Fact]
    public void Flows_of_a_bond_at_a_continuous_yield_give_the_textbook_price()
    {
        double Price(double yield)
        {
            var market = new DatedCurve(s_today, [.. Enumerable.Range(1, 6).Select(k => (Half(k), k / 2.0 * yield))]);
            Assert.Null(RateFlows.Of(BondOf(0.10, 3), s_today, market.Curves, out var flows));
            return RateFlows.DirtyValue(flows, market.Levels);
        }
        AssertExample("BND-H3", Price(0.121));
        Assert.Equal(94.213, Price(0.12), 5e-4);
    }

    // Hull's swap: 8% fixed against six months' floating on 100 million, 15 months left, continuous rates of 10%, 10.5% and 11% for 3, 9 and
    // 15 months, last fixing 10.2%.
    [Fact]
    public void Flows_of_a_swap_give_the_textbook_value_of_each_leg()
    {
        DateOnly[] dates = [s_today.AddMonths(3), s_today.AddMonths(9), s_today.AddMonths(15)];
        var market = new DatedCurve(s_today, [(dates[0], 0.10 * 0.25), (dates[1], 0.105 * 0.75), (dates[2], 0.11 * 1.25)]);
        var (fixedLeg, floatLeg) = (new FixedLeg(0.08, 2, DayCount.Thirty360), new FloatLeg(RateTerm.From("C"), 2, DayCount.Thirty360, 0, 0.102));
        var issue = s_today.AddMonths(-3);
        double Value(Instrument instrument)
        {
            Assert.Null(RateFlows.Of(instrument, s_today, market.Curves, out var flows));
            return RateFlows.DirtyValue(flows, market.Levels);
        }

        var swap = Value(new Swap(ReceivedLeg.Fixed, fixedLeg, floatLeg, issue, dates[2], RateTerm.From("C"), 100) { Name = "S", Currency = "USD" });
        var floater = Value(new Floater(floatLeg, issue, dates[2], RateTerm.From("C"), 100, null) { Name = "F", Currency = "USD" });
        AssertExample("SWP-3", swap);
        AssertExample("SWP-2", floater);
        var bond = Value(new Bond(fixedLeg, issue, dates[2], RateTerm.From("C"), 100, null) { Name = "B", Currency = "USD" });
        Assert.Equal((4 * Math.Exp(-0.025)) + (4 * Math.Exp(-0.07875)) + (104 * Math.Exp(-0.1375)), bond, 1e-12);
        Assert.Equal(swap, bond - floater, 1e-12);
    }

    // Hull's currency swap: 8% on 10 million dollars, 5% on 1,200 million yen, yearly, three years, flat 9% and 4%. No leap day lies between.
    [Theory]
    [InlineData("CSW-1", 10, 0.08, 0.09)]
    [InlineData("CSW-2", 1200, 0.05, 0.04)]
    public void Flows_of_a_currency_swap_leg_at_a_flat_rate_give_the_textbook_value(string id, double notional, double coupon, double rate)
    {
        var today = new DateOnly(2025, 2, 1);
        var leg = new Bond(new(coupon, 1, DayCount.ActualActual), today, today.AddYears(3), RateTerm.Of(rate), notional, null) { Name = "B", Currency = "USD" };
        Assert.Null(RateFlows.Of(leg, today, new([]), out var flows));
        AssertExample(id, RateFlows.DirtyValue(flows, []));
    }

    private static void AssertExample(string id, double value)
    {
        var (expected, tolerance) = RateData.Example(id);
        Assert.Equal(expected, value, tolerance);
    }
}
