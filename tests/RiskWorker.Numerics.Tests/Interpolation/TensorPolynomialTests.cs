using RiskWorker.Numerics.Interpolation;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Interpolation;

public sealed class TensorPolynomialTests
{
    private static readonly int[] s_degrees = [5, 3, 2, 4];

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(4)]
    public void Through_values_of_a_product_of_polynomials_gives_it_back(int variables)
    {
        var numbers = new SeededNumbers(410);
        var polynomial = TensorPolynomial.Through(s_degrees.AsSpan(0, variables), ValuesOf(variables));
        for (var s = 0; s < 200; s++)
        {
            var z = numbers.Between(-1, 1, variables);
            Assert.Equal(Product(z), polynomial.Value(z), 1e-12);
        }
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(4)]
    public void Fill_of_every_length_equals_the_value_of_each(int variables)
    {
        var numbers = new SeededNumbers(411);
        var polynomial = TensorPolynomial.Through(s_degrees.AsSpan(0, variables), ValuesOf(variables));
        for (var length = 0; length <= 100; length++)
        {
            var rows = numbers.Between(-1, 1, Math.Max(variables, 1) * length);
            var values = numbers.Between(-1, 1, length);
            polynomial.Fill(rows.AsSpan(0, length), rows.AsSpan(length), values);
            for (var s = 0; s < length; s++)
            {
                double[] z = [.. Enumerable.Range(0, variables).Select(d => rows[(d * length) + s])];
                BitAssert.Equal(polynomial.Value(z), values[s], $"{s} of {length}:");
            }
        }
    }

    [Fact]
    public void Through_a_faulty_shape_is_refused()
    {
        Assert.Throws<ArgumentException>(() => TensorPolynomial.Through([2], [1, 2]));
        Assert.Throws<ArgumentException>(() => TensorPolynomial.Through([1, 1, 1, 1, 1], new double[32]));
        Assert.Throws<ArgumentOutOfRangeException>(() => TensorPolynomial.Through([ChebyshevGrid.MostDegree + 1], new double[ChebyshevGrid.MostDegree + 2]));
    }

    // Of degree exactly s_degrees in each variable, and different in every one.
    private static double Product(ReadOnlySpan<double> z)
    {
        var product = 1.5;
        for (var d = 0; d < z.Length; d++)
        {
            var power = 1.0;
            for (var k = 0; k < s_degrees[d]; k++) power *= z[d];
            product *= 1 + (0.3 * (d + 1) * z[d]) + (0.7 * power);
        }
        return product;
    }

    private static double[] ValuesOf(int variables)
    {
        double[][] points = [[]];
        foreach (var degree in s_degrees.Take(variables))
            points = [.. points.SelectMany(point => ChebyshevGrid.Of(degree).Points.Select(z => (double[])[.. point, z]))];
        return [.. points.Select(point => Product(point))];
    }
}
