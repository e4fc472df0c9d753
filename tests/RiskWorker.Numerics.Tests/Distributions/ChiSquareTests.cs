using MathNet.Numerics.Distributions;
using RiskWorker.Numerics.Distributions;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

public sealed class ChiSquareTests
{
    // Percentage points as printed in every table of the distribution (Abramowitz and Stegun, table 26.8; from memory).
    [Theory]
    [InlineData(2, 0.05, 5.991)]
    [InlineData(5, 0.01, 15.086)]
    [InlineData(10, 0.05, 18.307)]
    [InlineData(30, 0.005, 53.672)]
    public void UpperQuantile_gives_the_printed_percentage_points(double nu, double q, double printed) =>
        Assert.Equal(printed, Math.Round(ChiSquare.UpperQuantile(nu, q), 3), 1e-9);

    [Fact]
    public void UpperTail_of_two_degrees_is_an_exponential()
    {
        foreach (double x in new SeededNumbers(1).Between(0.001, 200, 300))
        {
            Assert.InRange(ChiSquare.UpperTail(2, x) / Math.Exp(-0.5 * x), 1 - 1e-13, 1 + 1e-13);
            Assert.Equal(1, ChiSquare.UpperTail(2, x) + ChiSquare.LowerTail(2, x), 1e-15);
        }
    }

    [Fact]
    public void LowerTail_equals_the_library_of_reference()
    {
        var numbers = new SeededNumbers(2);
        for (int i = 0; i < 300; i++)
        {
            double nu = numbers.Between(0.1, 300), x = nu * numbers.Between(0.05, 3);
            Assert.Equal(ChiSquared.CDF(nu, x), ChiSquare.LowerTail(nu, x), 1e-11);
        }
    }

    [Fact]
    public void Quantiles_are_inverse_to_their_tails_down_to_1e_100()
    {
        var numbers = new SeededNumbers(3);
        for (int i = 0; i < 400; i++)
        {
            double nu = i % 2 == 0 ? numbers.Between(2, 12) : numbers.Between(2, 500), mass = 0.5 * Math.Pow(10, i % 3 == 0 ? -numbers.Between(0, 99) : -numbers.Between(0, 8));
            Assert.InRange(ChiSquare.LowerTail(nu, ChiSquare.LowerQuantile(nu, mass)) / mass, 1 - 2e-12, 1 + 2e-12);
            Assert.InRange(ChiSquare.UpperTail(nu, ChiSquare.UpperQuantile(nu, mass)) / mass, 1 - 2e-12, 1 + 2e-12);
        }
    }

    [Fact]
    public void Tails_at_and_below_zero_are_all_and_nothing()
    {
        Assert.Equal(0, ChiSquare.LowerTail(3, 0));
        Assert.Equal(1, ChiSquare.UpperTail(3, -4));
    }

    [Fact]
    public void Arguments_outside_are_refused_by_name_and_value()
    {
        Assert.Contains("1.5", Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquare.LowerQuantile(1.5, 0.1)).Message, StringComparison.Ordinal);
        Assert.Contains("0.6", Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquare.UpperQuantile(5, 0.6)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquare.LowerTail(0, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquare.LowerTail(double.NaN, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquare.UpperTail(5, double.NaN));
    }
}
