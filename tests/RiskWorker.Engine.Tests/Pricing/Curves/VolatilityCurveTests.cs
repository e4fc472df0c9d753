using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

public sealed class VolatilityCurveTests
{
    private static readonly CurveSet s_curves = new([
        new("V1", FactorClass.Vol, ShockKind.Lognormal, Curve: "VOL", TenorYears: 1),
        new("V0.25", FactorClass.Vol, ShockKind.Lognormal, Curve: "VOL", TenorYears: 0.25)]);

    private static VolatilityCurve Curve()
    {
        Assert.Null(s_curves.Volatilities(new(null, "VOL"), out var curve));
        return curve;
    }

    // 20% for a year and 30% for a quarter: 0.04 and 0.0225 of total variance; halfway, at 0.625 years, their mean.
    [Fact]
    public void VarianceAt_is_linear_in_time_between_tenors()
    {
        Assert.Equal((0.04 + 0.0225) / 2, Curve().VarianceAt(0.625).At([0.2, 0.3]), 1e-16);
        Assert.Equal([(0, 0.5), (1, 0.125)], Curve().VarianceAt(0.625).Terms);
    }

    [Fact]
    public void VarianceAt_a_tenor_or_beyond_the_ends_has_that_volatility()
    {
        Assert.Equal([(0, 1.0)], Curve().VarianceAt(1).Terms);
        Assert.Equal(0.3 * 0.3 * 0.1, Curve().VarianceAt(0.1).At([0.2, 0.3]), 1e-17);
        Assert.Equal(0.2 * 0.2 * 3, Curve().VarianceAt(3).At([0.2, 0.3]), 1e-16);
        Assert.Equal(0, Curve().VarianceAt(0).At([0.2, 0.3]));
    }

    [Fact]
    public void VarianceAt_on_one_factor_or_a_number_is_its_square_times_time()
    {
        Assert.Null(s_curves.Volatilities(new(null, "V1"), out var factor));
        Assert.Equal(0.04 * 2, factor.VarianceAt(2).At([0.2, 0.3]), 1e-16);
        Assert.Null(s_curves.Volatilities(new(0.25, null), out var flat));
        Assert.Equal(0.0625 * 2, flat.VarianceAt(2).At([]));
    }

    [Fact]
    public void At_is_a_chain_of_fused_multiply_adds_and_NaN_without_a_level()
    {
        var form = Curve().VarianceAt(0.625);
        BitAssert.Equal(Math.FusedMultiplyAdd(0.125, 0.3 * 0.3, Math.FusedMultiplyAdd(0.5, 0.2 * 0.2, 0)), form.At([0.2, 0.3]));
        Assert.Equal(double.NaN, form.At([double.NaN, 0.3]));
    }
}
