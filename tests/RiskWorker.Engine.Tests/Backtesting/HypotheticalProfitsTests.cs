using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Tests.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Backtesting;

public sealed class HypotheticalProfitsTests
{
    private static readonly DateOnly s_thursday = Friday.AddDays(-1);

    /// <summary>From Thursday to Friday A goes from 100 to 103 EUR, U from 50 to 48 USD, a dollar from 0.80 to 0.84 EUR.</summary>
    private static FridaySnapshot Market() => new FridaySnapshot()
        .Book("FIRM", null).Book("DESK", "FIRM").Book("NY", "FIRM", "USD")
        .Factor("A", currency: "EUR").Prices("A", 100, 103).Factor("U", currency: "USD").Prices("U", 50, 48).Factor("USD", FactorClass.Fx, currency: "USD").Prices("USD", 0.8, 0.84)
        .Spot("A-UNIT", "A").Spot("U-UNIT", "U", "USD")
        .Instrument(new Future("U") { Name = "FUT", Currency = "USD", Multiplier = 10 })
        .Instrument(new Cash { Name = "DOLLAR", Currency = "USD" });

    private static HypotheticalOutcome Outcome(FridaySnapshot builder, params Position[] held)
    {
        var snapshot = builder.Build();
        return new HypotheticalProfits(snapshot, BookTree.Build(snapshot.Books).Tree!).From(new(s_thursday, held), Friday);
    }

    private static double Of(HypotheticalOutcome outcome, string book) => Assert.Single(outcome.Profit.Books, b => b.Book == book).Amount;

    [Fact]
    public void From_positions_rolls_their_change_of_value_up_the_tree()
    {
        var outcome = Outcome(Market(), new("DESK", "A-UNIT", 2), new("FIRM", "A-UNIT", -1), new("NY", "U-UNIT", 10));

        Assert.Equal((s_thursday, Friday, 0), (outcome.Profit.From, outcome.Profit.To, outcome.LeftOut));
        Assert.Equal(2 * 3, Of(outcome, "DESK"), 1e-9);
        // NY in its own currency: 480 - 500 USD; in the firm's: 480 x 0.84 - 500 x 0.80 = 3.20 EUR.
        Assert.Equal(-20, Of(outcome, "NY"), 1e-9);
        Assert.Equal(6 - 3 + 3.2, Of(outcome, "FIRM"), 1e-9);
        Assert.Equal(["FIRM", "DESK", "NY"], outcome.Profit.Books.Select(b => b.Book));
    }

    [Fact]
    public void From_a_foreign_holding_measures_each_node_in_its_own_currency()
    {
        // 100 EUR in a dollar book: 103/0.84 - 100/0.80 USD. 1,000 dollars there are no profit, and 40 EUR to the firm.
        var outcome = Outcome(Market(), new("NY", "A-UNIT", 1), new("NY", "DOLLAR", 1000));

        Assert.Equal((103 / 0.84) - (100 / 0.8), Of(outcome, "NY"), 1e-9);
        Assert.Equal(3 + 40, Of(outcome, "FIRM"), 1e-9);
    }

    [Fact]
    public void From_a_future_pays_its_change_of_price_at_the_later_rate()
    {
        var outcome = Outcome(Market(), new Position("NY", "FUT", 3));

        Assert.Equal(3 * 10 * -2, Of(outcome, "NY"), 1e-9);
        Assert.Equal(3 * 10 * -2 * 0.84, Of(outcome, "FIRM"), 1e-9);
    }

    [Theory]
    [InlineData("A-UNIT", 100.0)]
    [InlineData("A-FUT", 100.0)]
    [InlineData("A-FWD", 100.0)]
    public void From_a_holding_over_a_split_makes_no_profit_of_it(string instrument, double units)
    {
        // Four for one, and the price goes from 100 to 25.75: 3% up, so 3 EUR on each unit held before.
        var builder = new FridaySnapshot().Factor("A").Prices("A", 100, 25.75).Adjustment("A", Friday, 0.25).Spot("A-UNIT", "A")
            .Instrument(new Future("A") { Name = "A-FUT", Currency = "EUR" })
            .Instrument(new Forward(new("A", null), 90, Friday.AddDays(100), null, null, null) { Name = "A-FWD", Currency = "EUR" });

        Assert.Equal(3 * units, Of(Outcome(builder, new Position("FIRM", instrument, units)), "FIRM"), 1e-9);
    }

    [Fact]
    public void From_positions_that_cannot_be_valued_leaves_them_out_and_counts_them()
    {
        var builder = Market().Factor("NEW").Prices("NEW", 5).Spot("NEW-UNIT", "NEW")
            .Instrument(new Forward(new("A", null), 90, s_thursday.AddDays(-1), null, null, null) { Name = "OLD", Currency = "EUR" });
        var outcome = Outcome(builder, new("DESK", "A-UNIT", 1), new("DESK", "X", 1), new("DESK", "NEW-UNIT", 1), new("DESK", "OLD", 1), new("LOST", "A-UNIT", 1), new("LOST", "X", 1));

        Assert.Equal(5, outcome.LeftOut);
        Assert.Equal(3, Of(outcome, "DESK"), 1e-9);
        Assert.Equal(3, Of(outcome, "FIRM"), 1e-9);
    }

    [Fact]
    public void From_a_forward_lets_time_pass_only_where_the_settings_include_it()
    {
        // A forward at 100 with a rate of 5%, a year to go, on a price that does not move: S - K e^(-rT).
        var builder = new FridaySnapshot().Factor("A").Prices("A", 100, 100)
            .Instrument(new Forward(new("A", null), 100, s_thursday.AddDays(365), RateTerm.Of(0.05), null, null) { Name = "FWD", Currency = "EUR" });

        Assert.Equal(0, Of(Outcome(builder, new Position("FIRM", "FWD", 1)), "FIRM"));
        var passed = Of(Outcome(builder.Settings(s => s with { TimeEffectsIncluded = true }), new Position("FIRM", "FWD", 1)), "FIRM");
        Assert.Equal(-100 * Math.Exp(-0.05) * (Math.Exp(0.05 / 365) - 1), passed, 1e-12);
    }

    [Fact]
    public void From_an_option_that_expires_in_between_pays_at_the_later_price()
    {
        var option = new Option(new("A", null), 101, s_thursday, OptionRight.Call, ExerciseStyle.European, new(0.2, null), null, null) { Name = "CALL", Currency = "EUR" };
        var builder = Market().Instrument(option);

        Assert.Equal(2, Of(Outcome(builder, new Position("DESK", "CALL", 1)), "DESK"), 1e-12);
        Assert.Equal(2, Of(Outcome(builder.Settings(s => s with { TimeEffectsIncluded = true }), new Position("DESK", "CALL", 1)), "DESK"), 1e-12);
    }

    [Fact]
    public void From_positions_leaves_out_a_node_whose_currency_has_no_price()
    {
        var builder = new FridaySnapshot().Book("FIRM", null).Book("TK", "FIRM", "JPY").Factor("A").Prices("A", 100, 103).Spot("A-UNIT", "A");

        var outcome = Outcome(builder, new Position("TK", "A-UNIT", 1));
        Assert.Equal("FIRM", Assert.Single(outcome.Profit.Books).Book);
        Assert.Equal(3, Of(outcome, "FIRM"), 1e-9);
    }

    [Fact]
    public void Of_a_snapshot_runs_from_its_previous_positions_to_its_date()
    {
        var snapshot = Market().Previous(s_thursday, new Position("DESK", "A-UNIT", 2)).Build();
        var profit = HypotheticalProfits.Of(snapshot, BookTree.Build(snapshot.Books).Tree!)!;

        Assert.Equal((s_thursday, Friday), (profit.From, profit.To));
        Assert.Equal(new("DESK", 6), profit.Books[1]);
        Assert.Null(HypotheticalProfits.Of(Market().Build(), BookTree.Build(snapshot.Books).Tree!));
    }
}
