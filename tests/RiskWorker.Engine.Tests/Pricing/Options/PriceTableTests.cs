using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Paths;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Pricing.Options;

/// <summary>Tables against the method that they were made from, at points of their range that they do not go through.</summary>
public sealed class PriceTableTests
{
    private const double Spot0 = 100;

    // A random point may lie a little farther off than the worst of those that a table looked at.
    private const double Slack = 2;

    public static TheoryData<string> Names => [.. s_cases.Keys];

    private static readonly Dictionary<string, (NumericFormula Formula, MarketRange Range, double Most)> s_cases = new()
    {
        ["put, boundary inside"] = (new AmericanFormula(100, 1, false), Box(0.3), 2e-5),
        ["put, boundary inside a wide range"] = (new AmericanFormula(100, 1, false), Box(0.6), 2e-5),
        ["put, boundary outside"] = (new AmericanFormula(60, 1, false), Box(0.2), 2e-5),
        ["put, exercised everywhere"] = (new AmericanFormula(300, 1, false), Box(0.3), 2e-5),
        ["put without rate, never exercised early"] = (new AmericanFormula(100, 1, false), Box(0.3, r: 0), 2e-5),
        ["put of five days"] = (new AmericanFormula(100, 0.02, false), Box(0.3, 0.0006, 0.0002, 0.03), 2e-5),
        ["put on its last day"] = (new AmericanFormula(104, 0, false), Box(0.3, 0, 0, 0), 1e-6),
        ["call with a yield"] = (new AmericanFormula(95, 1, true), Box(0.4, 0.02, 0.05, 0.25), 2e-5),
        ["call without a yield"] = (new AmericanFormula(95, 1, true), Box(0.4, 0.02, 0, 0.25), 2e-5),
        ["put, deviation moving"] = (new AmericanFormula(100, 1, false), Box(0.3) with { Deviation = new(0.2, 0.08) }, 2e-5),
        ["put, rate moving"] = (new AmericanFormula(100, 1, false), Box(0.3) with { Discount = new(0.03, 0.008) }, 2e-5),
        ["put, rate and deviation moving"] = (new AmericanFormula(100, 1, false), Box(0.3) with { Discount = new(0.03, 0.008), Deviation = new(0.2, 0.06) }, 5e-5),
        ["put, rate moving through zero"] = (new AmericanFormula(100, 1, false), Box(0.3) with { Discount = new(0.002, 0.008) }, 5e-2),
        ["call, all moving"] = (new AmericanFormula(100, 1, true), Box(0.2) with { Discount = new(0.02, 0.004), Carry = new(0.05, 0.004), Deviation = new(0.2, 0.04) }, 1e-3),
        ["monthly average"] = (Average(6, 0.5, 0, 0), Box(0.12, 0.015, 0.005, 0.14), 1e-3),
        ["average of five days"] = (Average(5, 0.02, 0, 0), Box(0.1, 0.0006, 0.0002, 0.028), 1e-3),
        ["average with a past"] = (Average(3, 0.25, 297, 3), Box(0.12, 0.0075, 0.0025, 0.1), 1e-3),
        ["continuous lookback at the lowest"] = (Lookback(1, null, 95, true), Box(0.3), 1e-4),
        ["continuous lookback at a strike"] = (Lookback(1, 100, 105, true), Box(0.3), 1e-4),
        ["daily lookback"] = (Lookback(15, 100, 105, true), Box(0.15, 0.001, 0.0005, 0.05), 5e-3),
    };

    [Theory]
    [MemberData(nameof(Names))]
    public void Value_at_random_points_is_the_pricer_s_within_the_stated_error(string name)
    {
        var (formula, range, most) = s_cases[name];
        var (table, numbers) = (PriceTable.Build(formula, Spot0, range), new SeededNumbers(501));
        Assert.InRange(table.Error, 0, most);
        for (var s = 0; s < (formula is PathFormula ? 8 : 60); s++)
        {
            var point = PointOf(numbers, range);
            Assert.Equal(formula.Value(point), table.Value(point), (Slack * table.Error) + 1e-9);
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Accumulate_gives_the_bits_of_the_value_outside_the_range_too(string name)
    {
        var (formula, range, _) = s_cases[name];
        var (table, numbers) = (PriceTable.Build(formula, Spot0, range), new SeededNumbers(502));
        MarketPoint[] points = [.. Enumerable.Range(0, 601).Select(_ => PointOf(numbers, range))];
        // Beyond the range in every input, and not a number.
        var edge = new MarketPoint(range.X.High, Spot0 * Exponential.Of(range.X.High), range.Discount.High, range.Carry.High, range.Deviation.High);
        points[0] = edge;
        points[3] = edge with { X = edge.X * 1.01, Spot = Spot0 * Exponential.Of(edge.X * 1.01) };
        points[300] = points[300] with { Discount = range.Discount.High + 0.001 };
        points[301] = points[301] with { Carry = range.Carry.Low - 0.001 };
        points[302] = points[302] with { Deviation = range.Deviation.High + 0.001 };
        points[600] = points[600] with { X = double.NaN, Spot = double.NaN };
        foreach (var length in new[] { 601, 0, 1, 7, 256, 300 })
        {
            var profit = numbers.Between(-5, 5, length);
            double[] expected = [.. profit.Zip(points, (before, point) => Math.FusedMultiplyAdd(-3.5, table.Value(point) - 1.25, before))];
            table.Accumulate(SpansOf(points[..length]), -3.5, 1.25, profit);
            BitAssert.Equal(expected, profit, name);
        }
        BitAssert.Equal(formula.Value(points[3]), table.Value(points[3]));
        BitAssert.Equal(formula.Value(points[302]), table.Value(points[302]));
    }

    [Fact]
    public void Value_beyond_the_exercise_boundary_is_exercise_itself()
    {
        var (formula, range) = (new AmericanFormula(100, 1, false), Box(0.4));
        var (table, boundary) = (PriceTable.Build(formula, Spot0, range), formula.ExerciseSpot(0.03, 0.01, 0.2)!.Value);
        Assert.InRange(boundary, 70, 95);
        for (var spot = 68.0; spot < boundary; spot += 0.5)
            BitAssert.Equal(100 - spot, table.Value(new(Logarithm.Of(spot / Spot0), spot, 0.03, 0.01, 0.2)));
    }

    [Fact]
    public void Build_twice_gives_the_same_numbers()
    {
        foreach (var name in new[] { "put, deviation moving", "monthly average", "continuous lookback at a strike" })
        {
            var (formula, range, _) = s_cases[name];
            double[] first = [.. PriceTable.Build(formula, Spot0, range).Numbers()], second = [.. PriceTable.Build(formula, Spot0, range).Numbers()];
            BitAssert.Equal(first, second, name);
            Assert.Equal(11, first[0]);
            Assert.NotEqual(first, PriceTable.Build(formula, Spot0, range with { X = new(0, range.X.HalfWidth * 1.001) }).Numbers());
        }
    }

    [Fact]
    public void Standard_error_is_the_largest_of_the_pricer_s()
    {
        var (formula, range, _) = s_cases["monthly average"];
        var table = PriceTable.Build(formula, Spot0, range);
        var largest = Enumerable.Range(-12, 25).Max(i => formula.ValueWithError(new(0, Spot0 * Exponential.Of(i / 100.0), 0.015, 0.005, 0.14)).StandardError);
        Assert.InRange(table.StandardError, 0.95 * largest, 1.1 * largest);
        Assert.Equal(0, PriceTable.Build(new AmericanFormula(100, 1, false), Spot0, Box(0.2)).StandardError);
    }

    [Fact]
    public void Lookback_is_cut_where_the_spot_passes_the_extreme()
    {
        var (formula, range) = (Lookback(1, 100, 105, true), Box(0.3));
        Assert.Equal(105, formula.Kink);
        Assert.Equal(2, PriceTable.Build(formula, Spot0, range).Degrees.Count);
        Assert.Single(PriceTable.Build(formula, Spot0, range with { X = new(-0.2, 0.1) }).Degrees);
    }

    [Fact]
    public void Build_of_a_faulty_range_is_refused()
    {
        var formula = new AmericanFormula(100, 1, false);
        Assert.Throws<ArgumentOutOfRangeException>(() => PriceTable.Build(formula, 0, Box(0.3)));
        Assert.Throws<ArgumentOutOfRangeException>(() => PriceTable.Build(formula, Spot0, Box(0)));
        Assert.Throws<ArgumentOutOfRangeException>(() => PriceTable.Build(formula, Spot0, Box(0.3) with { Carry = new(double.NaN, 0) }));
        Assert.Throws<ArgumentOutOfRangeException>(() => PriceTable.Build(formula, Spot0, Box(0.3) with { Discount = new(0, -1) }));
    }

    private static MarketRange Box(double x, double r = 0.03, double q = 0.01, double w = 0.2) => new(new(0, x), new(r, 0), new(q, 0), new(w, 0));

    private static PathFormula Average(int fixings, double years, double sum, int past) => new(7, years,
        (rate, yield) => ArithmeticAsianPayoff.OfFixings(PathSchedule.Flat([.. Enumerable.Range(1, fixings).Select(i => i * years / fixings)], rate, yield, years), past, sum, 100, true), [1]);

    private static PathFormula Lookback(int looks, double? strike, double extreme, bool isCall)
    {
        var (isContinuous, years) = (looks == 1, looks == 1 ? 1 : looks / 252.0);
        return new(7, years,
            (rate, yield) => new LookbackPayoff(PathSchedule.Flat([.. Enumerable.Range(1, looks).Select(i => i * years / looks)], rate, yield, years), isContinuous, strike, extreme, isCall), [3],
            strike is { } k ? Math.Max(k, extreme) : extreme);
    }

    private static MarketPoint PointOf(SeededNumbers numbers, MarketRange range)
    {
        double In(InputRange input) => numbers.Between(input.Centre - input.HalfWidth, input.Centre + input.HalfWidth);
        var x = In(range.X);
        return new(x, Spot0 * Exponential.Of(x), In(range.Discount), In(range.Carry), In(range.Deviation));
    }

    private static MarketSpans SpansOf(MarketPoint[] points) => new(
        Row(points, p => p.X), Row(points, p => p.Spot), Row(points, p => p.Discount), Row(points, p => p.Carry), Row(points, p => p.Deviation));

    private static double[] Row(MarketPoint[] points, Func<MarketPoint, double> of) => [.. points.Select(of)];
}
