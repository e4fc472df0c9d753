using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Quadrature;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

public sealed class MarginMapTests
{
    [Theory]
    [InlineData(2.05, 200)]
    [InlineData(200, 2.05)]
    [InlineData(4, 3)]
    [InlineData(3, 11.5)]
    public void Of_leaves_the_tail_of_the_margin_where_the_copula_had_its_own(double copula, double margin)
    {
        var map = MarginMap.ToUnitVariance(copula, margin);
        StudentT from = new(copula), to = new(margin);
        var numbers = new SeededNumbers(1);
        double before = double.NegativeInfinity;
        for (int i = 0; i < 300; i++)
        {
            double y = i % 2 == 0 ? numbers.Between(0, 3) : map.HighestVariate * Math.Pow(10, -numbers.Between(0, 6));
            Assert.InRange(to.Upper(map.Of(y) / to.UnitScale) / from.Upper(y), 1 - 5e-12, 1 + 5e-12);
            BitAssert.Equal(-map.Of(y), map.Of(-y));
        }

        for (int i = -1000; i <= 1000; i++)
        {
            double x = map.Of(map.HighestVariate * i * Math.Abs(i) / 1e6);
            Assert.True(x > before);
            before = x;
        }
    }

    [Theory]
    [InlineData(2.05)]
    [InlineData(6.5)]
    [InlineData(200)]
    public void Of_equal_degrees_is_the_scale_alone(double nu)
    {
        var map = MarginMap.ToUnitVariance(nu, nu);
        foreach (double y in new SeededNumbers(2).Between(-4, 4, 300))
            Assert.InRange(map.Of(y) / (y * Math.Sqrt((nu - 2) / nu)), 1 - 5e-15, 1 + 5e-15);
    }

    [Fact]
    public void OfNormalScore_gives_the_quantile_of_the_margin()
    {
        foreach (double nu in new[] { 2.05, 5, 200 })
        {
            var map = MarginMap.OfNormalScore(nu);
            var student = new StudentT(nu);
            foreach (double z in new SeededNumbers(3).Between(-8, 8, 200))
                Assert.InRange(student.Upper(Math.Abs(map.Of(z))) / NormalCdf.Of(-Math.Abs(z)), 1 - 5e-12, 1 + 5e-12);
            Assert.InRange(map.Of(1e-9) * student.Density(0) / NormalDensity.Of(0) / 1e-9, 1 - 1e-14, 1 + 1e-14);
        }
    }

    // Beyond c a t_m variate holds E[t²; t > c] = m(m-1)/(m-2) P(t_(m-2) > c√((m-2)/m)) - m P(t_m > c) of its second moment.
    [Fact]
    public void Of_a_variate_of_the_copula_has_unit_variance_but_for_what_lies_beyond_the_cut()
    {
        var map = MarginMap.ToUnitVariance(4, 12);
        var from = new StudentT(4);
        var rule = new GaussLegendre(64);
        double variance = 0, width = Math.Log(1 + map.HighestVariate) / 8;
        for (int part = 0; part < 8; part++)
        {
            for (int i = 0; i < 64; i++)
            {
                double e = Math.Exp((part + rule.Points[i]) * width), x = map.Of(e - 1);
                variance += 2 * width * rule.Weights[i] * e * from.Density(e - 1) * x * x;
            }
        }

        StudentT margin = new(12), lighter = new(10);
        double cut = margin.UpperQuantile(MarginMap.CutTail), scale = margin.UnitScale;
        double beyond = (13.2 * lighter.Upper(cut * scale)) - (12 * MarginMap.CutTail);
        Assert.Equal(1 - (2 * scale * scale * beyond), variance, 1e-11);
    }

    [Fact]
    public void Of_beyond_the_cut_is_the_margins_own_quantile_there()
    {
        var map = MarginMap.ToUnitVariance(5, 3);
        var margin = new StudentT(3);
        Assert.InRange(map.Of(1e300) / (margin.UnitScale * margin.UpperQuantile(MarginMap.CutTail)), 1 - 1e-12, 1 + 1e-12);
        BitAssert.Equal(map.Of(map.HighestVariate), map.Of(double.PositiveInfinity));
        BitAssert.Equal(-map.Of(map.HighestVariate), map.Of(double.NegativeInfinity));
        Assert.True(double.IsNaN(map.Of(double.NaN)));
        Assert.Equal(0, map.Of(0));
    }

    [Fact]
    public void Of_spans_of_every_length_and_alignment_equals_the_scalar_form()
    {
        var map = MarginMap.ToUnitVariance(5, 3);
        var numbers = new SeededNumbers(4);
        for (int length = 0; length <= 257; length++)
        {
            var y = new GuardedBuffer<double>(length, -7, length % 7);
            var x = new GuardedBuffer<double>(length, -7, length % 3);
            for (int i = 0; i < length; i++)
                y.Span[i] = i % 11 == 5 ? numbers.AnyDouble() : numbers.Between(-6, 6);
            map.Of(y.Span, x.Span);
            for (int i = 0; i < length; i++)
                BitAssert.Equal(map.Of(y.Span[i]), x.Span[i], $"at {y.Span[i]:R}:");
            x.AssertIntact();
        }
    }

    [Fact]
    public void Of_spans_allocates_nothing_and_takes_the_same_memory()
    {
        var map = MarginMap.ToUnitVariance(5, 3);
        double[] y = new SeededNumbers(5).Between(-5, 5, 1000), apart = new double[1000];
        Assert.Equal(0, Allocations.FewestOf(() => map.Of(y, apart)));
        map.Of(y, y);
        BitAssert.Equal(apart, y);
        Assert.Throws<ArgumentException>(() => map.Of(y.AsSpan(0, 9), y.AsSpan(1, 9)));
        Assert.Throws<ArgumentException>(() => map.Of(y.AsSpan(0, 9), apart.AsSpan(0, 8)));
    }

    [Fact]
    public void New_degrees_outside_are_refused()
    {
        Assert.Contains("margin has 2 degrees", Assert.Throws<ArgumentOutOfRangeException>(() => MarginMap.ToUnitVariance(5, 2)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => MarginMap.ToUnitVariance(0.5, 5));
        Assert.Throws<ArgumentOutOfRangeException>(() => MarginMap.OfNormalScore(double.NaN));
    }
}
