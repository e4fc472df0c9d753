using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

public sealed class CurveSetTests
{
    private static Factor Point(string name, string curve, double? tenor, FactorClass @class = FactorClass.Rate, string? currency = "EUR") =>
        new(name, @class, ShockKind.Normal, currency, curve, tenor);

    private static readonly CurveSet s_curves = new([
        Point("E1", "EUR", 1), Point("E5", "EUR", 5, currency: null),
        Point("N1", "NO-TENOR", 1), Point("N2", "NO-TENOR", null),
        Point("D1", "TWICE", 2), Point("D2", "TWICE", 2.0),
        Point("M1", "MIXED", 1), Point("M2", "MIXED", 2, FactorClass.Credit),
        Point("C1", "TWO", 1, currency: null), Point("C2", "TWO", 2), Point("C3", "TWO", 3, currency: "USD"),
        Point("T1", "BEFORE", -1),
        Point("S1", "BANK", 1, FactorClass.Credit), Point("S5", "BANK", 5, FactorClass.Credit),
        Point("V1", "VOL", 1, FactorClass.Vol),
        new("EQ", FactorClass.Equity, ShockKind.Lognormal, "EUR"),
        Point("OPEN", "OPEN", 1, currency: null)]);

    [Fact]
    public void Faults_lists_every_curve_that_cannot_be_used_and_why() =>
        Assert.Equal([
            ("BEFORE", "its factor 'T1' has a tenor of -1 years, expected a number from 0 on"),
            ("MIXED", "its factor 'M1' is of class rate and 'M2' of class credit"),
            ("NO-TENOR", "its factor 'N2' has no tenor_years"),
            ("TWICE", "its factors 'D1' and 'D2' have the same tenor of 2 years"),
            ("TWO", "its factor 'C2' is in EUR and 'C3' in USD")], s_curves.Faults);

    [Theory]
    [InlineData("USD", UnpricedReason.UnknownFactor, "its curve 'USD' is not in factors.csv")]
    [InlineData("eur", UnpricedReason.UnknownFactor, "its curve 'eur' is not in factors.csv")]
    [InlineData("E1", UnpricedReason.UnknownFactor, "its curve 'E1' is not in factors.csv")]
    [InlineData("TWICE", UnpricedReason.NotModelled, "its curve 'TWICE' is no curve: its factors 'D1' and 'D2' have the same tenor of 2 years")]
    [InlineData("BANK", UnpricedReason.NotModelled, "its curve 'BANK' is of class credit, expected rate")]
    [InlineData("VOL", UnpricedReason.NotModelled, "its curve 'VOL' is of class vol, expected rate")]
    public void Rates_says_why_a_curve_cannot_be_had(string name, UnpricedReason reason, string clause) =>
        Assert.Equal(new Unpriced(reason, clause), s_curves.Rates(RateTerm.From(name), "curve", "EUR", out _));

    [Fact]
    public void Rates_holds_the_currency_where_one_is_asked_for_and_one_is_given()
    {
        Assert.Equal(new Unpriced(UnpricedReason.CurrencyMismatch, "its currency is USD but its carry 'EUR' is in EUR"), s_curves.Rates(RateTerm.From("EUR"), "carry", "USD", out _));
        Assert.Null(s_curves.Rates(RateTerm.From("EUR"), "carry", null, out _));
        Assert.Null(s_curves.Rates(RateTerm.From("OPEN"), "curve", "USD", out _));
    }

    [Fact]
    public void ExponentOf_asks_a_curve_and_a_number_alike()
    {
        Assert.Null(s_curves.ExponentOf(RateTerm.From("EUR"), "curve", "EUR", 3, out var curve));
        Assert.Equal(LinearForm.Of(0, 1.5, 1, 1.5), curve);
        Assert.Null(s_curves.ExponentOf(RateTerm.Of(0.04), "curve", "EUR", 3, out var flat));
        Assert.Equal(LinearForm.Of(0.12), flat);
        Assert.NotNull(s_curves.ExponentOf(RateTerm.From("NONE"), "curve", "EUR", 3, out _));
    }

    [Fact]
    public void Rates_of_a_number_beyond_reason_is_a_reason_and_no_exception()
    {
        Assert.Equal("its carry of 1E+300 is no rate, expected a decimal of at most 1000 in size", s_curves.Rates(RateTerm.Of(1e300), "carry", null, out _)!.Clause);
        Assert.NotNull(s_curves.Spreads(RateTerm.Of(double.NaN), "spread", null, out _));
    }

    [Fact]
    public void Spreads_reads_a_number_a_factor_and_a_curve()
    {
        Assert.Null(s_curves.Spreads(RateTerm.Of(0.01), "spread", "EUR", out var flat));
        Assert.Null(s_curves.Spreads(RateTerm.From("S5"), "spread", "EUR", out var factor));
        Assert.Null(s_curves.Spreads(RateTerm.From("BANK"), "spread", "EUR", out var curve));
        Assert.Equal((LinearForm.Of(0.03), LinearForm.Of(13, 3), LinearForm.Of(12, 1.5, 13, 1.5)), (flat.ExponentAt(3), factor.ExponentAt(3), curve.ExponentAt(3)));
        // A factor comes before the curve of its name.
        Assert.Null(s_curves.Spreads(RateTerm.From("OPEN"), "spread", "EUR", out var both));
        Assert.Equal(LinearForm.Of(16, 3), both.ExponentAt(3));
    }

    [Theory]
    [InlineData("EQ", UnpricedReason.NotModelled, "its spread 'EQ' is of class equity, expected credit or rate")]
    [InlineData("VOL", UnpricedReason.NotModelled, "its spread 'VOL' is of class vol, expected credit or rate")]
    [InlineData("NONE", UnpricedReason.UnknownFactor, "its spread 'NONE' is not in factors.csv")]
    public void Spreads_says_why_a_spread_cannot_be_had(string name, UnpricedReason reason, string clause) =>
        Assert.Equal(new Unpriced(reason, clause), s_curves.Spreads(RateTerm.From(name), "spread", "EUR", out _));

    [Fact]
    public void Volatilities_says_why_a_curve_cannot_be_had()
    {
        Assert.Equal(new Unpriced(UnpricedReason.NotModelled, "its volatility 'EUR' is of class rate, expected vol"), s_curves.Volatilities(new(null, "EUR"), out _));
        Assert.Equal(new Unpriced(UnpricedReason.UnknownFactor, "its volatility 'NONE' is not in factors.csv"), s_curves.Volatilities(new(null, "NONE"), out _));
    }

    // Hull: forward exchange rates of 0.7206 and 0.6453; a forward struck there is worth nothing.
    [Theory]
    [InlineData("FXF-1", 0.75, 0.01, 0.03)]
    [InlineData("FXF-2", 0.62, 0.07, 0.05)]
    public void ExponentOf_both_rates_gives_the_textbook_forward_exchange_rate(string id, double spot, double domestic, double foreign)
    {
        Assert.Null(s_curves.ExponentOf(RateTerm.From("EUR"), "curve", "EUR", 2, out var rate));
        Assert.Null(s_curves.ExponentOf(RateTerm.Of(foreign), "carry", "USD", 2, out var carry));
        double[] levels = [domestic, domestic];
        var (expected, tolerance) = RateData.Example(id);
        Assert.Equal(0, new ExponentialFlow(spot, carry).ValueAt(levels) - new ExponentialFlow(expected, rate).ValueAt(levels), tolerance);
    }
}
