using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Interpolation;

public sealed class PiecewisePolynomialTests
{
    private static readonly PiecewisePolynomial Exponentials = new(Exponential.Of, -3, 5);

    [Fact]
    public void Of_a_smooth_function_equals_it_everywhere_and_at_both_ends()
    {
        var numbers = new SeededNumbers(1);
        for (int i = 0; i < 5_000; i++)
        {
            double x = i switch { 0 => -3, 1 => 5, _ => i % 2 == 0 ? numbers.Between(-3, 5) : Math.Round(numbers.Between(0, 16)) / 2 - 3 };
            Assert.InRange(Exponentials.Of(x) / Exponential.Of(x), 1 - 2e-14, 1 + 2e-14);
        }
    }

    [Fact]
    public void Of_a_polynomial_of_its_degree_is_that_polynomial()
    {
        static double Tenth(double x)
        {
            double sum = 0;
            for (int k = 10; k >= 0; k--)
                sum = (sum * x) + (k - 4.5);
            return sum;
        }

        var table = new PiecewisePolynomial(Tenth, -1.2, 0.9);
        foreach (double x in new SeededNumbers(2).Between(-1.2, 0.9, 500))
            Assert.Equal(Tenth(x), table.Of(x), 2e-13);
    }

    [Fact]
    public void Of_an_argument_outside_is_the_value_at_that_end_and_a_NaN_stays_one()
    {
        BitAssert.Equal(Exponentials.Of(-3), Exponentials.Of(-3.5));
        BitAssert.Equal(Exponentials.Of(-3), Exponentials.Of(double.NegativeInfinity));
        BitAssert.Equal(Exponentials.Of(5), Exponentials.Of(1e300));
        BitAssert.Equal(Exponentials.Of(5), Exponentials.Of(double.PositiveInfinity));
        Assert.True(double.IsNaN(Exponentials.Of(double.NaN)));
    }

    [Fact]
    public void Of_spans_of_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(3);
        for (int length = 0; length <= 257; length++)
        {
            var source = new GuardedBuffer<double>(length, -7, length % 7);
            var destination = new GuardedBuffer<double>(length, -7, length % 3);
            for (int i = 0; i < length; i++)
                source.Span[i] = i % 11 == 5 ? numbers.AnyDouble() : numbers.Between(-3.2, 5.2);
            Exponentials.Of(source.Span, destination.Span);
            for (int i = 0; i < length; i++)
                BitAssert.Equal(Exponentials.Of(source.Span[i]), destination.Span[i], $"at {source.Span[i]:R}:");
            destination.AssertIntact();
        }
    }

    [Fact]
    public void New_faulty_interval_or_function_is_refused()
    {
        Assert.Contains("3", Assert.Throws<ArgumentOutOfRangeException>(() => new PiecewisePolynomial(x => x, 3, 3)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => new PiecewisePolynomial(x => x, double.NaN, 3));
        Assert.Contains("Infinity at", Assert.Throws<ArgumentException>(() => new PiecewisePolynomial(x => x < 1 ? x : double.PositiveInfinity, 0, 2)).Message.Replace("∞", "Infinity", StringComparison.Ordinal), StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => Exponentials.Of(new double[3], new double[2]));
        double[] memory = new double[20];
        Assert.Throws<ArgumentException>(() => Exponentials.Of(memory.AsSpan(0, 9), memory.AsSpan(1, 9)));
    }
}
