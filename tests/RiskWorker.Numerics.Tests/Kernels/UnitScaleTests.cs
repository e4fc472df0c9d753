using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class UnitScaleTests
{
    [Fact]
    public void Apply_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(320);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> x = numbers.Between(-0.2, 0.3, length + 3).AsSpan(length % 4, length);
            var z = new GuardedBuffer<double>(length, 3.5, length % 7);
            bool inside = UnitScale.Apply(x, 4, -0.2, z.Span);
            bool expected = true;
            for (int s = 0; s < length; s++)
            {
                BitAssert.Equal(UnitScale.Of(x[s], 4, -0.2), z.Span[s], $"{s} of {length}:");
                expected &= Math.Abs(z.Span[s]) <= 1;
            }

            Assert.Equal(expected, inside);
            z.AssertIntact();
        }
    }

    // One element out of 20, at each place, in the lanes and in what they leave over.
    [Theory]
    [InlineData(1.0000000000000002, false)]
    [InlineData(-1.5, false)]
    [InlineData(double.NaN, false)]
    [InlineData(1, true)]
    [InlineData(-1, true)]
    public void Apply_one_element_decides(double odd, bool inside)
    {
        for (int place = 0; place < 20; place++)
        {
            double[] x = new double[20], z = new double[20];
            x[place] = odd;
            Assert.Equal(inside, UnitScale.Apply(x, 1, 0, z));
        }
    }
}
