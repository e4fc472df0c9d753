using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class InverseNormalTests : UnaryKernelTests<InverseNormal>
{
    protected override (double Low, double High)[] Ranges =>
        [(0, 1), (0.0749, 0.0751), (0.9249, 0.9251), (0, 1e-6), (0, 1e-10), (1.3e-11, 1.6e-11), (0, 1e-300), (0, 1e-320), (1 - 1e-10, 1), (-0.01, 1.01)];

    protected override (double X, double Expected)[] SpecialValues =>
    [
        (0.5, 0.0), (0.0, double.NegativeInfinity), (-0.0, double.NegativeInfinity), (1.0, double.PositiveInfinity),
        (-double.Epsilon, double.NaN), (1.0000000000000002, double.NaN), (2.0, double.NaN),
        (double.PositiveInfinity, double.NaN), (double.NegativeInfinity, double.NaN),
    ];

    [Fact]
    public void Of_is_odd_about_one_half()
    {
        var numbers = new SeededNumbers(31);
        for (int i = 0; i < 10_000; i++)
        {
            double p = (numbers.Bits() >> 13 | 1) / 4503599627370496.0;
            BitAssert.Equal(-InverseNormal.Of(p), InverseNormal.Of(1.0 - p), $"p = {p:R}:");
        }
    }

    [Fact]
    public void Of_undoes_the_distribution_function()
    {
        // Φ(x) is wrong by at most 8 ulp, which moves x by 8ε Φ(x)/φ(x); Φ⁻¹ itself by 7e-16 of x.
        foreach (double x in new SeededNumbers(32).Between(-37, 0, 10_000))
            Assert.Equal(x, InverseNormal.Of(NormalCdf.Of(x)), (1.8e-15 * NormalCdf.Of(x) / NormalDensity.Of(x)) + (7e-16 * -x));
    }
}
