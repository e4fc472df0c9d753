using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Interpolation;

public sealed class ChebyshevGridTests
{
    // The C library's cosine is the second opinion here; the code itself must not call it.
    [Fact]
    public void Points_of_every_degree_are_the_cosines()
    {
        for (var degree = 1; degree <= 96; degree++)
        {
            var points = ChebyshevGrid.PointsOf(degree);
            for (var j = 0; j <= degree; j++) Assert.Equal(Math.Cos(Math.PI * j / degree), points[j], 8e-16);
            for (var j = 0; j <= degree; j++) BitAssert.Equal(0 - points[j], points[degree - j] + 0.0, $"{j} of {degree}:");
        }
    }

    [Fact]
    public void Interpolate_of_a_polynomial_of_that_degree_gives_it_back()
    {
        var numbers = new SeededNumbers(310);
        for (var degree = 1; degree <= ChebyshevGrid.MostDegree; degree++)
        {
            var grid = ChebyshevGrid.Of(degree);
            var wanted = numbers.Between(-1, 1, degree + 1);
            double[] values = [.. grid.Points.Select(z => PolynomialSum.AddInTurn(wanted, z, 0))];
            var found = new double[degree + 1];
            grid.Interpolate(values, 1, found);
            for (var s = 0; s < 100; s++)
            {
                var z = numbers.Between(-1, 1);
                Assert.Equal(PolynomialSum.AddInTurn(wanted, z, 0), PolynomialSum.AddInTurn(found, z, 0), 3e-10);
            }
        }
    }

    // Trefethen (2013), theorem 8.2: for 1/(1 + 4z²), analytic inside the ellipse rho = (1 + sqrt 5)/2, the error is at most 4 M rho^-n / (rho - 1).
    [Theory]
    [InlineData(8)]
    [InlineData(16)]
    [InlineData(20)]
    public void Interpolate_of_a_rational_function_converges_as_its_poles_allow(int degree)
    {
        var grid = ChebyshevGrid.Of(degree);
        double[] values = [.. grid.Points.Select(z => 1 / (1 + (4 * z * z)))];
        grid.Interpolate(values, 1, values);
        var worst = Enumerable.Range(0, 1001).Max(i => Math.Abs(PolynomialSum.AddInTurn(values, (i / 500.0) - 1, 0) - (1 / (1 + (4 * ((i / 500.0) - 1) * ((i / 500.0) - 1))))));
        var rate = Math.Pow((1 + Math.Sqrt(5)) / 2, -degree);
        Assert.InRange(worst, 0.1 * rate, 4 * rate);
    }

    [Fact]
    public void Interpolate_with_a_stride_leaves_the_rest_alone()
    {
        var grid = ChebyshevGrid.Of(3);
        double[] memory = [1, -5, 2, -5, 0.5, -5, 4];
        var alone = new double[4];
        grid.Interpolate([1, 2, 0.5, 4], 1, alone);
        grid.Interpolate(memory, 2, memory);
        Assert.Equal([alone[0], -5, alone[1], -5, alone[2], -5, alone[3]], memory);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(ChebyshevGrid.MostDegree + 1)]
    public void Degree_outside_the_range_is_refused(int degree) => Assert.Throws<ArgumentOutOfRangeException>(() => ChebyshevGrid.Of(degree));
}
