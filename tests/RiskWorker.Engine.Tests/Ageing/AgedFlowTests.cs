using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>Bonds, floaters and swaps that pay or are fixed inside a horizon; one flat rate moves.</summary>
public sealed class AgedFlowTests
{
    private const int Horizon = 10;
    private static readonly DateOnly s_end = AgedMarket.Close(Horizon);

    // Without volatility only time passes: value then, less value now, plus the coupon in between (the formulas of a bond, worked here).
    [Theory]
    [InlineData(4)]
    [InlineData(10)]
    public void Bond_without_volatility_earns_its_carry(int day)
    {
        var paid = AgedMarket.Close(day);
        var bond = AgedKinds.Bond(paid.AddYears(-2), paid.AddYears(2));
        var book = new AgedMarket { Volatility = 0 }.Holding(bond).Compile(Horizon);
        var coupon = 100 * 0.04 * Days(paid.AddYears(-1), paid) / 365;
        var later = Worth(s_end);
        Assert.All(book.Losses(50)[book.RowOf("BOND", Horizon)], loss => Assert.Equal(-(later + coupon - Worth(AgedMarket.AsOf)), loss, 1e-12));

        double Worth(DateOnly date)
        {
            double Discounted(DateOnly due, double amount) => due > date ? amount * Math.Exp(-AgedMarket.R0 * Days(date, due) / 365) : 0;
            return Discounted(paid, coupon) + Discounted(paid.AddYears(1), 100 * 0.04 * Days(paid, paid.AddYears(1)) / 365)
                + Discounted(paid.AddYears(2), 100 + (100 * 0.04 * Days(paid.AddYears(1), paid.AddYears(2)) / 365));
        }
    }

    [Fact]
    public void Bond_that_matures_inside_is_cash_afterwards_whatever_rates_do()
    {
        var maturity = AgedMarket.Close(3);
        var book = new AgedMarket().Holding(AgedKinds.Bond(maturity.AddYears(-1), maturity)).Compile(Horizon);
        var today = 104 * Math.Exp(-AgedMarket.R0 * Days(AgedMarket.AsOf, maturity) / 365);
        Assert.All(book.Losses(200)[book.RowOf("BOND", Horizon)], loss => Assert.Equal(today - 104, loss, 1e-12));
    }

    // A weekend's coupon is paid on its own date: the one after a Friday's horizon is still to come.
    [Fact]
    public void Coupon_of_the_weekend_after_the_horizon_is_still_alive()
    {
        var bond = AgedKinds.Bond(s_end.AddDays(1).AddYears(-1), s_end.AddDays(1));
        var book = new AgedMarket().Holding(bond).Showing("R", Horizon).Compile(Horizon);
        var losses = book.Losses(100);
        var rates = AgedMarket.Levels(book, losses, "R", Horizon, Horizon);
        for (var i = 0; i < rates.Length; i++)
            Assert.Equal(Rebound.Value(bond, AgedMarket.AsOf, 100) - (104 * Math.Exp(-rates[i] / 365)), losses[book.RowOf("BOND", Horizon)][i], 1e-11);
    }

    // A floater is worth par the moment its coupon has been paid and its next one fixed.
    [Fact]
    public void Floater_is_worth_par_on_the_day_of_its_reset()
    {
        var floater = AgedKinds.Floater(s_end.AddYears(-1), s_end.AddYears(2), 2);
        var book = new AgedMarket().Holding(floater).Compile(Horizon);
        var coupon = 100 * 0.025 * Days(s_end.AddMonths(-6), s_end) / 365;
        var expected = Rebound.Value(floater, AgedMarket.AsOf, 100) - 100 - coupon;
        Assert.All(book.Losses(300)[book.RowOf("FLOATER", Horizon)], loss => Assert.Equal(expected, loss, 1e-11));
    }

    // Fixed on day 4 at that day's rate, valued on day 10 at the rate then: 100 e^(r4 τ) e^(-r10 (T - 10 days)).
    [Fact]
    public void Floater_fixed_inside_grows_at_the_rate_of_its_day_and_is_discounted_at_the_end()
    {
        var reset = AgedMarket.Close(4);
        var floater = AgedKinds.Floater(reset.AddMonths(-6), reset.AddMonths(6), 2, spread: 0.002);
        var book = new AgedMarket().Holding(floater).Showing("R", 4, Horizon).Compile(Horizon);
        var losses = book.Losses(300);
        var (then, end) = (AgedMarket.Levels(book, losses, "R", 4, Horizon), AgedMarket.Levels(book, losses, "R", Horizon, Horizon));
        var (last, tau, rest) = (100 * (0.025 + 0.002) * Days(reset.AddMonths(-6), reset) / 365, Days(reset, reset.AddMonths(6)) / 365, Days(s_end, reset.AddMonths(6)) / 365);
        for (var i = 0; i < then.Length; i++)
        {
            var value = ((100 * Math.Exp(then[i] * tau)) + (100 * 0.002 * tau)) * Math.Exp(-end[i] * rest);
            Assert.Equal(Rebound.Value(floater, AgedMarket.AsOf, 100) - value - last, losses[book.RowOf("FLOATER", Horizon)][i], 1e-10);
        }
    }

    // Forty days hold a month that is fixed and paid inside.
    [Fact]
    public void Coupon_fixed_and_paid_inside_is_cash_at_the_rate_of_its_fixing()
    {
        const int Long = 40;
        var reset = AgedMarket.Close(5);
        var floater = AgedKinds.Floater(reset.AddMonths(-1), reset.AddMonths(1), 12);
        var book = new AgedMarket().Holding(floater).Showing("R", 5).Compile(Long);
        var losses = book.Losses(300);
        var rates = AgedMarket.Levels(book, losses, "R", 5, Long);
        var (last, tau) = (100 * 0.025 * Days(reset.AddMonths(-1), reset) / 365, Days(reset, reset.AddMonths(1)) / 365);
        for (var i = 0; i < rates.Length; i++)
            Assert.Equal(Rebound.Value(floater, AgedMarket.AsOf, 100) - (100 * Math.Exp(rates[i] * tau)) - last, losses[book.RowOf("FLOATER", Long)][i], 1e-10);
    }

    // Over a weekend the reset sees Friday's close, today's: its rate is known.
    [Fact]
    public void Floater_fixed_on_the_weekend_after_the_as_of_date_takes_todays_rate()
    {
        var reset = AgedMarket.AsOf.AddDays(2);
        var floater = AgedKinds.Floater(reset.AddMonths(-6), reset.AddMonths(6), 2);
        var book = new AgedMarket().Holding(floater).Showing("R", Horizon).Compile(Horizon);
        var losses = book.Losses(100);
        var rates = AgedMarket.Levels(book, losses, "R", Horizon, Horizon);
        var (last, tau, rest) = (100 * 0.025 * Days(reset.AddMonths(-6), reset) / 365, Days(reset, reset.AddMonths(6)) / 365, Days(s_end, reset.AddMonths(6)) / 365);
        for (var i = 0; i < rates.Length; i++)
            Assert.Equal(Rebound.Value(floater, AgedMarket.AsOf, 100) - (100 * Math.Exp((AgedMarket.R0 * tau) - (rates[i] * rest))) - last, losses[book.RowOf("FLOATER", Horizon)][i], 1e-10);
    }

    // Receiving fixed on a swap is holding the bond and owing the floater of the same dates, fixings and payments inside included.
    [Theory]
    [InlineData(4, ReceivedLeg.Fixed)]
    [InlineData(7, ReceivedLeg.Float)]
    public void Swap_is_bond_less_floater_in_every_scenario(int day, ReceivedLeg receive)
    {
        var (issue, maturity) = (AgedMarket.Close(day).AddYears(-1), AgedMarket.Close(day).AddYears(1));
        var (bond, floater) = (AgedKinds.Bond(issue, maturity), AgedKinds.Floater(issue, maturity, 2, spread: 0.001));
        var swap = new Swap(receive, bond.Leg, floater.Leg, issue, maturity, bond.Curve, 100) { Name = "SWAP", Currency = "EUR" };
        var book = new AgedMarket().Holding(bond, floater, swap).Compile(Horizon);
        var (losses, sign) = (book.Losses(500), receive == ReceivedLeg.Fixed ? 1 : -1);
        for (var i = 0; i < 500; i++)
            Assert.Equal(sign * (losses[book.RowOf("BOND", Horizon)][i] - losses[book.RowOf("FLOATER", Horizon)][i]), losses[book.RowOf("SWAP", Horizon)][i], 1e-11);
    }

    [Fact]
    public void Without_an_event_inside_a_bond_ages_to_its_value_at_the_end()
    {
        var bond = AgedKinds.Bond(AgedMarket.AsOf.AddMonths(-3), AgedMarket.AsOf.AddMonths(33));
        var book = new AgedMarket().Holding(bond).Showing("R", Horizon).Compile(Horizon);
        var losses = book.Losses(200);
        var rates = AgedMarket.Levels(book, losses, "R", Horizon, Horizon);
        for (var i = 0; i < rates.Length; i++)
            Assert.Equal(Rebound.Value(bond, AgedMarket.AsOf, 100) - Rebound.Value(bond, s_end, 100, rates[i]), losses[book.RowOf("BOND", Horizon)][i], 1e-11);
    }

    private static double Days(DateOnly from, DateOnly to) => to.DayNumber - from.DayNumber;
}
