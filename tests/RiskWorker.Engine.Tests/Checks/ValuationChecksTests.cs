using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class ValuationChecksTests
{
    private static readonly DateOnly s_thursday = Friday.AddDays(-1);

    /// <summary>A at 100 EUR, U at 50 USD, a dollar at 0.80 EUR; books FIRM and DESK.</summary>
    private static FridaySnapshot TwoCurrencies() => new FridaySnapshot()
        .Book("FIRM", null).Book("DESK", "FIRM")
        .Factor("A", currency: "EUR").Prices("A", 100, 100).Factor("U", currency: "USD").Prices("U", 50, 50).Factor("USD", FactorClass.Fx, currency: "USD").Prices("USD", 0.8, 0.8)
        .Spot("A-UNIT", "A").Spot("U-UNIT", "U", "USD");

    [Fact]
    public void Run_of_priced_lines_finds_nothing() => Assert.Empty(FindingsOf.Valuation(TwoCurrencies().Position("DESK", "A-UNIT", 1)));

    [Fact]
    public void Run_with_unknown_instruments_counts_lines_and_names_them()
    {
        var finding = FindingsOf.Valuation(TwoCurrencies().Position("DESK", "Y", 1).Position("DESK", "X", 1, 500).Position("FIRM", "X", 1)).One(FindingCodes.InstrumentUnknown);

        Assert.Equal(FindingSeverity.Warning, finding.Severity);
        Assert.Equal("positions.csv", finding.Subject);
        Assert.Equal(
            "3 lines in 2 instruments cannot be priced (X: it is not in instruments.csv, Y: it is not in instruments.csv), so they are in no figure: nothing gives their notional; "
            + "add the instrument, or correct its name in positions.csv.", finding.Message);
    }

    [Fact]
    public void Run_with_an_unknown_factor_sizes_it_by_the_market_value()
    {
        var builder = TwoCurrencies().Spot("Z-UNIT", "Z", "USD").Position("DESK", "Z-UNIT", 7, -1000).Position("FIRM", "Z-UNIT", 7);

        // 1,000 USD short is 800 EUR; the other line has neither market value nor price.
        Assert.Contains("gross notional 800 EUR, and 1 line of unknown notional", FindingsOf.Valuation(builder).One(FindingCodes.FactorUnknown).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_currency_mismatch_sizes_it_by_the_price()
    {
        var builder = TwoCurrencies().Instrument(new Spot("A") { Name = "BAD", Currency = "USD", Multiplier = 10 }).Position("DESK", "BAD", -3);

        // |-3 x 10 x 100| USD at 0.80.
        var finding = FindingsOf.Valuation(builder).One(FindingCodes.CurrencyMismatch);
        Assert.Contains("(BAD, 2,400 EUR: its currency is USD but its factor 'A' is quoted in EUR)", finding.Message, StringComparison.Ordinal);
        Assert.Contains("gross notional 2,400 EUR;", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_an_unpriced_currency_finds_it_with_the_instruments() =>
        Assert.Equal("instruments.csv", FindingsOf.Valuation(TwoCurrencies().Instrument(new Cash { Name = "YEN", Currency = "JPY" }).Position("DESK", "YEN", 5)).One(FindingCodes.CurrencyUnpriced).Subject);

    [Fact]
    public void Run_with_an_expired_instrument_sizes_it_by_the_strike_and_lets_the_expiry_itself_pass()
    {
        var builder = TwoCurrencies().Position("DESK", "OLD", 2).Position("DESK", "LAST", 2)
            .Instrument(new Forward(new("A", null), 90, s_thursday, null, null, null) { Name = "OLD", Currency = "EUR" })
            .Instrument(new Forward(new("A", null), 90, Friday, null, null, null) { Name = "LAST", Currency = "EUR" });

        var finding = FindingsOf.Valuation(builder).One(FindingCodes.InstrumentExpired);
        Assert.StartsWith("1 line in 1 instrument cannot be priced (OLD, 180 EUR: it expired on 2026-11-26), so it is in no figure: gross notional 180 EUR;", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_kinds_without_pricing_sizes_them_by_strike_notional_or_price()
    {
        var builder = TwoCurrencies().Position("DESK", "BOND", 3).Position("DESK", "NOTE", -2).Position("DESK", "DIGI", 1).Position("DESK", "LOOK", 4).Position("DESK", "OTHER", 1)
            .Instrument(Bond("BOND", 100))
            .Instrument(Bond("NOTE", 1000))
            .Instrument(Unmodelled("DIGI", "digital", ("strike", "90"), ("notional", "5000")))
            .Instrument(Unmodelled("LOOK", "lookback", ("factor", "A")))
            .Instrument(Unmodelled("OTHER", "barrier"));

        // 5,000 + 4 x 100; the last names nothing. The bonds lack their curve: 3 x 100 + |-2 x 1000|.
        var findings = FindingsOf.Valuation(builder).ToArray();
        var finding = findings.One(FindingCodes.NotModelled);
        Assert.StartsWith("3 lines in 3 instruments", finding.Message, StringComparison.Ordinal);
        Assert.Contains("gross notional 5,400 EUR, and 1 line of unknown notional", finding.Message, StringComparison.Ordinal);
        Assert.Contains("gross notional 2,300 EUR", findings.One(FindingCodes.FactorUnknown).Message, StringComparison.Ordinal);
    }

    // What each kind is large by, for 2 units of 10 dollars at 0.80 EUR: 16 times the number given.
    [Fact]
    public void Run_with_derivatives_that_cannot_be_priced_names_each_with_its_notional()
    {
        var (expired, flat, underlying) = (s_thursday, new VolatilityTerm(0.2, null), new Underlying("U", null));
        Instrument[] held =
        [
            new Option(underlying, 91, expired, OptionRight.Put, ExerciseStyle.American, flat, null, null) { Name = "AMER", Currency = "USD" },
            new Digital(underlying, 92, expired, OptionRight.Call, flat, null, null, DigitalPayoff.Cash, 1000) { Name = "CASH", Currency = "USD" },
            new Digital(underlying, 93, expired, OptionRight.Call, flat, null, null, DigitalPayoff.Asset, null) { Name = "UNIT", Currency = "USD" },
            new SingleBarrier(underlying, 94, expired, OptionRight.Call, flat, null, null, 80, BarrierKind.DownIn, 0, Monitoring.Daily, s_thursday, null) { Name = "KNOCK", Currency = "USD" },
            new Asian(underlying, 95, expired, OptionRight.Call, flat, null, null, AverageKind.Geometric, FixingSchedule.Of(new Fixing(s_thursday, null)), null) { Name = "MEAN", Currency = "USD" },
            new Lookback(underlying, 96, expired, OptionRight.Call, flat, null, null, Monitoring.Daily, s_thursday) { Name = "FIXED", Currency = "USD" },
            new Lookback(underlying, null, expired, OptionRight.Call, flat, null, null, Monitoring.Daily, s_thursday) { Name = "FLOAT", Currency = "USD" },
            new Lookback(new(null, "EUR"), null, expired, OptionRight.Call, flat, null, null, Monitoring.Daily, s_thursday) { Name = "CROSS", Currency = "USD" },
        ];
        var builder = TwoCurrencies();
        foreach (var instrument in held) builder = builder.Instrument(instrument with { Multiplier = 10 }).Position("DESK", instrument.Name, -2);

        // The floating ones by the level: a unit of U at 50, a euro at 1.25 dollars.
        var message = FindingsOf.Valuation(builder).One(FindingCodes.InstrumentExpired).Message;
        string[] named = ["CASH, 16,000 EUR:", "FIXED, 1,536 EUR:", "MEAN, 1,520 EUR:", "KNOCK, 1,504 EUR:", "UNIT, 1,488 EUR:", "AMER, 1,456 EUR:", "FLOAT, 800 EUR:", "CROSS, 20 EUR:"];
        Assert.Equal(named.Select(n => message.IndexOf(n, StringComparison.Ordinal)).Order(), named.Select(n => message.IndexOf(n, StringComparison.Ordinal)));
        Assert.All(named, n => Assert.Contains(n, message, StringComparison.Ordinal));
        Assert.Contains("gross notional 24,324 EUR;", message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(3.0, 1_000_000)]
    [InlineData(-2_000_000.0, 2_000_000)]
    [InlineData(null, 1_000_000)]
    public void Run_with_a_swap_that_cannot_be_priced_sizes_it_by_the_larger_of_notional_and_market_value(double? market, double size)
    {
        var swap = new Swap(ReceivedLeg.Fixed, new(0.02, 1, DayCount.Thirty360), new(RateTerm.From("NONE"), 2, DayCount.Actual360, 0, 0.02), new(2026, 3, 1), new(2030, 3, 1), RateTerm.Of(0.02), 1_000_000)
        { Name = "SWAP", Currency = "EUR" };

        Assert.Equal(size, Assert.Single(FindingsOf.Holdings(TwoCurrencies().Instrument(swap).Position("DESK", "SWAP", -1, market)).Unpriced).Size);
    }

    [Fact]
    public void Run_with_unpriced_lines_that_the_settings_let_block_blocks()
    {
        var builder = TwoCurrencies().Checks(c => c with { Severity = new SortedDictionary<string, FindingSeverity> { ["not-modelled"] = FindingSeverity.Blocking } })
            .Position("DESK", "A-UNIT", 1).Position("DESK", "LOOK", 1).Instrument(Unmodelled("LOOK", "lookback", ("strike", "90")));

        var finding = Assert.Single(FindingsOf.Valuation(builder));
        Assert.Equal((FindingSeverity.Blocking, "not-modelled"), (finding.Severity, finding.Code));
        Assert.Contains("LOOK, 90 EUR:", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_an_instrument_of_an_earlier_version_names_the_faulty_term() =>
        Assert.Contains("(OLD, 5,000 EUR: its coupon is missing, expected a rate)", FindingsOf.Valuation(TwoCurrencies().Position("DESK", "OLD", 5)
            .Instrument(Unmodelled("OLD", "bond", ("notional", "1000")) with { Fault = "its coupon is missing, expected a rate" })).One(FindingCodes.NotModelled).Message, StringComparison.Ordinal);

    [Fact]
    public void Run_with_a_factor_without_a_price_finds_it_with_the_observations() =>
        Assert.Equal("observations.csv", FindingsOf.Valuation(TwoCurrencies().Factor("N").Spot("N-UNIT", "N").Position("DESK", "N-UNIT", 5)).One(FindingCodes.LevelMissing).Subject);

    [Fact]
    public void Run_with_market_values_beyond_the_tolerance_tells_count_and_total_of_each_book()
    {
        var builder = TwoCurrencies()
            .Position("DESK", "A-UNIT", 1, 100).Position("DESK", "A-UNIT", 1, 90).Position("DESK", "U-UNIT", 4, 250)
            .Position("DESK", "A-UNIT", 1).Position("FIRM", "A-UNIT", -1, 100);
        var findings = FindingsOf.Valuation(builder).Where(f => f.Code == FindingCodes.ValueDifference.Code).ToArray();

        // 10 EUR and 50 USD at 0.80 in DESK; a short position with a positive market value in FIRM.
        Assert.Equal(["DESK", "FIRM"], findings.Select(f => f.Subject));
        Assert.StartsWith("2 of 3 lines with a market value differ from it by more than 1% (A-UNIT 100 against 90 EUR, U-UNIT 200 against 250 USD), 50 EUR in all", findings[0].Message, StringComparison.Ordinal);
        Assert.StartsWith("1 of 1 lines with a market value differs from it by more than 1% (A-UNIT -100 against 100 EUR), 200 EUR in all", findings[1].Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(64.0, 80.0, false)]
    [InlineData(63.99, 80.0, true)]
    [InlineData(-64.0, -80.0, false)]
    [InlineData(1.0, 0.0, true)]
    public void Run_with_a_difference_of_exactly_the_tolerance_lets_it_pass(double quantity, double market, bool isBreak)
    {
        // One unit of cash is worth 1, so the quantity is the model value; a fifth of 80 is 16.
        var builder = TwoCurrencies().Checks(c => c with { ValueTolerance = 0.2 }).Instrument(new Cash { Name = "EURO", Currency = "EUR" }).Position("DESK", "EURO", quantity, market);

        Assert.Equal(isBreak, FindingsOf.Valuation(builder).Any(f => f.Code == FindingCodes.ValueDifference.Code));
    }

    [Theory]
    [InlineData(150.0, false)]
    [InlineData(150.01, true)]
    [InlineData(50.0, false)]
    [InlineData(49.99, true)]
    [InlineData(-150.0, false)]
    public void Run_with_a_gross_value_that_changes_by_more_than_half_warns(double quantity, bool isChange)
    {
        var builder = TwoCurrencies().Instrument(new Cash { Name = "EURO", Currency = "EUR" }).Position("DESK", "EURO", quantity).Previous(s_thursday, new Position("DESK", "EURO", 100));

        Assert.Equal(isChange, FindingsOf.Valuation(builder).Any(f => f.Code == FindingCodes.HoldingsChange.Code));
    }

    [Fact]
    public void Run_with_twice_the_positions_warns_of_the_book()
    {
        var builder = TwoCurrencies().Position("DESK", "A-UNIT", 1).Position("DESK", "A-UNIT", 1).Position("FIRM", "A-UNIT", 1)
            .Previous(s_thursday, new("DESK", "A-UNIT", 2), new("FIRM", "A-UNIT", 1));
        var finding = FindingsOf.Valuation(builder).One(FindingCodes.HoldingsChange);

        Assert.Equal("DESK", finding.Subject);
        Assert.StartsWith("2 positions with a gross value of 200 EUR stand against 1 with 200 on 2026-11-26, a change of more than 50%", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_book_that_empties_or_fills_warns() =>
        Assert.Equal(["FIRM", "DESK"], FindingsOf.Valuation(TwoCurrencies().Position("DESK", "A-UNIT", 1).Previous(s_thursday, new Position("FIRM", "A-UNIT", 1)))
            .Where(f => f.Code == FindingCodes.HoldingsChange.Code).Select(f => f.Subject).OrderDescending());

    [Fact]
    public void Run_counts_a_future_at_its_price() =>
        Assert.StartsWith("1 positions with a gross value of 300 EUR stand against 1 with 100", FindingsOf.Valuation(TwoCurrencies().Instrument(new Future("A") { Name = "FUT", Currency = "EUR" })
            .Position("DESK", "FUT", -3).Previous(s_thursday, new Position("DESK", "FUT", 1))).One(FindingCodes.HoldingsChange).Message, StringComparison.Ordinal);

    // Worth little at the first fixing, a million by contract.
    [Fact]
    public void HoldingsSummary_counts_a_swap_at_its_notional_and_a_bond_at_its_value()
    {
        var (issue, maturity, flat) = (Friday, Friday.AddYears(3), RateTerm.Of(0.03));
        var swap = new Swap(ReceivedLeg.Float, new(0.03, 1, DayCount.Actual365Fixed), new(flat, 1, DayCount.Actual365Fixed, 0, 0.03), issue, maturity, flat, 500_000) { Name = "SWAP", Currency = "EUR", Multiplier = 2 };
        var bond = new Bond(new(0, 0, DayCount.ActualActual), issue, maturity, RateTerm.Of(0), 100, null) { Name = "ZERO", Currency = "EUR" };

        var holdings = FindingsOf.Holdings(TwoCurrencies().Instrument(swap).Instrument(bond).Position("DESK", "SWAP", -1).Position("DESK", "ZERO", 3));
        Assert.Equal((2, 1_000_300.0), (holdings.Priced, holdings.GrossValue));
    }

    [Fact]
    public void HoldingsSummary_of_lines_counts_values_and_ties_them_to_the_book_of_record()
    {
        var holdings = FindingsOf.Holdings(TwoCurrencies()
            .Position("DESK", "A-UNIT", 1, 100).Position("DESK", "A-UNIT", -1, -90).Position("DESK", "U-UNIT", 4, 250).Position("DESK", "A-UNIT", 2)
            .Previous(s_thursday, new("DESK", "A-UNIT", -3), new("DESK", "X", 1)));

        Assert.Equal((4, 4, 3), (holdings.Positions, holdings.Priced, holdings.Reconciled));
        Assert.Equal(100 + 100 + 160 + 200, holdings.GrossValue, 1e-9);
        Assert.Equal(300, holdings.PreviousGrossValue!.Value, 1e-9);
        Assert.Equal([new("DESK", "U-UNIT", "USD", 200, 250), new("DESK", "A-UNIT", "EUR", -100, -90)], holdings.Breaks);
        Assert.Equal((50 * 0.8) + 10, holdings.BreakTotal, 1e-9);
        Assert.Empty(holdings.Unpriced);
    }

    [Fact]
    public void HoldingsSummary_of_unpriced_lines_lists_those_of_unknown_size_and_then_the_largest()
    {
        var holdings = FindingsOf.Holdings(TwoCurrencies().Instrument(Bond("BOND", 100))
            .Position("DESK", "BOND", 1).Position("DESK", "BOND", 1, 99_000).Position("LOST", "A-UNIT", -5).Position("DESK", "X", 2));

        Assert.Equal((4, 0, 0.0), (holdings.Positions, holdings.Priced, holdings.GrossValue));
        Assert.Equal(["X", "BOND", "A-UNIT", "BOND"], holdings.Unpriced.Select(u => u.Instrument));
        Assert.Equal([null, 99_000, 500, 100], holdings.Unpriced.Select(u => u.Size));
        Assert.Equal(new("LOST", "A-UNIT", "spot", -5, 500, "its book is not in books.csv"), holdings.Unpriced[2]);
        Assert.Equal("-", holdings.Unpriced[0].Kind);
        Assert.Null(holdings.PreviousGrossValue);
    }

    // Its curve has no factors: it stays without a price.
    private static Bond Bond(string name, double notional) =>
        new(new(0.05, 1, DayCount.ActualActual), new(2025, 3, 15), new(2031, 3, 15), RateTerm.From("NONE"), notional, null) { Name = name, Currency = "EUR" };

    private static UnmodelledInstrument Unmodelled(string name, string kind, params (string Term, string Text)[] terms) =>
        new(kind, terms.ToDictionary(t => t.Term, t => t.Text)) { Name = name, Currency = "EUR" };
}
