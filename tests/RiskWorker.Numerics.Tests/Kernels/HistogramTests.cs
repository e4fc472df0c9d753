using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class HistogramTests
{
    [Fact]
    public void Accumulate_every_length_and_alignment_equals_the_bin_of_each()
    {
        var numbers = new SeededNumbers(81);
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> values = numbers.Between(-3, 3, length + 5).AsSpan(length % 5, length);
            var counts = new GuardedBuffer<long>(34, 0, length % 3);
            long[] expected = new long[34];
            Histogram.Accumulate(values, -2.5, 6.4, counts.Span);
            foreach (double value in values)
                expected[Histogram.BinOf(value, -2.5, 6.4, 32)]++;
            Assert.Equal(expected, counts.Span);
            counts.AssertIntact();
        }
    }

    [Fact]
    public void Accumulate_edges_belong_to_the_bin_above()
    {
        double[] values =
        [
            -1, Math.BitDecrement(0.0), 0, -0.0, 0.5, Math.BitDecrement(1.0), 1, 2, Math.BitDecrement(4.0), 4, 5,
            double.PositiveInfinity, double.NegativeInfinity, double.MaxValue, double.MinValue,
        ];
        long[] counts = new long[6];
        Histogram.Accumulate(values, 0, 1, counts);
        Assert.Equal([4, 4, 1, 1, 1, 4], counts);
    }

    [Fact]
    public void Accumulate_adds_to_what_is_there()
    {
        long[] counts = [10, 20, 30];
        Histogram.Accumulate([-1, 0.5, 0.25, 3], 0, 1, counts);
        Assert.Equal([11, 22, 31], counts);
    }

    [Fact]
    public void Accumulate_faulty_arguments_are_refused()
    {
        Assert.Throws<ArgumentException>(() => Histogram.Accumulate([1, 2, 3, 4, double.NaN, 6, 7, 8, 9], 0, 1, new long[4]));
        Assert.Throws<ArgumentException>(() => Histogram.Accumulate([1], 0, 1, new long[2]));
        Assert.Throws<ArgumentException>(() => Histogram.Accumulate([1], double.NaN, 1, new long[3]));
        Assert.Throws<ArgumentException>(() => Histogram.Accumulate([1], 0, 0, new long[3]));
        Assert.Throws<ArgumentException>(() => Histogram.Accumulate([1], 0, double.PositiveInfinity, new long[3]));
    }
}
