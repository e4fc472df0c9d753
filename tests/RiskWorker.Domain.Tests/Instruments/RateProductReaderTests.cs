using RiskWorker.Domain.Instruments;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class RateProductReaderTests
{
    private const string Rate = "a decimal between -2 and 2 (0.05 is 5%)";
    private const string Frequency = "1, 2, 4 or 12";
    private const string DayCounts = "one of 30/360, ACT/360, ACT/365F, ACT/ACT";
    private const string Curve = "a curve, or a rate as a decimal";
    private const string Notional = "a number other than 0, at most 1e15 in size";

    private static readonly Dictionary<string, string> s_life = new() { ["issue"] = "2024-03-15", ["maturity"] = "2031-03-15", ["curve"] = "EUR" };
    private static readonly Dictionary<string, string> s_fixed = new() { ["coupon"] = "0.035", ["frequency"] = "2", ["day_count"] = "ACT/ACT" };
    private static readonly Dictionary<string, string> s_float = new() { ["projection"] = "EUR-3M", ["float_frequency"] = "4", ["float_day_count"] = "ACT/360" };

    private static readonly Dictionary<string, Dictionary<string, string>> s_terms = new()
    {
        ["bond"] = new(s_fixed.Concat(s_life)),
        ["floater"] = new(s_float.Concat(s_life)),
        ["swap"] = new(s_fixed.Concat(s_float).Concat(s_life)) { ["receive"] = "float", ["notional"] = "1e6" },
    };

    private static (Instrument? Instrument, IReadOnlyList<TermFault> Faults) Read(string kind, params (string Term, string Text)[] changes)
    {
        var terms = new Dictionary<string, string>(s_terms[kind]);
        foreach (var (term, text) in changes)
        {
            if (text == "") terms.Remove(term);
            else terms[term] = text;
        }
        return InstrumentReader.Read(new("NAME", kind, "EUR", terms));
    }

    [Fact]
    public void Read_bond_has_every_term()
    {
        var (instrument, faults) = Read("bond", ("notional", "-1000"), ("spread", "BANK"), ("multiplier", "10"));
        Assert.Empty(faults);
        Assert.Equal(new Bond(new(0.035, 2, DayCount.ActualActual), new(2024, 3, 15), new(2031, 3, 15), RateTerm.From("EUR"), -1000, RateTerm.From("BANK")) { Name = "NAME", Currency = "EUR", Multiplier = 10 }, instrument);
        Assert.Equal("bond", instrument!.Kind);
    }

    [Fact]
    public void Read_bond_without_notional_or_spread_has_a_notional_of_100_and_none()
    {
        var bond = Assert.IsType<Bond>(Read("bond", ("curve", "-0.005")).Instrument);
        Assert.Equal((100.0, null, RateTerm.Of(-0.005)), (bond.Notional, bond.Spread, bond.Curve));
    }

    [Fact]
    public void Read_bond_without_coupons()
    {
        Assert.Equal(new FixedLeg(0, 0, DayCount.Thirty360), Assert.IsType<Bond>(Read("bond", ("coupon", "0"), ("frequency", "0"), ("day_count", "30/360")).Instrument).Leg);
        Assert.Equal([new TermFault("frequency", "0", "1, 2, 4 or 12, since coupon is not 0")], Read("bond", ("frequency", "0")).Faults);
    }

    [Fact]
    public void Read_floater_has_every_term()
    {
        Assert.Equal(new Floater(new(RateTerm.From("EUR-3M"), 4, DayCount.Actual360, 0.0025, 0.031), new(2024, 3, 15), new(2031, 3, 15), RateTerm.From("EUR"), 50, RateTerm.Of(0.01)) { Name = "NAME", Currency = "EUR" },
            Read("floater", ("float_spread", "0.0025"), ("last_fixing", "0.031"), ("notional", "50"), ("spread", "0.01")).Instrument);
        var plain = Assert.IsType<Floater>(Read("floater").Instrument);
        Assert.Equal((100.0, 0.0, null, null, "floater"), (plain.Notional, plain.Leg.Spread, plain.Leg.LastFixing, plain.Spread, plain.Kind));
    }

    [Fact]
    public void Read_swap_has_every_term()
    {
        Assert.Equal(new Swap(ReceivedLeg.Float, new(0.035, 2, DayCount.Thirty360), new(RateTerm.Of(0.02), 4, DayCount.Actual365Fixed, 0, -0.001), new(2024, 3, 15), new(2031, 3, 15), RateTerm.From("EUR"), 1e6) { Name = "NAME", Currency = "EUR" },
            Read("swap", ("day_count", "30/360"), ("float_day_count", "ACT/365F"), ("projection", "0.02"), ("last_fixing", "-0.001")).Instrument);
        Assert.Equal(ReceivedLeg.Fixed, Assert.IsType<Swap>(Read("swap", ("receive", "fixed")).Instrument).Receive);
    }

    [Theory]
    [InlineData("bond", "coupon", "3.5", Rate)]
    [InlineData("bond", "coupon", "", Rate)]
    [InlineData("bond", "coupon", "NaN", Rate)]
    [InlineData("bond", "frequency", "3", "0 (no coupons), 1, 2, 4 or 12")]
    [InlineData("bond", "frequency", "", "0 (no coupons), 1, 2, 4 or 12")]
    [InlineData("bond", "day_count", "act/act", DayCounts)]
    [InlineData("bond", "day_count", "", DayCounts)]
    [InlineData("bond", "issue", "", "a date as yyyy-MM-dd")]
    [InlineData("bond", "issue", "1899-12-31", "a date from 1900-01-01 on")]
    [InlineData("bond", "maturity", "15.03.2031", "a date as yyyy-MM-dd")]
    [InlineData("bond", "maturity", "2024-03-15", "a date after issue (2024-03-15), at most 200 years later")]
    [InlineData("bond", "maturity", "2225-01-01", "a date after issue (2024-03-15), at most 200 years later")]
    [InlineData("bond", "curve", "", Curve)]
    [InlineData("bond", "curve", "3.5", Rate + ", or a name")]
    [InlineData("bond", "spread", "100", Rate + ", or a name")]
    [InlineData("bond", "notional", "0", Notional)]
    [InlineData("bond", "notional", "1e16", Notional)]
    [InlineData("bond", "notional", "1,000", Notional)]
    [InlineData("floater", "projection", "", Curve)]
    [InlineData("floater", "float_frequency", "0", Frequency)]
    [InlineData("floater", "float_day_count", "30/365", DayCounts)]
    [InlineData("floater", "float_spread", "25", Rate)]
    [InlineData("floater", "last_fixing", "none", Rate)]
    [InlineData("swap", "receive", "", "one of fixed, float")]
    [InlineData("swap", "receive", "floating", "one of fixed, float")]
    [InlineData("swap", "frequency", "0", Frequency)]
    [InlineData("swap", "notional", "", Notional)]
    public void Read_names_the_term_what_stands_there_and_what_was_expected(string kind, string term, string found, string expected)
    {
        var (instrument, faults) = Read(kind, (term, found));
        Assert.Null(instrument);
        Assert.Equal([new TermFault(term, found, expected)], faults);
    }

    [Theory]
    [InlineData("bond", "coupon", "frequency", "day_count", "issue", "maturity", "curve")]
    [InlineData("floater", "projection", "float_frequency", "float_day_count", "issue", "maturity", "curve")]
    [InlineData("swap", "receive", "coupon", "frequency", "day_count", "projection", "float_frequency", "float_day_count", "issue", "maturity", "curve", "notional")]
    public void Read_without_terms_names_all_that_it_needs(string kind, params string[] needed) =>
        Assert.Equal(needed, InstrumentReader.Read(new("NAME", kind, "EUR", new Dictionary<string, string>())).Faults.Select(f => f.Term));
}
