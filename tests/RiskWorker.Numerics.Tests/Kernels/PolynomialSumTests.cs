using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class PolynomialSumTests
{
    private const double Guard = 6.5;

    [Fact]
    public void Add_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(301);
        for (int length = 0; length <= 257; length++)
        {
            double[] coefficients = numbers.Between(-2, 2, 1 + (length % 25));
            ReadOnlySpan<double> z = numbers.Between(-1, 1, length + 3).AsSpan(length % 4, length);
            GuardedBuffer<double> profit = Filled(numbers.Between(-10, 10, length), length % 7);
            double[] before = profit.Span.ToArray();
            PolynomialSum.Add(coefficients, z, profit.Span);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(PolynomialSum.AddInTurn(coefficients, z[s], before[s]), profit.Span[s], $"{s} of {length}:");
            profit.AssertIntact();
        }
    }

    [Fact]
    public void Add_in_two_variables_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(302);
        for (int length = 0; length <= 257; length++)
        {
            int columns = 1 + (length % 6);
            double[] coefficients = numbers.Between(-2, 2, columns * (1 + (length % 5)));
            ReadOnlySpan<double> z = numbers.Between(-1, 1, length + 3).AsSpan(length % 4, length);
            ReadOnlySpan<double> w = numbers.Between(-1, 1, length + 3).AsSpan(length % 3, length);
            GuardedBuffer<double> profit = Filled(numbers.Between(-10, 10, length), length % 7);
            double[] before = profit.Span.ToArray();
            PolynomialSum.Add(coefficients, columns, z, w, profit.Span);
            for (int s = 0; s < length; s++)
                BitAssert.Equal(PolynomialSum.AddInTurn(coefficients, columns, z[s], w[s], before[s]), profit.Span[s], $"{s} of {length}:");
            profit.AssertIntact();
        }
    }

    [Fact]
    public void Add_of_known_polynomials_gives_their_values()
    {
        double[] profit = [1, 1];
        PolynomialSum.Add([5, -3, 2], [2, -1], profit); // 5 - 3z + 2z²
        Assert.Equal([8.0, 11.0], profit);
        PolynomialSum.Add([1, 10, 100, 1000], 2, [2.0, 3.0], [3.0, -1.0], profit); // (1 + 10w) + z(100 + 1000w)
        Assert.Equal([8.0 + 31 + (2 * 3100), 11.0 - 9 + (3 * -900)], profit);
    }

    [Fact]
    public void Add_faulty_shape_is_refused()
    {
        double[] eight = new double[8], nine = new double[9];
        Assert.Throws<ArgumentException>(() => PolynomialSum.Add([], eight, eight));
        Assert.Throws<ArgumentException>(() => PolynomialSum.Add([1], eight, nine));
        Assert.Throws<ArgumentException>(() => PolynomialSum.Add([1], 2, eight, eight, eight));
        Assert.Throws<ArgumentException>(() => PolynomialSum.Add([1, 2], 2, eight, nine, eight));
    }

    private static GuardedBuffer<double> Filled(double[] values, int offset)
    {
        var buffer = new GuardedBuffer<double>(values.Length, Guard, offset);
        values.CopyTo(buffer.Span);
        return buffer;
    }
}
