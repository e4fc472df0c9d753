using RiskWorker.Domain.Instruments;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class ExoticReaderTests
{
    private static readonly (string Term, string Value)[] s_option =
        [("factor", "X"), ("strike", "95.5"), ("expiry", "2027-03-19"), ("right", "put"), ("vol", "0.25"), ("curve", "0.03"), ("carry", "EUR-DIV")];

    private static readonly Dictionary<string, (string Term, string Value)[]> s_own = new()
    {
        ["digital"] = [("payoff", "cash"), ("notional", "1000")],
        ["barrier"] = [("barrier", "80"), ("barrier_kind", "down-out"), ("monitoring", "daily"), ("issue", "2026-03-19")],
        ["asian"] = [("average", "arithmetic"), ("fixings", "2026-12-31=94.25;2027-01-29;2027-03-19")],
        ["lookback"] = [("monitoring", "continuous"), ("issue", "2026-03-19")],
    };

    public static TheoryData<string> Kinds => [.. s_own.Keys];

    private static (Instrument? Instrument, IReadOnlyList<TermFault> Faults) Read(string kind, params (string Term, string Value)[] changes) =>
        InstrumentReader.Read(new("NAME", kind, "EUR",
            s_option.Concat(s_own[kind]).Where(t => changes.All(c => c.Term != t.Term)).Concat(changes.Where(c => c.Value != "")).ToDictionary(t => t.Term, t => t.Value), "issuer", 5, 1e6));

    [Fact]
    public void Read_digital_has_every_term()
    {
        var (instrument, faults) = Read("digital", ("multiplier", "-10"));
        Assert.Empty(faults);
        Assert.Equal(new Digital(new("X", null), 95.5, new(2027, 3, 19), OptionRight.Put, new(0.25, null), RateTerm.Of(0.03), RateTerm.From("EUR-DIV"), DigitalPayoff.Cash, 1000)
        { Name = "NAME", Currency = "EUR", Multiplier = -10, Issuer = "issuer", Lot = 5, DailyVolume = 1e6 }, instrument);
        var asset = Assert.IsType<Digital>(Read("digital", ("payoff", "asset"), ("notional", "")).Instrument);
        Assert.Equal((DigitalPayoff.Asset, null), (asset.Payoff, asset.Notional));
    }

    [Fact]
    public void Read_barrier_has_every_term()
    {
        var (instrument, faults) = Read("barrier", ("barrier_kind", "up-in"), ("rebate", "2.5"), ("knocked", "2026-05-04"));
        Assert.Empty(faults);
        Assert.Equal(new SingleBarrier(new("X", null), 95.5, new(2027, 3, 19), OptionRight.Put, new(0.25, null), RateTerm.Of(0.03), RateTerm.From("EUR-DIV"),
            80, BarrierKind.UpIn, 2.5, Monitoring.Daily, new(2026, 3, 19), new(2026, 5, 4))
        { Name = "NAME", Currency = "EUR", Issuer = "issuer", Lot = 5, DailyVolume = 1e6 }, instrument);
        var plain = Assert.IsType<SingleBarrier>(Read("barrier", ("monitoring", "continuous")).Instrument);
        Assert.Equal((0.0, null, BarrierKind.DownOut, Monitoring.Continuous), (plain.Rebate, plain.Knocked, plain.BarrierKind, plain.Monitoring));
    }

    [Theory]
    [InlineData("down-in", BarrierKind.DownIn)]
    [InlineData("down-out", BarrierKind.DownOut)]
    [InlineData("up-in", BarrierKind.UpIn)]
    [InlineData("up-out", BarrierKind.UpOut)]
    public void Read_barrier_knows_its_four_kinds(string text, BarrierKind kind) =>
        Assert.Equal(kind, Assert.IsType<SingleBarrier>(Read("barrier", ("barrier_kind", text)).Instrument).BarrierKind);

    [Fact]
    public void Read_asian_has_its_fixings()
    {
        var (instrument, faults) = Read("asian");
        Assert.Empty(faults);
        Assert.Equal(new Asian(new("X", null), 95.5, new(2027, 3, 19), OptionRight.Put, new(0.25, null), RateTerm.Of(0.03), RateTerm.From("EUR-DIV"), AverageKind.Arithmetic,
            FixingSchedule.Of(new(new(2026, 12, 31), 94.25), new(new(2027, 1, 29), null), new(new(2027, 3, 19), null)), null)
        { Name = "NAME", Currency = "EUR", Issuer = "issuer", Lot = 5, DailyVolume = 1e6 }, instrument);
    }

    [Fact]
    public void Read_asian_with_a_continuous_average_runs_from_its_issue()
    {
        var asian = Assert.IsType<Asian>(Read("asian", ("fixings", "continuous"), ("issue", "2026-03-19"), ("average", "geometric")).Instrument);
        Assert.Equal((true, new DateOnly(2026, 3, 19), AverageKind.Geometric), (asian.Fixings.IsContinuous, asian.Issue!.Value, asian.Average));
        Assert.Equal([new TermFault("issue", "", "a date as yyyy-MM-dd")], Read("asian", ("fixings", "continuous")).Faults);
    }

    [Fact]
    public void Read_lookback_without_a_strike_floats()
    {
        var (instrument, faults) = Read("lookback", ("strike", ""));
        Assert.Empty(faults);
        Assert.Equal(new Lookback(new("X", null), null, new(2027, 3, 19), OptionRight.Put, new(0.25, null), RateTerm.Of(0.03), RateTerm.From("EUR-DIV"), Monitoring.Continuous, new(2026, 3, 19))
        { Name = "NAME", Currency = "EUR", Issuer = "issuer", Lot = 5, DailyVolume = 1e6 }, instrument);
        Assert.Equal(95.5, Assert.IsType<Lookback>(Read("lookback").Instrument).Strike);
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Read_every_kind_is_its_own_and_european(string kind)
    {
        Assert.Equal(kind, Read(kind).Instrument!.Kind);
        Assert.Equal(kind, Read(kind, ("style", "european")).Instrument!.Kind);
        foreach (var style in new[] { "american", "bermudan" })
            Assert.Equal([new TermFault("style", style, "european or nothing: this kind is exercised at expiry only")], Read(kind, ("style", style)).Faults);
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Read_every_kind_refuses_faulty_option_terms(string kind)
    {
        Assert.Equal([new TermFault("strike", "0", "a number above 0")], Read(kind, ("strike", "0")).Faults);
        Assert.Equal([new TermFault("expiry", "2027-02-29", "a date as yyyy-MM-dd")], Read(kind, ("expiry", "2027-02-29")).Faults);
        Assert.Equal([new TermFault("right", "", "one of call, put")], Read(kind, ("right", "")).Faults);
        Assert.Equal([new TermFault("vol", "", "a number above 0, or a factor in vol_factor")], Read(kind, ("vol", "")).Faults);
        Assert.Equal([new TermFault("factor", "", "a factor, or a currency in base_currency")], Read(kind, ("factor", "")).Faults);
        Assert.Equal([new TermFault("multiplier", "0", "a number other than 0")], Read(kind, ("multiplier", "0")).Faults);
    }

    [Theory]
    [InlineData("digital", "payoff", "", "one of cash, asset")]
    [InlineData("digital", "payoff", "Cash", "one of cash, asset")]
    [InlineData("digital", "notional", "0", "a number above 0")]
    [InlineData("digital", "notional", "", "a number above 0")]
    [InlineData("digital", "strike", "", "a number above 0")]
    [InlineData("barrier", "barrier", "0", "a number above 0")]
    [InlineData("barrier", "barrier", "", "a number above 0")]
    [InlineData("barrier", "barrier_kind", "downin", "one of down-in, down-out, up-in, up-out")]
    [InlineData("barrier", "barrier_kind", "", "one of down-in, down-out, up-in, up-out")]
    [InlineData("barrier", "rebate", "-1", "a number from 0 on")]
    [InlineData("barrier", "rebate", "x", "a number from 0 on")]
    [InlineData("barrier", "monitoring", "", "one of continuous, daily")]
    [InlineData("barrier", "monitoring", "weekly", "one of continuous, daily")]
    [InlineData("barrier", "issue", "", "a date as yyyy-MM-dd")]
    [InlineData("barrier", "issue", "2027-03-20", "a date no later than the expiry 2027-03-19")]
    [InlineData("barrier", "knocked", "2026-03-18", "a date no earlier than the issue 2026-03-19")]
    [InlineData("barrier", "knocked", "2027-03-20", "a date no later than the expiry 2027-03-19")]
    [InlineData("barrier", "knocked", "yes", "a date as yyyy-MM-dd")]
    [InlineData("asian", "average", "harmonic", "one of arithmetic, geometric")]
    [InlineData("asian", "issue", "2027-03-20", "a date no later than the expiry 2027-03-19")]
    [InlineData("lookback", "issue", "", "a date as yyyy-MM-dd")]
    [InlineData("lookback", "issue", "2027-03-20", "a date no later than the expiry 2027-03-19")]
    [InlineData("lookback", "monitoring", "", "one of continuous, daily")]
    public void Read_names_the_term_what_stands_there_and_what_was_expected(string kind, string term, string found, string expected)
    {
        var (instrument, faults) = Read(kind, (term, found));
        Assert.Null(instrument);
        Assert.Equal([new TermFault(term, found, expected)], faults);
    }

    [Fact]
    public void Read_digital_that_pays_the_asset_has_no_notional() =>
        Assert.Equal([new TermFault("notional", "1000", "nothing, since payoff is asset")], Read("digital", ("payoff", "asset")).Faults);

    private const string FixingsExpected = "dates as yyyy-MM-dd joined by ';', a past one may be date=value with a number above 0, or continuous";

    [Theory]
    [InlineData("", "", FixingsExpected)]
    [InlineData("2027-01-29;", "", FixingsExpected)]
    [InlineData("2027-01-29;29.02.2027", "29.02.2027", FixingsExpected)]
    [InlineData("2027-01-29=0", "2027-01-29=0", FixingsExpected)]
    [InlineData("2027-01-29=", "2027-01-29=", FixingsExpected)]
    [InlineData("2027-01-29=1e999", "2027-01-29=1e999", FixingsExpected)]
    [InlineData("Continuous", "Continuous", FixingsExpected)]
    [InlineData("2027-01-29;2027-01-28", "2027-01-28", "a date after 2027-01-29, the fixing before it")]
    [InlineData("2027-01-29;2027-01-29=4", "2027-01-29=4", "a date after 2027-01-29, the fixing before it")]
    [InlineData("2027-01-29;2027-03-20", "2027-03-20", "a date no later than the expiry 2027-03-19")]
    public void Read_asian_names_the_fixing_that_is_wrong(string fixings, string found, string expected) =>
        Assert.Equal([new TermFault("fixings", found, expected)], Read("asian", ("fixings", fixings)).Faults);

    [Fact]
    public void Read_asian_fixing_before_the_issue_is_refused() =>
        Assert.Equal([new TermFault("fixings", "2026-12-31=94.25", "a date no earlier than the issue 2027-01-04")], Read("asian", ("issue", "2027-01-04")).Faults);

    [Fact]
    public void Read_tells_all_faults_at_once()
    {
        var (instrument, faults) = Read("barrier", ("strike", "0"), ("style", "american"), ("vol", "-1"), ("barrier", "0"), ("barrier_kind", "in"), ("rebate", "-1"), ("monitoring", "x"), ("issue", "x"), ("knocked", "x"), ("multiplier", "0"));
        Assert.Null(instrument);
        Assert.Equal(["strike", "style", "vol", "barrier", "barrier_kind", "rebate", "monitoring", "issue", "knocked", "multiplier"], faults.Select(f => f.Term));
    }

    [Fact]
    public void FixingSchedule_equals_by_days_and_levels()
    {
        Fixing a = new(new(2027, 1, 29), 95), b = new(new(2027, 2, 26), null);
        Assert.Equal(FixingSchedule.Of(a, b), FixingSchedule.Of(a, b));
        Assert.Equal(FixingSchedule.Of(a, b).GetHashCode(), FixingSchedule.Of(a, b).GetHashCode());
        Assert.NotEqual(FixingSchedule.Of(a, b), FixingSchedule.Of(a));
        Assert.NotEqual(FixingSchedule.Of(a), FixingSchedule.Of(a with { Value = 96 }));
        Assert.NotEqual(FixingSchedule.Of(a), FixingSchedule.Continuous);
    }

    [Fact]
    public void FixingSchedule_faulty_days_are_refused()
    {
        Fixing a = new(new(2027, 1, 29), null);
        Assert.Contains("no fixing", Assert.Throws<ArgumentException>(() => FixingSchedule.Of()).Message, StringComparison.Ordinal);
        Assert.Contains("Fixing 1 is on 2027-01-29", Assert.Throws<ArgumentException>(() => FixingSchedule.Of(a, a)).Message, StringComparison.Ordinal);
        Assert.Contains("Fixing 0 has the level 0", Assert.Throws<ArgumentException>(() => FixingSchedule.Of(a with { Value = 0 })).Message, StringComparison.Ordinal);
    }
}
