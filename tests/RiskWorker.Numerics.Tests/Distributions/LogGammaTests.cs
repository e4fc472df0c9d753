using MathNet.Numerics;
using RiskWorker.Numerics.Distributions;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

public sealed class LogGammaTests
{
    // Γ(n + 1) = n! and Γ(½) = √π (Abramowitz and Stegun, 6.1.5 and 6.1.8).
    [Fact]
    public void Of_whole_and_half_numbers_is_the_closed_form()
    {
        double factorial = 1;
        for (int n = 0; n <= 20; n++)
        {
            factorial *= Math.Max(n, 1);
            Assert.Equal(Math.Log(factorial), LogGamma.Of(n + 1), 1e-14 * Math.Max(1, Math.Log(factorial)));
        }

        Assert.Equal(0.5 * Math.Log(Math.PI), LogGamma.Of(0.5), 1e-15);
    }

    [Fact]
    public void HalfStep_equals_the_difference_of_two_logarithms_and_keeps_its_digits()
    {
        foreach (double x in new SeededNumbers(1).Between(0.5, 300, 200))
            Assert.Equal(SpecialFunctions.GammaLn(x + 0.5) - SpecialFunctions.GammaLn(x), LogGamma.HalfStep(x), 1e-11);

        // ½ ln x - 1/(8x) + 1/(192 x³) - ... for large x (Abramowitz and Stegun, 6.1.47).
        Assert.Equal((0.5 * Math.Log(4000)) - (1 / 32000.0) + (1 / 192.0 / 6.4e10), LogGamma.HalfStep(4000), 2e-15);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-1.5)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void Of_what_is_not_positive_and_finite_is_refused(double x) => Assert.Throws<ArgumentOutOfRangeException>(() => LogGamma.Of(x));
}
