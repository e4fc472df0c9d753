using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class DigitalOptionTests
{
    private const double Precision = 3e-16;

    public static TheoryData<bool, bool> Kinds => new() { { true, true }, { true, false }, { false, true }, { false, false } };

    // mpmath at 120 digits (Data/README.md).
    [Fact]
    public void Value_seeded_terms_are_within_the_stated_error()
    {
        int rows = 0;
        foreach (ClosedFormReference row in ClosedFormReference.Rows("moved-reference.csv").Where(row => !row.Name.StartsWith("plain", StringComparison.Ordinal)))
        {
            bool paysAsset = row.Name.StartsWith("asset", StringComparison.Ordinal);
            double level = paysAsset ? row.At.Spot * Math.Exp(-row.At.Carry) : Math.Exp(-row.At.Discount);
            double error = row.ErrorOf(DigitalOption.Value(Terms(row.Spot0, row.Strike, 1, row.Name.EndsWith("call", StringComparison.Ordinal), paysAsset), row.At));
            Assert.True(error <= Precision * level * row.Conditioning, $"{row}: error {error / level / row.Conditioning:R}.");
            rows++;
        }

        Assert.Equal(200, rows);
    }

    // Haug, The Complete Guide to Option Pricing Formulas (2007), chapter 4; printed figures from memory (Data/README.md).
    [Fact]
    public void Value_textbook_examples_are_reproduced()
    {
        ClosedFormExample[] rows = [.. ClosedFormExample.Rows("DIG-")];
        Assert.Equal(["DIG-01", "DIG-02", "DIG-03"], rows.Select(row => row.Id));
        rows[0].AssertIs(DigitalOption.Value(Terms(rows[0]["S"], rows[0]["K"], rows[0]["cash"], false, false), rows[0].Today), 1e-10);
        rows[1].AssertIs(DigitalOption.Value(Terms(rows[1]["S"], rows[1]["K"], 0, false, true), rows[1].Today), 1e-10);
        // A gap call that pays S - K2 above K1 is the asset above K1 less K2 in cash above it.
        double asset = DigitalOption.Value(Terms(rows[2]["S"], rows[2]["K1"], 0, true, true), rows[2].Today);
        rows[2].AssertIs(asset - DigitalOption.Value(Terms(rows[2]["S"], rows[2]["K1"], rows[2]["K2"], true, false), rows[2].Today), 1e-10);
    }

    [Fact]
    public void Value_call_and_put_add_up_to_the_payment()
    {
        MarketSpans market = MarketBlock.Seeded(97, 100, 2000).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            double cash = DigitalOption.Value(Terms(100, 103, 7, true, false), market[s]) + DigitalOption.Value(Terms(100, 103, 7, false, false), market[s]);
            double asset = DigitalOption.Value(Terms(100, 103, 0, true, true), market[s]) + DigitalOption.Value(Terms(100, 103, 0, false, true), market[s]);
            Assert.Equal(7 * Math.Exp(-market[s].Discount), cash, 1e-14);
            Assert.Equal(market[s].Spot * Math.Exp(-market[s].Carry), asset, 1e-12);
        }
    }

    // A plain option is the asset less the strike in cash.
    [Fact]
    public void Value_asset_less_strike_in_cash_is_the_plain_option()
    {
        MarketSpans market = MarketBlock.Seeded(98, 100, 2000).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            foreach (bool isCall in new[] { true, false })
            {
                double legs = DigitalOption.Value(Terms(100, 103, 0, isCall, true), market[s]) - DigitalOption.Value(Terms(100, 103, 103, isCall, false), market[s]);
                Assert.Equal(MovedOption.Value(new(100, 103, isCall), market[s]), isCall ? legs : -legs, 2e-12);
            }
        }
    }

    // One unit of cash is what the plain call loses for one unit of strike: central differences, error of order step².
    [Fact]
    public void Value_of_cash_is_the_slope_of_the_plain_option_in_its_strike()
    {
        const double Step = 1e-3;
        MarketSpans market = MarketBlock.Seeded(99, 100, 200).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            MarketPoint at = market[s] with { Deviation = market[s].Deviation + 0.05 };
            double slope = (MovedOption.Value(new(100, 103 - Step, true), at) - MovedOption.Value(new(100, 103 + Step, true), at)) / (2 * Step);
            Assert.Equal(slope, DigitalOption.Value(Terms(100, 103, 1, true, false), at), 1e-8);
        }
    }

    [Fact]
    public void Value_no_deviation_pays_all_half_at_the_strike_or_nothing()
    {
        foreach ((double spot, double paid) in new[] { (99.0, 0.0), (100.0, 0.5), (101.0, 1.0) })
        {
            var now = new MarketPoint(Logarithm.Of(spot / 100), spot, 0, 0, 0);
            Assert.Equal(10 * paid, DigitalOption.Value(Terms(100, 100, 10, true, false), now));
            Assert.Equal(10 - (10 * paid), DigitalOption.Value(Terms(100, 100, 10, false, false), now));
            Assert.Equal(spot * paid, DigitalOption.Value(Terms(100, 100, 0, true, true), now));
        }
    }

    [Fact]
    public void Value_of_a_call_rises_with_the_spot()
    {
        double before = 0;
        for (double x = -1; x < 1; x += 0.01)
        {
            double value = DigitalOption.Value(Terms(100, 103, 10, true, false), MarketBlock.Point(x, 100, 0.02, 0.01, 0.2));
            Assert.True(value >= before);
            before = value;
        }
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void AccumulateValue_every_length_and_odd_scenario_equals_the_scalar_form(bool isCall, bool paysAsset)
    {
        DigitalOptionTerms terms = Terms(100, 103, 10, isCall, paysAsset);
        MarketBlock.AssertLanesEqualTwin(
            100,
            (in MarketSpans market, double quantity, double baseValue, Span<double> profit) => DigitalOption.AccumulateValue(terms, market, quantity, baseValue, profit),
            (in MarketPoint at, double quantity, double baseValue, double profit) => DigitalOption.Profit(terms, at, quantity, baseValue, profit));
    }

    [Fact]
    public void Value_not_a_number_stays_one()
    {
        foreach (bool paysAsset in new[] { true, false })
            MarketBlock.AssertNaNStays((in MarketPoint at, double quantity, double baseValue, double profit) => DigitalOption.Profit(Terms(100, 103, 1, true, paysAsset), at, quantity, baseValue, profit));
    }

    [Fact]
    public void AccumulateValue_faulty_spans_are_refused() => MarketBlock.AssertFaultySpansAreRefused(
        (in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
            DigitalOption.AccumulateValue(Terms(100, 100, 1, true, false), market, quantity, baseValue, profit));

    [Theory]
    [InlineData(0, 100, 1, "spot0")]
    [InlineData(100, 0, 1, "strike")]
    [InlineData(100, 100, -1, "cash")]
    [InlineData(100, 100, double.NaN, "cash")]
    public void CashOrNothing_faulty_term_is_refused_by_name(double spot0, double strike, double cash, string name) =>
        Assert.Throws<ArgumentOutOfRangeException>(name, () => DigitalOptionTerms.CashOrNothing(spot0, strike, cash, true));

    [Fact]
    public void CopyTo_tells_different_terms_apart()
    {
        DigitalOptionTerms[] terms = [Terms(100, 100, 1, true, false), Terms(100, 100, 2, true, false), Terms(100, 100, 1, false, false), Terms(100, 99, 1, true, false), Terms(100, 100, 0, true, true), Terms(100, 100, 0, true, false)];
        var seen = terms.Select(t =>
        {
            double[] numbers = new double[DigitalOptionTerms.NumberCount];
            t.CopyTo(numbers);
            return string.Join(' ', numbers);
        });
        Assert.Equal(terms.Length, seen.Distinct().Count());
    }

    private static DigitalOptionTerms Terms(double spot0, double strike, double cash, bool isCall, bool paysAsset) =>
        paysAsset ? DigitalOptionTerms.AssetOrNothing(spot0, strike, isCall) : DigitalOptionTerms.CashOrNothing(spot0, strike, cash, isCall);
}
