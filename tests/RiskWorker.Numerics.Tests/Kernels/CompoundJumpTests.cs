using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class CompoundJumpTests
{
    private static readonly CompoundJumpTerms Terms = new(-0.05, 0.0004, 0.02, 0.0009);

    [Fact]
    public void Add_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(52);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> first = Counts(numbers, length + 5).AsSpan(length % 5, length), second = Counts(numbers, length + 3).AsSpan(length % 3, length);
            ReadOnlySpan<double> normals = numbers.Between(-5, 5, length + 7).AsSpan(length % 7, length);
            var x = new GuardedBuffer<double>(length, -1, length % 4);
            double[] expected = new double[length];
            for (int s = 0; s < length; s++)
            {
                x.Span[s] = numbers.Between(-1, 1);
                expected[s] = CompoundJump.Add(first[s], second[s], normals[s], Terms, x.Span[s]);
            }

            CompoundJump.Add(first, second, normals, Terms, x.Span);

            BitAssert.Equal(expected, x.Span);
            x.AssertIntact();
        }
    }

    [Theory]
    [InlineData(0, 0, 3, 0.1)] // no jump: nothing is added
    [InlineData(1, 0, 0, 0.05)] // one of mean size
    [InlineData(0, 2, 1, 0.18242640687119285)] // 0.1 + 2 · 0.02 + √(2 · 0.0009)
    [InlineData(3, 2, -2, -0.11954451150103322)] // 0.1 - 0.15 + 0.04 - 2 √(0.0012 + 0.0018)
    public void Add_is_the_sum_of_means_and_a_normal_of_the_summed_variance(double first, double second, double normal, double expected) =>
        Assert.Equal(expected, CompoundJump.Add(first, second, normal, Terms, 0.1), 1e-15);

    [Fact]
    public void Add_a_nan_stays_one()
    {
        Assert.Equal(double.NaN, CompoundJump.Add(double.NaN, 0, 0, Terms, 0));
        Assert.Equal(double.NaN, CompoundJump.Add(0, 0, double.NaN, Terms, 0));
        Assert.Equal(double.NaN, CompoundJump.Add(0, 0, 0, Terms, double.NaN));
    }

    [Fact]
    public void Add_spans_of_other_lengths_are_refused()
    {
        Assert.Throws<ArgumentException>("first", () => CompoundJump.Add(new double[2], new double[3], new double[3], Terms, new double[3]));
        Assert.Throws<ArgumentException>("second", () => CompoundJump.Add(new double[3], new double[2], new double[3], Terms, new double[3]));
        Assert.Throws<ArgumentException>("normals", () => CompoundJump.Add(new double[3], new double[3], new double[4], Terms, new double[3]));
    }

    private static double[] Counts(SeededNumbers numbers, int count) => Array.ConvertAll(numbers.Between(0, 4, count), Math.Floor);
}
