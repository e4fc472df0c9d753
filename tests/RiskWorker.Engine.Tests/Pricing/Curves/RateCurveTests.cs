using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

public sealed class RateCurveTests
{
    private static readonly double[] s_tenors = [0.25, 1, 2, 5, 10, 30];
    // Descending places, so that the order of tenors is not that of factors.
    private static readonly Factor[] s_factors = [.. s_tenors.Reverse().Select(t => new Factor($"R{t}", FactorClass.Rate, ShockKind.Normal, "EUR", "EUR", t))];

    private static RateCurve Curve(CurveInterpolation interpolation)
    {
        Assert.Null(new CurveSet(s_factors, interpolation).Rates(RateTerm.From("EUR"), "curve", "EUR", out var curve));
        return curve;
    }

    // The interpolation again, on numbers instead of forms.
    private static double DirectExponent(CurveInterpolation interpolation, double[] levels, double years)
    {
        double[] zeros = [.. levels.Reverse()];
        if (years <= s_tenors[0]) return zeros[0] * years;
        if (years >= s_tenors[^1]) return zeros[^1] * years;
        var k = Array.FindLastIndex(s_tenors, t => t <= years);
        double At(double from, double to) => from + ((to - from) * (years - s_tenors[k]) / (s_tenors[k + 1] - s_tenors[k]));
        return interpolation == CurveInterpolation.LinearZero
            ? years * At(zeros[k], zeros[k + 1])
            : -At(-zeros[k] * s_tenors[k], -zeros[k + 1] * s_tenors[k + 1]);
    }

    [Theory]
    [InlineData(CurveInterpolation.LinearZero)]
    [InlineData(CurveInterpolation.LogLinearDiscount)]
    public void ExponentAt_any_time_equals_direct_interpolation(CurveInterpolation interpolation)
    {
        var (curve, numbers) = (Curve(interpolation), new SeededNumbers(3));
        for (var trial = 0; trial < 2000; trial++)
        {
            var years = trial < s_tenors.Length ? s_tenors[trial] : numbers.Between(0, trial % 2 == 0 ? 2 : 40);
            var levels = numbers.Between(-0.02, 0.08, s_tenors.Length);
            Assert.Equal(DirectExponent(interpolation, levels, years), curve.ExponentAt(years).At(levels), 1e-15 * Math.Max(1, years));
        }
    }

    [Theory]
    [InlineData(CurveInterpolation.LinearZero)]
    [InlineData(CurveInterpolation.LogLinearDiscount)]
    public void ExponentAt_a_tenor_or_beyond_the_ends_reads_that_tenor_alone(CurveInterpolation interpolation)
    {
        var curve = Curve(interpolation);
        for (var k = 0; k < s_tenors.Length; k++) Assert.Equal(LinearForm.Of(s_tenors.Length - 1 - k, s_tenors[k]), curve.ExponentAt(s_tenors[k]));
        Assert.Equal(LinearForm.Of(5, 0.1), curve.ExponentAt(0.1));
        Assert.Equal(LinearForm.Of(0, 50), curve.ExponentAt(50));
        Assert.Equal(LinearForm.Zero, curve.ExponentAt(0));
    }

    [Fact]
    public void ExponentAt_log_linear_discount_has_one_forward_rate_between_two_tenors()
    {
        var curve = Curve(CurveInterpolation.LogLinearDiscount);
        double[] levels = [0.03, 0.028, 0.025, 0.021, 0.012, -0.004];
        double Forward(double from, double to) => curve.ExponentAt(to).Minus(curve.ExponentAt(from)).At(levels) / (to - from);
        Assert.Equal(((5 * 0.025) - (2 * 0.021)) / 3, Forward(2, 5), 1e-15);
        foreach (var (from, to) in new[] { (2.0, 2.5), (2.5, 3.0), (3.1, 4.9), (4, 5) }) Assert.Equal(Forward(2, 5), Forward(from, to), 1e-14);
        // Linear zero rates have no such forward: it rises with time on a rising curve.
        var linear = Curve(CurveInterpolation.LinearZero);
        Assert.True(linear.ExponentAt(3).Minus(linear.ExponentAt(2)).At(levels) < linear.ExponentAt(5).Minus(linear.ExponentAt(4)).At(levels));
    }

    // Hull: zero rates of 3% and 4% for 1 and 2 years make a forward rate of 5%.
    [Theory]
    [InlineData(CurveInterpolation.LinearZero)]
    [InlineData(CurveInterpolation.LogLinearDiscount)]
    public void ExponentAt_two_tenors_gives_the_textbook_forward_rate(CurveInterpolation interpolation)
    {
        var curve = Curve(interpolation);
        var (expected, tolerance) = RateData.Example("FRA-1");
        Assert.Equal(expected, curve.ExponentAt(2).Minus(curve.ExponentAt(1)).At([0, 0, 0, 0.04, 0.03, 0]), tolerance);
    }

    [Fact]
    public void ExponentAt_on_a_flat_number_is_a_constant()
    {
        Assert.Equal(LinearForm.Of(-0.005 * 7.5), RateCurve.Flat(-0.005).ExponentAt(7.5));
        Assert.Throws<ArgumentOutOfRangeException>(() => RateCurve.Flat(double.NaN));
    }

    [Fact]
    public void ExponentAt_a_time_that_is_none_is_refused()
    {
        foreach (var years in new[] { -0.01, double.NaN, double.PositiveInfinity })
            Assert.Throws<ArgumentOutOfRangeException>(() => Curve(CurveInterpolation.LinearZero).ExponentAt(years));
    }

    // Every day of a year of Treasury yields: a point between two tenors is between their rates, and both ways agree at the tenors.
    [Fact]
    public void ExponentAt_over_a_year_of_yields_stays_between_its_tenors()
    {
        Factor[] factors = [.. new[] { 1.0, 3, 5, 10 }.Select(t => new Factor($"T{t}", FactorClass.Rate, ShockKind.Normal, "USD", "USD", t))];
        Assert.Null(new CurveSet(factors).Rates(RateTerm.From("USD"), "curve", "USD", out var linear));
        Assert.Null(new CurveSet(factors, CurveInterpolation.LogLinearDiscount).Rates(RateTerm.From("USD"), "curve", "USD", out var logLinear));
        var days = RateData.Yields();
        Assert.Equal(248, days.Length);
        foreach (var yields in days)
        {
            foreach (var (years, before, after) in new[] { (1.7, 0, 1), (4.2, 1, 2), (8.1, 2, 3) })
            {
                var (low, high) = (Math.Min(yields[before], yields[after]), Math.Max(yields[before], yields[after]));
                Assert.InRange(linear.ExponentAt(years).At(yields) / years, low - 1e-15, high + 1e-15);
                Assert.InRange(logLinear.ExponentAt(years).At(yields) / years, low - 1e-15, high + 1e-15);
            }
            Assert.Equal(5 * yields[2], linear.ExponentAt(5).At(yields));
            Assert.Equal(linear.ExponentAt(5), logLinear.ExponentAt(5));
        }
    }
}
