using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Quadrature;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

public sealed class MixingQuantileTests
{
    private const double LowestScore = -8.25;

    public static TheoryData<double> Degrees => [2.05, 3, 4.5, 8, 30, 200, 1000];

    // The table's own integral over the normal score against the closed form of the cut mean.
    [Theory]
    [MemberData(nameof(Degrees))]
    public void Mean_equals_the_integral_of_the_quantile(double nu)
    {
        var mixing = new MixingQuantile(nu);
        Assert.InRange(Integral(mixing, w => w) / mixing.Mean, 1 - 1e-12, 1 + 1e-12);
        Assert.True(mixing.Mean < mixing.UncutMean);
    }

    // E[W] = ν/(ν-2), where the cut takes next to nothing; E[1/W] = E[χ²]/ν = 1 and E[W²] = ν²/((ν-2)(ν-4)).
    [Fact]
    public void Moments_at_many_degrees_are_those_of_the_uncut_law()
    {
        var mixing = new MixingQuantile(30);
        Assert.Equal(30.0 / 28, Integral(mixing, w => w), 1e-6);
        Assert.Equal(900.0 / (28 * 26), Integral(mixing, w => w * w), 1e-5);
        Assert.Equal(1, Integral(mixing, w => 1 / w), 1e-7);
    }

    // What the cut takes off E[1/W] is known for every ν: ∫ χ²/ν over the cut mass is P(χ²_(ν+2) ≤ ν/cap), in place of 1e-7/cap.
    [Theory]
    [MemberData(nameof(Degrees))]
    public void Reciprocal_mean_is_one_but_for_the_cut(double nu)
    {
        var mixing = new MixingQuantile(nu);
        double expected = 1 - ChiSquare.LowerTail(nu + 2, nu / mixing.Cap) + (MixingQuantile.CutProbability / mixing.Cap);
        Assert.Equal(expected, Integral(mixing, w => 1 / w), 1e-13);
    }

    // At ν = 4 a χ² leaves e^(-x/2)(1 + x/2) above x: the quantile goes back to its u through a closed form.
    [Fact]
    public void Of_four_degrees_inverts_the_closed_form_of_the_tail()
    {
        var mixing = new MixingQuantile(4);
        var numbers = new SeededNumbers(1);
        for (int i = 0; i < 2_000; i++)
        {
            double u = i % 2 == 0 ? numbers.Unit() : Math.Pow(10, -numbers.Between(0, 16)), half = 2 / mixing.Of(u);
            if (u < 1 - MixingQuantile.CutProbability)
                Assert.InRange(Math.Exp(-half) * (1 + half) / u, 1 - 2e-12, 1 + 2e-12);
        }
    }

    [Theory]
    [MemberData(nameof(Degrees))]
    public void Of_rising_uniforms_rises_up_to_the_cap(double nu)
    {
        var mixing = new MixingQuantile(nu);
        double before = 0;
        for (int i = 1; i < 4_000; i++)
        {
            double w = mixing.Of(NormalCdf.Of(LowestScore + (i * 0.0034)));
            Assert.True(w >= before, $"{w} after {before} at {i}");
            before = w;
        }

        Assert.Equal(mixing.Cap, mixing.Of(1 - MixingQuantile.CutProbability), mixing.Cap * 1e-12);
        BitAssert.Equal(before, mixing.Of(1));
        Assert.InRange(mixing.Of(1 - 1.1102230246251565e-16) / mixing.Cap, 1 - 1e-13, 1);
        Assert.Equal(MixingQuantile.CutProbability, ChiSquare.LowerTail(nu, nu / mixing.Cap), 1e-19);
    }

    [Fact]
    public void Of_ends_and_numbers_outside_is_defined()
    {
        var mixing = new MixingQuantile(5);
        BitAssert.Equal(mixing.Of(1e-300), mixing.Of(0));
        Assert.True(mixing.Of(0) > 0);
        Assert.True(double.IsNaN(mixing.Of(-0.1)));
        Assert.True(double.IsNaN(mixing.Of(1.1)));
        Assert.True(double.IsNaN(mixing.Of(double.NaN)));
    }

    [Fact]
    public void Of_spans_of_every_length_and_alignment_equals_the_scalar_form()
    {
        var mixing = new MixingQuantile(3.3);
        var numbers = new SeededNumbers(2);
        for (int length = 0; length <= 257; length++)
        {
            var u = new GuardedBuffer<double>(length, -7, length % 7);
            var w = new GuardedBuffer<double>(length, -7, length % 3);
            for (int i = 0; i < length; i++)
                u.Span[i] = i % 13 == 5 ? numbers.AnyDouble() : i % 3 == 0 ? 1 - Math.Pow(10, -numbers.Between(0, 15)) : numbers.Unit();
            mixing.Of(u.Span, w.Span);
            for (int i = 0; i < length; i++)
                BitAssert.Equal(mixing.Of(u.Span[i]), w.Span[i], $"at {u.Span[i]:R}:");
            w.AssertIntact();
        }
    }

    [Fact]
    public void Of_spans_allocates_nothing()
    {
        var mixing = new MixingQuantile(3.3);
        double[] u = new SeededNumbers(3).Between(0, 1, 1000);
        Assert.Equal(0, Allocations.FewestOf(() => mixing.Of(u, u)));
    }

    [Theory]
    [InlineData(2.0)]
    [InlineData(1001)]
    [InlineData(double.NaN)]
    public void New_degrees_outside_are_refused_by_value(double nu) => Assert.Contains(
        nu.ToString(System.Globalization.CultureInfo.CurrentCulture),
        Assert.Throws<ArgumentOutOfRangeException>(() => new MixingQuantile(nu)).Message,
        StringComparison.Ordinal);

    private static double Integral(MixingQuantile mixing, Func<double, double> of)
    {
        var rule = new GaussLegendre(64);
        double low = LowestScore, high = -InverseNormal.Of(MixingQuantile.CutProbability), sum = 0;
        const int parts = 8;
        double width = (high - low) / parts;
        for (int part = 0; part < parts; part++)
        {
            for (int i = 0; i < rule.Points.Length; i++)
            {
                double z = low + ((part + rule.Points[i]) * width);
                sum += width * rule.Weights[i] * NormalDensity.Of(z) * of(mixing.Of(NormalCdf.Of(z)));
            }
        }

        return sum + (MixingQuantile.CutProbability * of(mixing.Cap));
    }
}
