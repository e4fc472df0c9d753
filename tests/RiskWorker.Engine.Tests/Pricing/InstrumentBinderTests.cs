using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Pricing;

public sealed class InstrumentBinderTests
{
    private static readonly InstrumentBinder s_binder = new("EUR", CompiledBook.Of(MixedBook.Whole().Build(), 1).Model.Factors);
    private static readonly Option s_call = (Option)MixedBook.Instruments.Single(i => i.Name == "EQ-CALL");
    private static readonly Forward s_forward = (Forward)MixedBook.Instruments.Single(i => i.Name == "EQ-FORWARD");

    private static readonly Dictionary<string, (Instrument Instrument, UnpricedReason Reason, string Clause)> s_faults = new()
    {
        ["factor"] = (new Spot("X") { Name = "n", Currency = "EUR" }, UnpricedReason.UnknownFactor, "its factor 'X' is not in factors.csv"),
        ["case"] = (new Spot("eq") { Name = "n", Currency = "EUR" }, UnpricedReason.UnknownFactor, "its factor 'eq' is not in factors.csv"),
        ["volatility factor"] = (s_call with { Volatility = new(null, "W") }, UnpricedReason.UnknownFactor, "its volatility 'W' is not in factors.csv"),
        ["currency"] = (new Cash { Name = "n", Currency = "JPY" }, UnpricedReason.UnknownCurrency, "no fx factor prices JPY"),
        ["base currency"] = (s_call with { Underlying = new(null, "JPY") }, UnpricedReason.UnknownCurrency, "no fx factor prices JPY"),
        ["mismatch"] = (new Spot("EQU") { Name = "n", Currency = "EUR" }, UnpricedReason.CurrencyMismatch, "its currency is EUR but its factor 'EQU' is quoted in USD"),
        ["fx in its own currency"] = (new Spot("USD") { Name = "n", Currency = "USD" }, UnpricedReason.CurrencyMismatch, "its currency is USD but its factor 'USD' is quoted in EUR"),
        ["base is own"] = (s_call with { Underlying = new(null, "EUR") }, UnpricedReason.CurrencyMismatch, "its base currency 'EUR' is its own currency"),
        ["kind"] = (new UnmodelledInstrument("plot", new Dictionary<string, string>()) { Name = "n", Currency = "EUR" }, UnpricedReason.NotModelled, "the kind 'plot' is not priced in this version"),
        ["curve"] = (s_call with { Curve = RateTerm.From("EUR-OIS") }, UnpricedReason.UnknownFactor, "its curve 'EUR-OIS' is not in factors.csv"),
        ["carry"] = (s_forward with { Carry = RateTerm.From("DIV") }, UnpricedReason.UnknownFactor, "its carry 'DIV' is not in factors.csv"),
        ["expired"] = (s_call with { Expiry = MixedBook.AsOf.AddDays(-1) }, UnpricedReason.Expired, "it expired on 2026-11-26"),
        ["normal underlying"] = (s_call with { Underlying = new("RATE", null) }, UnpricedReason.NotModelled, "its underlying 'RATE' has normal shocks and may turn negative, where the log-normal formula has no value"),
        ["normal volatility"] = (s_call with { Volatility = new(null, "RATE") }, UnpricedReason.NotModelled, "its volatility factor 'RATE' has normal shocks and may turn negative"),
    };

    public static TheoryData<string> Faults => [.. s_faults.Keys];

    [Theory]
    [MemberData(nameof(Faults))]
    public void Bind_says_why_an_instrument_cannot_be_priced(string name) =>
        Assert.Equal(new Unpriced(s_faults[name].Reason, s_faults[name].Clause), s_binder.Bind(s_faults[name].Instrument, MixedBook.AsOf, out _));

    [Fact]
    public void Bind_cross_knows_both_fx_factors_and_the_reporting_currency_as_neither()
    {
        Assert.Null(s_binder.Bind(s_call with { Underlying = new(null, "GBP"), Currency = "USD" }, MixedBook.AsOf, out var cross));
        Assert.Equal(new UnderlyingKey(true, 2, 6), Of(cross)); // EQ, EQU, GBP, OIL, RATE, STILL, USD, VOL
        Assert.Null(s_binder.Bind(s_call with { Underlying = new(null, "EUR"), Currency = "USD" }, MixedBook.AsOf, out var inverse));
        Assert.Equal(1 / 0.9, Of(inverse).LevelOf([100, 50, 1.15, 70, 0.03, 20, 0.9, 0.2]));
        Assert.Equal(1.15 / 0.9, Of(cross).LevelOf([100, 50, 1.15, 70, 0.03, 20, 0.9, 0.2]));
    }

    private static UnderlyingKey Of(BoundInstrument? bound) => Assert.IsType<BoundEuropean>(bound).Underlying;

    // An fx factor is quoted in the reporting currency: an instrument on it is in that currency.
    [Fact]
    public void Bind_spot_on_an_fx_factor_is_in_the_reporting_currency()
    {
        Assert.Null(s_binder.Bind(new Spot("USD") { Name = "n", Currency = "EUR" }, MixedBook.AsOf, out var bound));
        Assert.Equal((0, UnderlyingKey.Of(6)), (bound!.Currency, Assert.IsType<BoundSpot>(bound).Underlying));
    }

    [Fact]
    public void CurrencyTable_takes_the_first_fx_factor_of_a_currency_and_no_other_class()
    {
        var table = new CurrencyTable("EUR", [new("A", FactorClass.Equity, ShockKind.Lognormal, "CHF"), new("B", FactorClass.Fx, ShockKind.Lognormal, "USD"), new("C", FactorClass.Fx, ShockKind.Lognormal, "USD"), new("D", FactorClass.Fx, ShockKind.Lognormal)]);
        Assert.Equal((2, 1, -1), (table.Count, table.FactorOf(table.IndexOf("USD")), table.IndexOf("CHF")));
        Assert.Equal((1.0, 2.0), (table.RateOf(table.IndexOf("EUR"), [7, 2, 3, 4]), table.RateOf(table.IndexOf("USD"), [7, 2, 3, 4])));
    }
}
