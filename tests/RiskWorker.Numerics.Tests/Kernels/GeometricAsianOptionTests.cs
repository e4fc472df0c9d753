using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class GeometricAsianOptionTests
{
    private const double Precision = 6e-16;

    // mpmath at 120 digits (Data/README.md). A value is held to the levels of spot and strike.
    [Fact]
    public void Value_seeded_terms_are_within_the_stated_error()
    {
        int rows = 0;
        foreach (ClosedFormReference row in ClosedFormReference.Rows("geometric-reference.csv"))
        {
            double error = row.ErrorOf(GeometricAsianOption.Value(Terms(row), row.At));
            Assert.True(error <= Precision * row.Levels, $"{row}: error {error / row.Levels:R} of the levels.");
            rows++;
        }

        Assert.Equal(300, rows);
    }

    // Kemna and Vorst's closed form, and that of equal fixings (Data/README.md).
    [Fact]
    public void Value_worked_examples_are_reproduced()
    {
        ClosedFormExample[] rows = [.. ClosedFormExample.Rows("GEO-")];
        Assert.Equal(["GEO-01", "GEO-D12", "GEO-D252", "GEO-02"], rows.Select(row => row.Id));
        foreach (ClosedFormExample row in rows)
        {
            bool isCall = row.Topic.Contains("call", StringComparison.Ordinal);
            int fixings = row.Id switch { "GEO-D12" => 12, "GEO-D252" => 252, _ => 0 };
            GeometricAsianTerms terms = fixings == 0
                ? GeometricAsianTerms.Continuous(row["S"], row["K"], row["T"], 0, double.NaN, isCall)
                : GeometricAsianTerms.Discrete(row["S"], row["K"], row["T"], [.. Enumerable.Range(1, fixings).Select(i => row["T"] * i / fixings)], [], isCall);
            row.AssertIs(GeometricAsianOption.Value(terms, row.Today), 1e-10);
        }
    }

    [Fact]
    public void Value_one_fixing_at_expiry_is_the_plain_option()
    {
        MarketSpans market = MarketBlock.Seeded(100, 100, 1000).Spans;
        for (int s = 0; s < market.Length; s++)
        {
            foreach (bool isCall in new[] { true, false })
                Assert.Equal(MovedOption.Value(new(100, 103, isCall), market[s]), GeometricAsianOption.Value(GeometricAsianTerms.Discrete(100, 103, 2, [2], [], isCall), market[s]), 2e-13);
        }
    }

    [Fact]
    public void Value_many_fixings_approach_the_continuous_average()
    {
        MarketPoint at = MarketBlock.Point(0.05, 100, 0.03, 0.01, 0.25);
        foreach ((double start, double[] past) in new[] { (0.0, Array.Empty<double>()), (-1.0, [.. Enumerable.Repeat(97.0, 20_000)]), (0.4, []) })
        {
            double[] open = [.. Enumerable.Range(0, 20_000).Select(i => Math.Max(start, 0) + ((1 - Math.Max(start, 0)) * (i + 0.5) / 20_000))];
            double continuous = GeometricAsianOption.Value(GeometricAsianTerms.Continuous(100, 99, 1, start, 97, true), at);
            Assert.Equal(continuous, GeometricAsianOption.Value(GeometricAsianTerms.Discrete(100, 99, 1, open, past, true), at), 1e-7);
        }
    }

    [Fact]
    public void Value_every_fixing_past_is_the_discounted_payoff()
    {
        MarketPoint at = MarketBlock.Point(0.2, 100, 0.03, 0.01, 0.25);
        double average = Math.Pow(90 * 100 * 120, 1 / 3.0);
        Assert.Equal((average - 95) * Math.Exp(-0.03), GeometricAsianOption.Value(GeometricAsianTerms.Discrete(100, 95, 1, [], [90, 100, 120], true), at), 1e-13);
        Assert.Equal(0.0, GeometricAsianOption.Value(GeometricAsianTerms.Discrete(100, 95, 1, [], [90, 100, 120], false), at));
        // The last fixing is the scenario's own level, today.
        double withSpot = Math.Pow(90 * 100 * at.Spot, 1 / 3.0);
        Assert.Equal(withSpot - 95, GeometricAsianOption.Value(GeometricAsianTerms.Discrete(100, 95, 0, [0], [90, 100], true), at with { Discount = 0, Carry = 0, Deviation = 0 }), 1e-13);
    }

    // E[G] from the first two moments of ln G is what call less put is worth.
    [Fact]
    public void Value_call_less_put_is_the_discounted_mean_less_strike()
    {
        MarketPoint at = MarketBlock.Point(0.05, 100, 0.03, 0.01, 0.25);
        double w2 = 0.25 * 0.25, mean = Math.Exp((Math.Log(at.Spot) * 0.5) + (Math.Log(97) * 0.5) + (0.25 * (0.02 - (w2 / 2))) + (w2 / 24));
        double call = GeometricAsianOption.Value(GeometricAsianTerms.Continuous(100, 99, 1, -1, 97, true), at);
        double put = GeometricAsianOption.Value(GeometricAsianTerms.Continuous(100, 99, 1, -1, 97, false), at);
        Assert.Equal((mean - 99) * Math.Exp(-0.03), call - put, 1e-12);
    }

    [Fact]
    public void Value_scales_with_spot_strike_and_past()
    {
        MarketPoint at = MarketBlock.Point(0.05, 100, 0.03, 0.01, 0.25), larger = MarketBlock.Point(0.05, 400, 0.03, 0.01, 0.25);
        Assert.Equal(
            4 * GeometricAsianOption.Value(GeometricAsianTerms.Discrete(100, 99, 1, [0.2, 0.7], [95], true), at),
            GeometricAsianOption.Value(GeometricAsianTerms.Discrete(400, 396, 1, [0.2, 0.7], [380], true), larger));
    }

    [Fact]
    public void AccumulateValue_every_length_and_odd_scenario_equals_the_scalar_form()
    {
        GeometricAsianTerms[] kinds =
        [
            GeometricAsianTerms.Continuous(100, 103, 1, 0, 0, true), GeometricAsianTerms.Continuous(100, 103, 1, -0.5, 98, false),
            GeometricAsianTerms.Discrete(100, 103, 1, [], [99], true), GeometricAsianTerms.Discrete(100, 103, 0, [0], [99], false),
        ];
        foreach (GeometricAsianTerms terms in kinds)
        {
            MarketBlock.AssertLanesEqualTwin(
                100,
                (in MarketSpans market, double quantity, double baseValue, Span<double> profit) => GeometricAsianOption.AccumulateValue(terms, market, quantity, baseValue, profit),
                (in MarketPoint at, double quantity, double baseValue, double profit) => GeometricAsianOption.Profit(terms, at, quantity, baseValue, profit));
        }
    }

    [Fact]
    public void Value_not_a_number_stays_one()
    {
        foreach (double start in new[] { -0.5, 0, 0.5 })
            MarketBlock.AssertNaNStays((in MarketPoint at, double quantity, double baseValue, double profit) => GeometricAsianOption.Profit(GeometricAsianTerms.Continuous(100, 103, 1, start, 99, true), at, quantity, baseValue, profit));
    }

    [Fact]
    public void AccumulateValue_faulty_spans_are_refused() => MarketBlock.AssertFaultySpansAreRefused(
        (in MarketSpans market, double quantity, double baseValue, Span<double> profit) =>
            GeometricAsianOption.AccumulateValue(GeometricAsianTerms.Continuous(100, 100, 1, 0, 0, true), market, quantity, baseValue, profit));

    [Fact]
    public void Terms_faulty_ones_are_refused_by_name()
    {
        Assert.Throws<ArgumentException>("fixingYears", () => GeometricAsianTerms.Discrete(100, 100, 1, [], [], true));
        Assert.Throws<ArgumentException>("fixingYears", () => GeometricAsianTerms.Discrete(100, 100, 1, [0.5, 0.4], [], true));
        Assert.Throws<ArgumentException>("fixingYears", () => GeometricAsianTerms.Discrete(100, 100, 1, [1.1], [], true));
        Assert.Throws<ArgumentException>("fixingYears", () => GeometricAsianTerms.Discrete(100, 100, 1, [double.NaN], [], true));
        Assert.Throws<ArgumentException>("fixingYears", () => GeometricAsianTerms.Discrete(100, 100, 1, [-0.1], [], true));
        Assert.Throws<ArgumentOutOfRangeException>("pastFixings", () => GeometricAsianTerms.Discrete(100, 100, 1, [1], [0], true));
        Assert.Throws<ArgumentOutOfRangeException>("strike", () => GeometricAsianTerms.Discrete(100, 0, 1, [1], [], true));
        Assert.Throws<ArgumentOutOfRangeException>("spot0", () => GeometricAsianTerms.Continuous(0, 100, 1, 0, 0, true));
        Assert.Throws<ArgumentOutOfRangeException>("years", () => GeometricAsianTerms.Continuous(100, 100, -1, 0, 0, true));
        Assert.Throws<ArgumentOutOfRangeException>("startYears", () => GeometricAsianTerms.Continuous(100, 100, 1, 1.5, 0, true));
        Assert.Throws<ArgumentOutOfRangeException>("pastAverage", () => GeometricAsianTerms.Continuous(100, 100, 1, -1, 0, true));
    }

    [Fact]
    public void CopyTo_tells_different_terms_apart()
    {
        GeometricAsianTerms[] terms =
        [
            GeometricAsianTerms.Continuous(100, 100, 1, 0, 0, true), GeometricAsianTerms.Continuous(100, 100, 1, 0, 0, false), GeometricAsianTerms.Continuous(100, 100, 1, 0.5, 0, true),
            GeometricAsianTerms.Continuous(100, 100, 1, -1, 100, true), GeometricAsianTerms.Continuous(100, 100, 1, -1, 101, true), GeometricAsianTerms.Discrete(100, 100, 1, [1], [], true),
        ];
        var seen = terms.Select(t =>
        {
            double[] numbers = new double[GeometricAsianTerms.NumberCount];
            t.CopyTo(numbers);
            return string.Join(' ', numbers);
        });
        Assert.Equal(terms.Length, seen.Distinct().Count());
    }

    private static GeometricAsianTerms Terms(ClosedFormReference row)
    {
        bool isCall = row.Name == "call";
        return row.Terms[3].Length > 0
            ? GeometricAsianTerms.Continuous(row.Spot0, row.Strike, row.Number(0), row.Number(3), row.Number(4), isCall)
            : GeometricAsianTerms.Discrete(row.Spot0, row.Strike, row.Number(0), Numbers(row.Terms[1]), Numbers(row.Terms[2]), isCall);
    }

    private static double[] Numbers(string text) => text.Length == 0 ? [] : [.. text.Split(';').Select(Table.Number)];
}
