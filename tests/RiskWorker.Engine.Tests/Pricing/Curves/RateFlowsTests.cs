using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

public sealed class RateFlowsTests
{
    private static readonly DateOnly s_issue = new(2024, 1, 31), s_maturity = new(2033, 8, 31), s_later = new(2027, 6, 10);
    private static readonly Bond s_bond = new(new(0.035, 2, DayCount.ActualActual), s_issue, s_maturity, RateTerm.From("OIS"), 100, null) { Name = "B", Currency = "EUR" };
    private static readonly Floater s_floater = new(new(RateTerm.From("IBOR"), 4, DayCount.Actual360, 0.0025, 0.031), s_issue, s_maturity, RateTerm.From("OIS"), 100, null) { Name = "F", Currency = "EUR" };
    private static readonly Swap s_swap = new(ReceivedLeg.Fixed, new(0.03, 1, DayCount.Thirty360), new(RateTerm.From("IBOR"), 2, DayCount.Actual360, 0.001, 0.029), s_issue, s_maturity, RateTerm.From("OIS"), 1e6) { Name = "S", Currency = "EUR" };

    private static RateMarket Market(CurveInterpolation interpolation, bool isNegative) => new(interpolation, isNegative ? RateMarket.Negative : RateMarket.Sloping);

    private static readonly RateMarket s_market = Market(CurveInterpolation.LinearZero, false);

    public static TheoryData<CurveInterpolation, bool> Markets => new MatrixTheoryData<CurveInterpolation, bool>(Enum.GetValues<CurveInterpolation>(), [false, true]);

    [Theory]
    [MemberData(nameof(Markets))]
    public void Of_bond_equals_its_coupons_discounted_one_by_one(CurveInterpolation interpolation, bool isNegative)
    {
        var market = Market(interpolation, isNegative);
        foreach (var dayCount in Enum.GetValues<DayCount>())
        {
            foreach (var spread in new[] { null, "BANK", "CREDIT" })
            {
                var bond = s_bond with { Leg = s_bond.Leg with { DayCount = dayCount }, Spread = spread is null ? null : RateTerm.From(spread) };
                var expected = 100 * (market.DirectFixed(bond.Leg, s_issue, s_maturity, AccrualRule.OfSecurity(dayCount, 2), "OIS", spread) + market.Discount("OIS", s_maturity, spread));
                Assert.Equal(expected, market.ValueOf(bond), 1e-12);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Markets))]
    public void Of_floater_equals_its_forward_rates_discounted_one_by_one(CurveInterpolation interpolation, bool isNegative)
    {
        var market = Market(interpolation, isNegative);
        foreach (var spread in new[] { null, "BANK", "CREDIT" })
        {
            foreach (var issue in new[] { s_issue, s_later })
            {
                var floater = s_floater with { Issue = issue, Spread = spread is null ? null : RateTerm.From(spread) };
                var expected = 100 * (market.DirectFloating(floater.Leg, issue, s_maturity, AccrualRule.OfSecurity(DayCount.Actual360, 4), "OIS", spread) + market.Discount("OIS", s_maturity, spread));
                Assert.Equal(expected, market.ValueOf(floater), 1e-12);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Markets))]
    public void Of_swap_equals_one_leg_less_the_other(CurveInterpolation interpolation, bool isNegative)
    {
        var market = Market(interpolation, isNegative);
        foreach (var issue in new[] { s_issue, s_later })
        {
            var swap = s_swap with { Issue = issue };
            var fixedLeg = market.DirectFixed(swap.Fixed, issue, s_maturity, AccrualRule.OfSwap(DayCount.Thirty360, 1), "OIS");
            var floatLeg = market.DirectFloating(swap.Floating, issue, s_maturity, AccrualRule.OfSwap(DayCount.Actual360, 2), "OIS");
            Assert.Equal(1e6 * (fixedLeg - floatLeg), market.ValueOf(swap), 1e-8);
            Assert.Equal(-market.ValueOf(swap), market.ValueOf(swap with { Receive = ReceivedLeg.Float }), 1e-8);
        }
    }

    // Projection and discount on one curve: the forward-starting floater without spread is its notional at the issue, one exponential, whatever the rates.
    [Fact]
    public void Of_floater_projected_and_discounted_on_one_curve_telescopes_to_its_notional_at_the_next_fixing()
    {
        var floater = s_floater with { Issue = s_later, Leg = s_floater.Leg with { Projection = RateTerm.From("OIS"), Spread = 0 } };
        var flows = s_market.FlowsOf(floater, RateMarket.Today);
        Assert.Null(s_market.Curves.ExponentOf(RateTerm.From("OIS"), "curve", "EUR", CurveTime.Between(RateMarket.Today, s_later), out var start));
        Assert.Equal([new(100, start)], ExponentialFlow.Merged(flows.Select(f => f.Flow)));
        // By date they stay apart, for time to pass: growth and notional of each coupon, the last notional against the redemption.
        Assert.Equal((2 * PaymentSchedule.Of(s_later, s_maturity, 4).Length) - 1, flows.Length);
    }

    // On a fixing date a floater whose fixing is the market's own rate is at par.
    [Fact]
    public void Of_floater_at_its_fixing_is_at_par()
    {
        var issue = RateMarket.Today;
        var first = PaymentSchedule.Of(issue, new(2031, 11, 27), 4)[0];
        var fixing = ((1 / s_market.Discount("OIS", first.End)) - 1) / YearFraction.Of(DayCount.Actual360, first.Start, first.End);
        var floater = s_floater with { Issue = issue, Maturity = new(2031, 11, 27), Leg = new(RateTerm.From("OIS"), 4, DayCount.Actual360, 0, fixing) };
        Assert.Equal(100, s_market.ValueOf(floater), 1e-12);
        Assert.Equal(50, s_market.ValueOf(floater with { Notional = 50 }), 1e-12);
    }

    [Theory]
    [MemberData(nameof(Markets))]
    public void Of_swap_at_its_par_rate_is_worth_nothing(CurveInterpolation interpolation, bool isNegative)
    {
        var market = Market(interpolation, isNegative);
        var maturity = new DateOnly(2037, 6, 10);
        var annuity = PaymentSchedule.Of(s_later, maturity, 1).Sum(p => YearFraction.Of(DayCount.Actual365Fixed, p.Start, p.End) * market.Discount("OIS", p.End));
        var par = (market.Discount("OIS", s_later) - market.Discount("OIS", maturity)) / annuity;
        var swap = new Swap(ReceivedLeg.Fixed, new(par, 1, DayCount.Actual365Fixed), new(RateTerm.From("OIS"), 4, DayCount.Actual360, 0, null), s_later, maturity, RateTerm.From("OIS"), 1e6) { Name = "S", Currency = "EUR" };
        Assert.Equal(0, market.ValueOf(swap), 1e-9);
        Assert.Equal(1e6 * 1e-4 * annuity, market.ValueOf(swap with { Fixed = swap.Fixed with { Coupon = par + 1e-4 } }), 1e-9);
    }

    // The same day count for securities and swaps: receiving fixed is a bond held and a floater owed.
    [Fact]
    public void Of_swap_is_a_bond_less_a_floater()
    {
        var (fixedLeg, floatLeg) = (new FixedLeg(0.03, 2, DayCount.Actual365Fixed), s_floater.Leg);
        var swap = s_swap with { Fixed = fixedLeg, Floating = floatLeg, Notional = 100 };
        Assert.Equal(s_market.ValueOf(s_bond with { Leg = fixedLeg }) - s_market.ValueOf(s_floater), s_market.ValueOf(swap), 1e-12);
    }

    // Regular coupons of 3.5% twice a year are 1.75; the last day of February is where the schedule says, and what fell due is gone.
    [Fact]
    public void Of_bond_leaves_out_what_is_paid_by_the_valuation_date()
    {
        RateFlow[] before = s_market.FlowsOf(s_bond, new(2027, 2, 27)), on = s_market.FlowsOf(s_bond, new(2027, 2, 28));
        Assert.Equal(new(2027, 2, 28), before[0].Paid);
        Assert.Equal(new(2027, 8, 31), on[0].Paid);
        Assert.Equal((14, 13), (before.Length, on.Length));
        Assert.All(on, f => Assert.Equal(f.Paid == s_maturity ? 101.75 : 1.75, f.Flow.Amount, 1e-13));
        Assert.All(on, f => Assert.Null(f.Fixes));
    }

    [Fact]
    public void Of_bond_on_its_maturity_has_nothing_left_and_after_it_a_reason()
    {
        Assert.Null(RateFlows.Of(s_bond, s_maturity, s_market.Curves, out var last));
        Assert.Empty(last);
        Assert.Equal(0, RateFlows.DirtyValue(last, s_market.Levels));
        foreach (Instrument instrument in new Instrument[] { s_bond, s_floater, s_swap })
            Assert.Equal(new Unpriced(UnpricedReason.Expired, "it matured on 2033-08-31"), RateFlows.Of(instrument, s_maturity.AddDays(1), s_market.Curves, out _));
    }

    [Fact]
    public void Of_bond_without_coupons_is_its_discounted_notional()
    {
        var flow = Assert.Single(s_market.FlowsOf(s_bond with { Leg = new(0, 0, DayCount.Thirty360), Notional = -1000 }, RateMarket.Today));
        Assert.Equal((s_maturity, -1000.0), (flow.Paid, flow.Flow.Amount));
        Assert.Equal(-1000 * s_market.Discount("OIS", s_maturity), flow.Flow.ValueAt(s_market.Levels), 1e-12);
    }

    [Fact]
    public void Of_bond_with_a_short_first_period_pays_its_part()
    {
        var bond = s_bond with { Issue = new(2026, 12, 1), Maturity = new(2028, 3, 15) };
        Assert.Equal(100 * 0.035 * 104 / (2 * 181.0), s_market.FlowsOf(bond, RateMarket.Today)[0].Flow.Amount, 1e-14);
    }

    // Any constant spread on any curve multiplies each flow by e^(-s t): a number, and a factor that stands at it, are the same.
    [Fact]
    public void Of_bond_with_a_spread_as_a_number_or_as_a_factor_is_worth_the_same()
    {
        var number = s_market.ValueOf(s_bond with { Spread = RateTerm.Of(0.008) });
        Assert.Equal(number, s_market.ValueOf(s_bond with { Spread = RateTerm.From("CREDIT") }), 1e-12);
        Assert.True(number < s_market.ValueOf(s_bond));
        Assert.Equal(s_market.ValueOf(s_bond), s_market.ValueOf(s_bond with { Spread = RateTerm.Of(0) }));
    }

    [Fact]
    public void Of_floater_whose_period_has_begun_without_a_fixing_names_the_term()
    {
        var unfixed = s_floater.Leg with { LastFixing = null };
        var expected = new Unpriced(UnpricedReason.MissingFixing, "its last_fixing is missing, the rate of the period from 2026-08-31");
        Assert.Equal(expected, RateFlows.Of(s_floater with { Leg = unfixed }, new(2026, 11, 29), s_market.Curves, out var none));
        Assert.Empty(none);
        Assert.Equal(expected with { Clause = "its last_fixing is missing, the rate of the period from 2026-11-30" }, RateFlows.Of(s_swap with { Floating = unfixed }, new(2026, 11, 30), s_market.Curves, out _));
        Assert.Null(RateFlows.Of(s_floater with { Leg = unfixed, Issue = RateMarket.Today.AddDays(1) }, RateMarket.Today, s_market.Curves, out _));
    }

    [Fact]
    public void Of_floater_projected_coupons_carry_the_date_of_their_fixing()
    {
        var flows = s_market.FlowsOf(s_floater, RateMarket.Today);
        var periods = PaymentSchedule.Of(s_issue, s_maturity, 4).Where(p => p.Start > RateMarket.Today).ToArray();
        Assert.Equal(periods.Select(p => (p.End, (DateOnly?)p.Start, 100.0)), flows.Where(f => f.Fixes is not null).Select(f => (f.Paid, f.Fixes, f.Flow.Amount)));
        Assert.Equal(flows.Order(), flows);
    }

    [Theory]
    [InlineData("curve", "NONE", "its curve 'NONE' is not in factors.csv")]
    [InlineData("curve", "BANK", "its curve 'BANK' is of class credit, expected rate")]
    [InlineData("projection", "NONE", "its projection 'NONE' is not in factors.csv")]
    [InlineData("spread", "NONE", "its spread 'NONE' is not in factors.csv")]
    public void Of_floater_with_a_name_that_gives_no_curve_says_which(string term, string name, string clause)
    {
        var floater = term switch
        {
            "curve" => s_floater with { Curve = RateTerm.From(name) },
            "spread" => s_floater with { Spread = RateTerm.From(name) },
            _ => s_floater with { Leg = s_floater.Leg with { Projection = RateTerm.From(name) } },
        };
        Assert.Equal(clause, RateFlows.Of(floater, RateMarket.Today, s_market.Curves, out _)!.Clause);
    }

    [Fact]
    public void Of_an_instrument_in_another_currency_than_its_curve_or_of_another_kind_says_so()
    {
        Assert.Equal(new Unpriced(UnpricedReason.CurrencyMismatch, "its currency is USD but its curve 'OIS' is in EUR"), RateFlows.Of(s_swap with { Currency = "USD" }, RateMarket.Today, s_market.Curves, out _));
        Assert.Equal(new Unpriced(UnpricedReason.NotModelled, "the kind 'fx' has no rate flows"), RateFlows.Of(new Cash { Name = "C", Currency = "EUR" }, RateMarket.Today, s_market.Curves, out _));
    }

    // Flat at the coupon's continuous rate, on a coupon date: the yield is the coupon and the price is par; in between, the clean price is near it.
    [Fact]
    public void CleanValue_of_a_bond_at_its_own_yield_is_near_par_and_par_on_a_coupon_date()
    {
        var date = new DateOnly(2025, 1, 15);
        var bond = new Bond(new(0.05, 1, DayCount.ActualActual), date, date.AddYears(3), RateTerm.Of(Math.Log(1.05)), 100, null) { Name = "B", Currency = "EUR" };
        Assert.Equal(100, s_market.ValueOf(bond, date), 1e-12); // 2026, 2027 and 15 January 2028: no leap day between
        for (var day = 1; day < 365; day += 20)
        {
            var (dirty, accrued) = (s_market.ValueOf(bond, date.AddDays(day)), AccruedInterest.Of(bond, date.AddDays(day)));
            Assert.Equal(100 * Math.Exp(Math.Log(1.05) * day / 365), dirty, 1e-12);
            Assert.InRange(RateFlows.CleanValue(dirty, accrued), 99.9, 100); // compounding against straight accrual: at most 5%²/8 below
        }
    }

    // Over a year of Treasury yields: the price of a ten-year bond moves with duration and convexity, up to the third order, and against its own tenors.
    [Fact]
    public void DirtyValue_from_day_to_day_moves_by_duration_and_convexity()
    {
        Factor[] factors = [.. new[] { 1.0, 3, 5, 10 }.Select(t => new Factor($"T{t}", FactorClass.Rate, ShockKind.Normal, "USD", "USD", t))];
        var bond = new Bond(new(0.105, 2, DayCount.ActualActual), RateMarket.Today, RateMarket.Today.AddYears(10), RateTerm.From("USD"), 100, null) { Name = "T", Currency = "USD" };
        Assert.Null(RateFlows.Of(bond, RateMarket.Today, new(factors), out var flows));
        var days = RateData.Yields();
        for (var d = 1; d < days.Length; d++)
        {
            double first = 0, second = 0, third = 0;
            foreach (var flow in flows)
            {
                var (value, move) = (flow.Flow.ValueAt(days[d - 1]), flow.Flow.Exponent.At(days[d]) - flow.Flow.Exponent.At(days[d - 1]));
                (first, second, third) = (first - (value * move), second + (value * move * move / 2), third + (value * Math.Abs(move * move * move) / 6));
            }
            var change = RateFlows.DirtyValue(flows, days[d]) - RateFlows.DirtyValue(flows, days[d - 1]);
            Assert.InRange(Math.Abs(change - first - second), 0, (1.1 * third) + 1e-11);
        }
    }
}
