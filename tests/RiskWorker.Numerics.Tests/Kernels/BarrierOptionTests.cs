using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class BarrierOptionTests
{
    private const double Precision = 3e-16;

    /// <summary>Call, up, in.</summary>
    public static TheoryData<bool, bool, bool> Kinds
    {
        get
        {
            var kinds = new TheoryData<bool, bool, bool>();
            for (int i = 0; i < 8; i++)
                kinds.Add((i & 1) == 0, (i & 2) == 0, (i & 4) == 0);
            return kinds;
        }
    }

    // mpmath at 120 digits (Data/README.md): every fifth row has a negative rate that leaves the rebate's exponent without a real value.
    [Fact]
    public void Value_seeded_terms_are_within_the_stated_error()
    {
        int rows = 0;
        foreach (ClosedFormReference row in ClosedFormReference.Rows("barrier-reference.csv"))
        {
            double barrier = row.Number(0), rebate = row.Number(1);
            var terms = new BarrierOptionTerms(
                row.Spot0, row.Strike, barrier, row.Name.EndsWith("call", StringComparison.Ordinal), row.Name.StartsWith("up", StringComparison.Ordinal),
                row.Name.Contains("-in-", StringComparison.Ordinal), rebate, row.Number(2), row.Number(3));
            double conditioning = row.Conditioning + (Math.Abs(Math.Log(row.Spot0 / barrier)) / row.At.Deviation);
            double error = row.ErrorOf(BarrierOption.Value(terms, row.At)) / (row.Levels + rebate);
            Assert.True(error <= Precision * conditioning, $"{row}: error {error / conditioning:R}.");
            Assert.True(error <= 6e-16 || row.At.Deviation < 0.05, $"{row}: error {error:R}.");
            rows++;
        }

        Assert.Equal(300, rows);
    }

    // Haug, The Complete Guide to Option Pricing Formulas (2007), table 4-13; printed figures from memory (Data/README.md).
    [Fact]
    public void Value_textbook_examples_are_reproduced()
    {
        int rows = 0;
        foreach (ClosedFormExample row in ClosedFormExample.Rows("BAR-").Where(row => !row.Id.StartsWith("BAR-PAR", StringComparison.Ordinal)))
        {
            string topic = row.Topic;
            var terms = new BarrierOptionTerms(
                row["S"], row["K"], row["H"], topic.Contains("call", StringComparison.Ordinal), topic.Contains("up-", StringComparison.Ordinal),
                topic.EndsWith("in", StringComparison.Ordinal), row["rebate"]);
            row.AssertIs(BarrierOption.Value(terms, row.Today), 1e-9);
            rows++;
        }

        Assert.Equal(49, rows);
    }

    [Fact]
    public void Value_in_and_out_of_the_examples_add_up_to_the_plain_option()
    {
        ClosedFormExample[] rows = [.. ClosedFormExample.Rows("BAR-PAR")];
        Assert.Equal(2, rows.Length);
        foreach (ClosedFormExample row in rows)
            row.AssertIs(BarrierOption.Value(In(row), row.Today) + BarrierOption.Value(Out(row), row.Today), 1e-10);

        static BarrierOptionTerms In(ClosedFormExample row) => new(row["S"], row["K"], row["H"], true, row["H"] > row["S"], true);
        static BarrierOptionTerms Out(ClosedFormExample row) => new(row["S"], row["K"], row["H"], true, row["H"] > row["S"], false);
    }

    // Broadie, Glasserman and Kou (1997), table 2.1: down-and-out call, 50 looks in 0.2 years (Data/README.md).
    [Fact]
    public void Value_continuous_and_corrected_examples_are_reproduced()
    {
        int rows = 0;
        foreach (ClosedFormExample row in ClosedFormExample.Rows("DBAR-").Where(row => row.Id[5] != 'D'))
        {
            double spacing = row.Id[5] == 'B' ? 0.2 / 50 : 0;
            row.AssertIs(DownOutCall(double.Parse(row.Id[6..], System.Globalization.CultureInfo.InvariantCulture), spacing), 1e-9);
            rows++;
        }

        Assert.Equal(10, rows);
    }

    // How far the correction is from the exact value of looks at intervals, in parts of it; without it the error is 0.2 to 20%.
    [Theory]
    [InlineData("DBAR-D85", 85, 1e-5)]
    [InlineData("DBAR-D91", 91, 4e-5)]
    [InlineData("DBAR-D93", 93, 6e-5)]
    [InlineData("DBAR-D97", 97, 6e-4)]
    public void Value_corrected_barrier_is_close_to_looks_at_intervals(string id, double barrier, double bound)
    {
        double exact = ClosedFormExample.Rows(id).Single().Expected;
        double error = Math.Abs((DownOutCall(barrier, 0.2 / 50) / exact) - 1);
        Assert.True(error <= bound, $"{id}: {error:E2}.");
        Assert.True(error < 0.02 * Math.Abs((DownOutCall(barrier, 0) / exact) - 1), $"{id}: the correction gains little: {error:E2}.");
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Value_in_and_out_add_up_to_the_plain_option(bool isCall, bool isUp, bool isIn)
    {
        MarketSpans market = MarketBlock.Seeded(101, 100, 1000).Spans;
        double barrier = isUp ? 112 : 91;
        for (int s = 0; s < market.Length; s++)
        {
            foreach (double spacing in new[] { 0, 1 / 252.0 })
            {
                double one = BarrierOption.Value(new(100, 103, barrier, isCall, isUp, isIn, 0, 1, spacing), market[s]);
                double other = BarrierOption.Value(new(100, 103, barrier, isCall, isUp, !isIn, 0, 1, spacing), market[s]);
                Assert.Equal(MovedOption.Value(new(100, 103, isCall), market[s]), one + other, 2e-13);
            }
        }
    }

    // One rebate at expiry if never touched, one at expiry if touched: together a bond. The touched one is undone by its rate.
    [Fact]
    public void Value_rebates_of_in_and_out_add_up_to_one_payment_where_nothing_is_discounted()
    {
        MarketSpans market = MarketBlock.Seeded(102, 100, 1000).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            MarketPoint at = market[s] with { Discount = 0 };
            foreach (bool isUp in new[] { true, false })
            {
                double barrier = isUp ? at.Spot * 1.1 : at.Spot / 1.1;
                double both = Rebate(true) + Rebate(false);
                Assert.Equal(5, both, 1e-12);

                double Rebate(bool isIn) => BarrierOption.Value(new(100, 103, barrier, true, isUp, isIn, 5), at) - BarrierOption.Value(new(100, 103, barrier, true, isUp, isIn), at);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Value_touched_is_the_rebate_or_the_plain_option(bool isCall, bool isUp, bool isIn)
    {
        foreach (double x in new[] { 0, isUp ? 0.2 : -0.2, isUp ? 50.0 : -50 })
        {
            MarketPoint at = MarketBlock.Point(x, 100, 0.02, 0.01, 0.2);
            double value = BarrierOption.Value(new(100, 103, 100, isCall, isUp, isIn, 7, 1, 1 / 252.0), at);
            BitAssert.Equal(isIn ? value : 7, value);
            if (isIn)
                Assert.Equal(MovedOption.Value(new(100, 103, isCall), at), value, 1e-12 * Math.Max(1, at.Spot));
        }
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Value_barrier_out_of_reach_leaves_the_plain_option_and_the_rebate_of_a_knock_in(bool isCall, bool isUp, bool isIn)
    {
        MarketPoint at = MarketBlock.Point(0.02, 100, 0.02, 0.01, 0.2);
        double value = BarrierOption.Value(new(100, 103, isUp ? 1e6 : 1e-2, isCall, isUp, isIn, 7), at);
        Assert.Equal(isIn ? 7 * Math.Exp(-0.02) : MovedOption.Value(new(100, 103, isCall), at), value, 1e-13);
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Value_no_time_left_is_the_payoff(bool isCall, bool isUp, bool isIn)
    {
        foreach (double spot in new[] { 80.0, 95, 103, 108, 130 })
        {
            var at = new MarketPoint(Logarithm.Of(spot / 100), spot, 0, 0, 0);
            double barrier = isUp ? 110 : 92, payoff = Math.Max(isCall ? spot - 103 : 103 - spot, 0);
            bool touched = isUp ? spot >= barrier : spot <= barrier;
            Assert.Equal(touched == isIn ? payoff : 7, BarrierOption.Value(new(100, 103, barrier, isCall, isUp, isIn, 7), at), 1e-13);
        }
    }

    // Without volatility the path is the forward's: it rises from 100 by 10% and touches 105 after ln 1.05 of its 0.1.
    [Fact]
    public void Value_no_volatility_is_the_value_along_the_forward()
    {
        var at = new MarketPoint(0, 100, 0.1, 0, 0);
        double touch = Math.Log(1.05) / 0.1;
        Assert.Equal(7 * Math.Exp(-0.1 * touch), BarrierOption.Value(new(100, 90, 105, true, true, false, 7), at), 1e-12);
        Assert.Equal(100 - (90 * Math.Exp(-0.1)), BarrierOption.Value(new(100, 90, 105, true, true, true, 7), at), 1e-12);
        Assert.Equal(100 - (90 * Math.Exp(-0.1)), BarrierOption.Value(new(100, 90, 120, true, true, false, 7), at), 1e-12);
        Assert.Equal(7 * Math.Exp(-0.1), BarrierOption.Value(new(100, 90, 120, true, true, true, 7), at), 1e-12);
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Value_scales_with_spot_strike_barrier_and_rebate(bool isCall, bool isUp, bool isIn)
    {
        MarketSpans market = MarketBlock.Seeded(103, 100, 500).Spans;
        double barrier = isUp ? 112 : 91;
        for (int s = 0; s < market.Length; s++)
        {
            double value = BarrierOption.Value(new(100, 103, barrier, isCall, isUp, isIn, 3), market[s]);
            Assert.Equal(8 * value, BarrierOption.Value(new(800, 824, 8 * barrier, isCall, isUp, isIn, 24), market[s] with { Spot = 8 * market[s].Spot }));
        }
    }

    [Fact]
    public void Value_of_a_knock_out_falls_as_its_barrier_comes_nearer_and_lies_between_nothing_and_the_plain_option()
    {
        MarketPoint at = MarketBlock.Point(0.01, 100, 0.03, 0.01, 0.25);
        foreach (bool isCall in new[] { true, false })
        {
            double plain = MovedOption.Value(new(100, 103, isCall), at), before = plain;
            for (double barrier = 50; barrier < 101.5; barrier += 0.5)
            {
                double value = BarrierOption.Value(new(100, 103, barrier, isCall, false, false), at);
                Assert.InRange(value, 0, before + 1e-13);
                before = value;
            }
        }
    }

    [Fact]
    public void Value_of_a_down_and_out_call_rises_with_the_spot()
    {
        double before = 0;
        for (double x = -0.2; x < 0.5; x += 0.005)
        {
            double value = BarrierOption.Value(new(100, 103, 90, true, false, false), MarketBlock.Point(x, 100, 0.03, 0.01, 0.25));
            Assert.True(value >= before - 1e-13);
            before = value;
        }
    }

    // The exponent of the hit's rebate has no real value below -rT = m²/2; the value passes there without a step.
    [Fact]
    public void Value_rebate_is_continuous_where_its_exponent_turns_imaginary()
    {
        const double W = 0.2, M = -0.05;
        double Value(double discount) => BarrierOption.Value(new(100, 1e9, 90, true, false, false, 5), new(0, 100, discount, discount - (W * (M + (W / 2))), W));
        double edge = -M * M / 2;
        Assert.Equal(Value(edge * (1 - 1e-9)), Value(edge * (1 + 1e-9)), 1e-11);
        Assert.True(Value(2 * edge) > Value(edge));
    }

    [Fact]
    public void Value_rate_beyond_the_reach_of_the_rebate_is_not_a_number()
    {
        var at = new MarketPoint(0, 100, -3, -3, 0.2);
        Assert.True(double.IsNaN(BarrierOption.Value(new(100, 103, 90, true, false, false, 5), at)));
        Assert.False(double.IsNaN(BarrierOption.Value(new(100, 103, 90, true, false, false), at)));
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void AccumulateValue_every_length_and_odd_scenario_equals_the_scalar_form(bool isCall, bool isUp, bool isIn)
    {
        foreach (double barrier in isUp ? [101.0, 120] : new[] { 99.0, 85 })
        {
            foreach (double rebate in new[] { 0.0, 3 })
            {
                foreach (double spacing in new[] { 0, 1 / 252.0 })
                {
                    var terms = new BarrierOptionTerms(100, 103, barrier, isCall, isUp, isIn, rebate, 1, spacing);
                    MarketBlock.AssertLanesEqualTwin(
                        100,
                        (in MarketSpans market, double quantity, double baseValue, Span<double> profit) => BarrierOption.AccumulateValue(terms, market, quantity, baseValue, profit),
                        (in MarketPoint at, double quantity, double baseValue, double profit) => BarrierOption.Profit(terms, at, quantity, baseValue, profit));
                }
            }
        }
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Value_not_a_number_stays_one(bool isCall, bool isUp, bool isIn)
    {
        foreach (double rebate in new[] { 0.0, 3 })
        {
            var terms = new BarrierOptionTerms(100, 103, isUp ? 120 : 80, isCall, isUp, isIn, rebate, 1, 0.004);
            MarketBlock.AssertNaNStays((in MarketPoint at, double quantity, double baseValue, double profit) => BarrierOption.Profit(terms, at, quantity, baseValue, profit));
        }
    }

    [Fact]
    public void AccumulateValue_faulty_spans_are_refused() => MarketBlock.AssertFaultySpansAreRefused(
        (in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
            BarrierOption.AccumulateValue(new(100, 100, 90, true, false, false), market, quantity, baseValue, profit));

    [Theory]
    [InlineData(0, 100, 90, 0, 1, 0, "spot0")]
    [InlineData(100, 0, 90, 0, 1, 0, "strike")]
    [InlineData(100, 100, 0, 0, 1, 0, "barrier")]
    [InlineData(100, 100, 90, -1, 1, 0, "rebate")]
    [InlineData(100, 100, 90, 0, -1, 0, "years")]
    [InlineData(100, 100, 90, 0, 1, double.NaN, "observationSpacing")]
    public void New_faulty_term_is_refused_by_name(double spot0, double strike, double barrier, double rebate, double years, double spacing, string name) =>
        Assert.Throws<ArgumentOutOfRangeException>(name, () => new BarrierOptionTerms(spot0, strike, barrier, true, false, false, rebate, years, spacing));

    [Fact]
    public void CopyTo_tells_different_terms_apart()
    {
        BarrierOptionTerms[] terms =
        [
            new(100, 100, 90, true, false, false), new(100, 100, 90, false, false, false), new(100, 100, 90, true, true, false), new(100, 100, 90, true, false, true),
            new(100, 101, 90, true, false, false), new(100, 100, 91, true, false, false), new(101, 100, 90, true, false, false), new(100, 100, 90, true, false, false, 1),
            new(100, 100, 90, true, false, false, 0, 1, 0.1),
        ];
        var seen = terms.Select(t =>
        {
            double[] numbers = new double[BarrierOptionTerms.NumberCount];
            t.CopyTo(numbers);
            return string.Join(' ', numbers);
        });
        Assert.Equal(terms.Length, seen.Distinct().Count());
    }

    private static double DownOutCall(double barrier, double spacing) =>
        BarrierOption.Value(new(100, 100, barrier, true, false, false, 0, 0.2, spacing), new(0, 100, 0.02, 0, 0.3 * Math.Sqrt(0.2)));
}
