using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class NormalCdfTests : UnaryKernelTests<NormalCdf>
{
    protected override (double Low, double High)[] Ranges => [(-1, 1), (-8, 8), (-40, 40), (-38.6, -37), (-1e-300, 1e-300), (-1e6, 1e6)];

    protected override (double X, double Expected)[] SpecialValues =>
    [
        (0.0, 0.5), (-0.0, 0.5), (double.Epsilon, 0.5), (9.0, 1.0), (40.0, 1.0), (-39.0, 0.0),
        (double.PositiveInfinity, 1.0), (double.NegativeInfinity, 0.0), (double.MinValue, 0.0), (double.MaxValue, 1.0),
    ];

    [Fact]
    public void Of_positive_argument_is_one_less_the_lower_tail()
    {
        foreach (double x in new SeededNumbers(21).Between(0, 40, 10_000))
            BitAssert.Equal(1.0 - NormalCdf.Of(-x), NormalCdf.Of(x));
    }

    [Fact]
    public void Of_density_is_its_derivative()
    {
        // Central differences with h = 1e-4: error h²/6 |φ''| < 1.7e-9, rounding below 1e-12.
        foreach (double x in new SeededNumbers(22).Between(-6, 6, 1000))
            Assert.Equal(NormalDensity.Of(x), (NormalCdf.Of(x + 1e-4) - NormalCdf.Of(x - 1e-4)) / 2e-4, 2e-9);
    }
}
