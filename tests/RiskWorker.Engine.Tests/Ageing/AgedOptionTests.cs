using MathNet.Numerics.Distributions;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Runs;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Ageing;

/// <summary>Options and forwards that expire inside ten days, against closed forms of the payoff's law on the day that it falls on.</summary>
public sealed class AgedOptionTests
{
    private const int N = 100_000;
    private const int Horizon = 10;

    // Short a call: the loss rises with the level on its last day, so its quantile is the payoff at the level's quantile (log-normal, worked here).
    [Theory]
    [InlineData(1, 100, 0.99)]
    [InlineData(4, 98, 0.975)]
    [InlineData(9, 103, 0.99)]
    [InlineData(10, 100, 0.99)]
    public void Quantile_of_a_payoff_inside_is_that_of_the_level_on_its_day(int day, double strike, double confidence)
    {
        var book = Short(AgedKinds.Call(AgedMarket.Close(day), strike), 0.4).Compile(Horizon);
        double[] losses = [.. book.Losses(N)[book.RowOf("CALL", Horizon)].Order()];
        var level = AgedMarket.S0 * Math.Exp((Drift(0.4) * day) + (AgedMarket.Sigma * Math.Sqrt(day) * Normal.InvCDF(0, 1, confidence)));
        var expected = Math.Max(level - strike, 0) - Premium(day, strike);
        // Four standard deviations of the rank either way.
        var (rank, spread) = (N * confidence, 4 * Math.Sqrt(N * confidence * (1 - confidence)));
        Assert.InRange(expected, losses[(int)(rank - spread)], losses[(int)(rank + spread)]);
    }

    // E (S - K)+ under the drift of the model: Black's formula without a discount, worked here.
    [Theory]
    [InlineData(2, 99)]
    [InlineData(6, 102)]
    public void Mean_of_a_payoff_inside_is_its_expectation_under_the_model(int day, double strike)
    {
        var book = Short(AgedKinds.Call(AgedMarket.Close(day), strike), 0.4).Compile(Horizon);
        var premium = Premium(day, strike);
        double[] payoffs = [.. book.Losses(N)[book.RowOf("CALL", Horizon)].Select(loss => loss + premium)];
        var (s, forward) = (AgedMarket.Sigma * Math.Sqrt(day), AgedMarket.S0 * Math.Exp((Drift(0.4) * day) + (AgedMarket.Sigma * AgedMarket.Sigma * day / 2)));
        var d1 = (Math.Log(forward / strike) / s) + (s / 2);
        var expected = (forward * Normal.CDF(0, 1, d1)) - (strike * Normal.CDF(0, 1, d1 - s));
        var mean = payoffs.Average();
        var error = Math.Sqrt(payoffs.Average(p => (p - mean) * (p - mean)) / N);
        Assert.InRange((mean - expected) / error, -4, 4);
    }

    // What is alive at the end is worth what the same option is worth on that date, at the level there.
    [Theory]
    [InlineData(ExerciseStyle.European)]
    [InlineData(ExerciseStyle.American)]
    public void Option_that_lives_on_is_valued_with_the_time_that_is_left(ExerciseStyle style)
    {
        var option = AgedKinds.Call(AgedKinds.Later, 101, style, right: OptionRight.Put);
        var book = new AgedMarket().Holding(option).Showing("S", Horizon).Compile(Horizon);
        var losses = book.Losses(40);
        var levels = AgedMarket.Levels(book, losses, "S", Horizon, Horizon);
        for (var i = 0; i < levels.Length; i++)
            Assert.Equal(Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0) - Rebound.Value(option, AgedMarket.Close(Horizon), levels[i]), losses[book.RowOf("CALL", Horizon)][i], 2e-5);
    }

    [Fact]
    public void Call_less_put_less_forward_is_nothing_in_every_scenario()
    {
        var (expiry, curve) = (AgedMarket.Close(6), RateTerm.Of(0.03));
        var market = new AgedMarket().Holding(AgedKinds.Call(expiry, 97), AgedKinds.Call(expiry, 97, right: OptionRight.Put, name: "PUT"),
            new Forward(new("S", null), 97, expiry, curve, RateTerm.Of(0.01), null) { Name = "FORWARD", Currency = "EUR" });
        var book = market.Compile(Horizon);
        var losses = book.Losses(2_000);
        for (var i = 0; i < 2_000; i++)
            Assert.Equal(0, losses[book.RowOf("CALL", Horizon)][i] - losses[book.RowOf("PUT", Horizon)][i] - losses[book.RowOf("FORWARD", Horizon)][i], 1e-12);
    }

    // A delta hedge does not follow an option past its last day: the share moves on, the payoff stands.
    [Fact]
    public void Share_against_a_payoff_keeps_the_moves_after_its_day()
    {
        var book = new AgedMarket().Holding(AgedKinds.Call(AgedMarket.Close(3), 1), new Spot("S") { Name = "SHARE", Currency = "EUR" }).Showing("S", 3, Horizon).Compile(Horizon);
        var losses = book.Losses(500);
        var (then, end) = (AgedMarket.Levels(book, losses, "S", 3, Horizon), AgedMarket.Levels(book, losses, "S", Horizon, Horizon));
        var premium = Premium(3, 1);
        for (var i = 0; i < 500; i++)
            Assert.Equal(end[i] - then[i] + 1 + (premium - AgedMarket.S0), losses[book.RowOf("CALL", Horizon)][i] - losses[book.RowOf("SHARE", Horizon)][i], 1e-11);
    }

    // 5 dollars a unit at strike: paid on day 4, turned into euros at the rate of day 10.
    [Fact]
    public void Money_paid_in_a_foreign_currency_is_converted_at_the_end()
    {
        var forward = new Forward(new("U", null), 45, AgedMarket.Close(4), null, null, null) { Name = "USD-FORWARD", Currency = "USD" };
        var shown = new Forward(new("U", null), 0.01, AgedMarket.Close(4), null, null, null) { Name = "USD-SHOWN", Currency = "USD" };
        var book = new AgedMarket().Holding(forward, shown).Showing("X", Horizon).Compile(Horizon);
        var losses = book.Losses(500);
        var rates = AgedMarket.Levels(book, losses, "X", Horizon, Horizon);
        for (var i = 0; i < 500; i++)
        {
            // Both pay the level less a strike: their difference is known in dollars.
            var difference = losses[book.RowOf("USD-SHOWN", Horizon)][i] - losses[book.RowOf("USD-FORWARD", Horizon)][i];
            Assert.Equal((AgedMarket.X0 - rates[i]) * (45 - 0.01), difference, 1e-11);
        }
    }

    // Saturday after a Friday: its close is Friday's, so nothing is left to chance.
    [Fact]
    public void Option_that_expires_on_the_weekend_after_the_as_of_date_pays_on_its_close()
    {
        var option = AgedKinds.Call(AgedMarket.AsOf.AddDays(1), 96);
        var book = new AgedMarket().Holding(option).Compile(1, Horizon);
        var expected = Rebound.Value(option, AgedMarket.AsOf, AgedMarket.S0) - 4;
        foreach (var horizon in new[] { 1, Horizon }) Assert.All(book.Losses(100)[book.RowOf("CALL", horizon)], loss => Assert.Equal(expected, loss, 1e-12));
    }

    [Fact]
    public void Option_on_its_last_day_pays_on_the_close_that_has_been()
    {
        var book = new AgedMarket().Holding(AgedKinds.Call(AgedMarket.AsOf, 96)).Compile(Horizon);
        Assert.All(book.Losses(100)[book.RowOf("CALL", Horizon)], loss => Assert.Equal(0, loss, 1e-12));
    }

    [Fact]
    public void Future_keeps_the_change_of_its_price()
    {
        var future = new Future("S") { Name = "FUTURE", Currency = "EUR", Multiplier = 10 };
        var book = new AgedMarket().Holding(future).Compile(Horizon);
        var still = new AgedMarket { Ageing = AgeingKind.None }.Holding(future).Compile(Horizon);
        BitAssert.Equal(still.Losses(200)[still.RowOf("FUTURE", Horizon)], book.Losses(200)[book.RowOf("FUTURE", Horizon)]);
    }

    private static AgedMarket Short(Option option, double drift) => new AgedMarket { Drift = drift }.Holding(option with { Multiplier = -1 });

    private static double Premium(int day, double strike) => Rebound.Value(AgedKinds.Call(AgedMarket.Close(day), strike), AgedMarket.AsOf, AgedMarket.S0);

    // Of the logarithm, a day: the return of a year over 252 days less half the variance.
    private static double Drift(double perYear) => (perYear / 252) - (AgedMarket.Sigma * AgedMarket.Sigma / 2);
}
