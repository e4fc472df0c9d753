using RiskWorker.Domain.Instruments;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class InstrumentReaderTests
{
    private static (Instrument? Instrument, IReadOnlyList<TermFault> Faults) Read(string kind, params (string, string)[] terms) =>
        InstrumentReader.Read(new("NAME", kind, "EUR", terms.ToDictionary(t => t.Item1, t => t.Item2), "issuer", 5, 1e6));

    private static readonly (string, string)[] s_option =
        [("factor", "X"), ("strike", "95.5"), ("expiry", "2027-03-19"), ("right", "put"), ("style", "european"), ("vol", "0.25"), ("curve", "0.03"), ("carry", "EUR-DIV")];

    private static (string, string)[] Option(params (string Term, string Value)[] changes) =>
        [.. s_option.Where(t => changes.All(c => c.Term != t.Item1)), .. changes.Where(c => c.Value != "")];

    [Fact]
    public void Read_option_has_every_term()
    {
        var (instrument, faults) = Read("option", [.. s_option, ("multiplier", "-10")]);
        Assert.Empty(faults);
        Assert.Equal(new Option(new("X", null), 95.5, new(2027, 3, 19), OptionRight.Put, ExerciseStyle.European, new(0.25, null), RateTerm.Of(0.03), RateTerm.From("EUR-DIV"))
        { Name = "NAME", Currency = "EUR", Multiplier = -10, Issuer = "issuer", Lot = 5, DailyVolume = 1e6 }, instrument);
        Assert.Equal("option", instrument!.Kind);
    }

    [Fact]
    public void Read_option_on_a_cross_with_a_volatility_factor()
    {
        var (instrument, faults) = Read("option", Option(("factor", ""), ("base_currency", "GBP"), ("vol", ""), ("vol_factor", "V"), ("style", "american"), ("right", "call"), ("curve", ""), ("carry", "")));
        Assert.Empty(faults);
        Assert.Equal(new Option(new(null, "GBP"), 95.5, new(2027, 3, 19), OptionRight.Call, ExerciseStyle.American, new(null, "V"), null, null)
        { Name = "NAME", Currency = "EUR", Issuer = "issuer", Lot = 5, DailyVolume = 1e6 }, instrument);
    }

    [Fact]
    public void Read_linear_kinds()
    {
        Assert.Equal("X", Assert.IsType<Spot>(Read("spot", ("factor", "X")).Instrument).Factor);
        Assert.Equal("X", Assert.IsType<Future>(Read("future", ("factor", "X")).Instrument).Factor);
        Assert.Equal(1, Assert.IsType<Cash>(Read("fx").Instrument).Multiplier);
        var forward = Assert.IsType<Forward>(Read("forward", ("factor", "X"), ("strike", "1e2"), ("expiry", "2027-01-01"), ("settlement_currency", "USD")).Instrument);
        Assert.Equal((100.0, "USD", null, null), (forward.Strike, forward.SettlementCurrency, forward.Curve, forward.Carry));
    }

    [Theory]
    [InlineData("bond", "coupon", "", "its coupon is missing, expected a decimal between -2 and 2 (0.05 is 5%) (5 more of its terms at fault)")]
    [InlineData("forward", "strike", "-1", "its strike is '-1', expected a number above 0")]
    [InlineData("forward", "multiplier", "x", "its multiplier is 'x', expected a number other than 0")]
    [InlineData("plot", "strike", "90", "its kind is 'plot', expected one of spot, fx, future, forward, bond, floater, swap, option, digital, barrier, asian, lookback")]
    public void ReadAccepted_row_that_an_earlier_version_took_keeps_its_terms_and_names_the_fault(string kind, string term, string text, string clause)
    {
        var terms = new Dictionary<string, string> { ["multiplier"] = "2" };
        if (kind == "forward") (terms["factor"], terms["strike"], terms["expiry"]) = ("X", "90", "2027-01-01");
        terms[term] = text;
        if (text.Length == 0) terms.Remove(term);

        var kept = Assert.IsType<UnmodelledInstrument>(InstrumentReader.ReadAccepted(new("NAME", kind, "EUR", terms, "issuer", 5, 1e6)));

        Assert.Equal((kind, clause, text == "x" ? 1.0 : 2.0), (kept.Kind, kept.Fault, kept.Multiplier));
        Assert.Equal(("NAME", "EUR", "issuer", 5.0, 1e6), (kept.Name, kept.Currency, kept.Issuer, kept.Lot, kept.DailyVolume));
        Assert.Same(terms, kept.Terms);
    }

    [Fact]
    public void ReadAccepted_sound_row_is_read_as_ever() =>
        Assert.Equal(Read("spot", ("factor", "X")).Instrument, InstrumentReader.ReadAccepted(new("NAME", "spot", "EUR", new Dictionary<string, string> { ["factor"] = "X" }, "issuer", 5, 1e6)));

    [Theory]
    [InlineData("strike", "0", "a number above 0")]
    [InlineData("strike", "-1", "a number above 0")]
    [InlineData("strike", "1,5", "a number above 0")]
    [InlineData("strike", "NaN", "a number above 0")]
    [InlineData("strike", "1e999", "a number above 0")]
    [InlineData("strike", "", "a number above 0")]
    [InlineData("expiry", "19.03.2027", "a date as yyyy-MM-dd")]
    [InlineData("expiry", "2027-02-29", "a date as yyyy-MM-dd")]
    [InlineData("expiry", "", "a date as yyyy-MM-dd")]
    [InlineData("right", "Call", "one of call, put")]
    [InlineData("right", "", "one of call, put")]
    [InlineData("style", "bermudan", "one of european, american")]
    [InlineData("vol", "0", "a number above 0")]
    [InlineData("vol", "", "a number above 0, or a factor in vol_factor")]
    [InlineData("vol_factor", "V", "nothing, since vol is given")]
    [InlineData("base_currency", "USD", "nothing, since factor is given")]
    [InlineData("factor", "", "a factor, or a currency in base_currency")]
    [InlineData("multiplier", "0", "a number other than 0")]
    [InlineData("multiplier", "Infinity", "a number other than 0")]
    public void Read_names_the_term_what_stands_there_and_what_was_expected(string term, string found, string expected)
    {
        var (instrument, faults) = Read("option", Option((term, found)));
        Assert.Null(instrument);
        Assert.Equal([new TermFault(term, found, expected)], faults);
    }

    [Fact]
    public void Read_tells_all_faults_at_once()
    {
        var (instrument, faults) = Read("option", ("strike", "x"), ("multiplier", "0"));
        Assert.Null(instrument);
        Assert.Equal(["factor", "strike", "expiry", "right", "style", "vol", "multiplier"], faults.Select(f => f.Term));
    }

    [Fact]
    public void Read_unknown_kind_lists_the_kinds()
    {
        var (instrument, faults) = Read("Option");
        Assert.Null(instrument);
        Assert.Equal("kind", faults.Single().Term);
        Assert.Equal("one of spot, fx, future, forward, bond, floater, swap, option, digital, barrier, asian, lookback", faults.Single().Expected);
    }

    [Theory]
    [InlineData("spot")]
    [InlineData("future")]
    public void Read_spot_or_future_without_its_factor_is_refused(string kind) => Assert.Equal([new TermFault("factor", "", "a name")], Read(kind).Faults);

    // Every term that a kind reads is in the table that warnings and documentation come from.
    [Fact]
    public void TermsByKind_names_no_term_outside_AllTerms()
    {
        Assert.Equal(InstrumentKinds.AllTerms.Order(StringComparer.Ordinal), InstrumentKinds.AllTerms);
        Assert.All(InstrumentKinds.TermsByKind.Values.SelectMany(t => t), term => Assert.Contains(term, InstrumentKinds.AllTerms));
        Assert.Contains("multiplier", InstrumentKinds.AllTerms);
    }
}
