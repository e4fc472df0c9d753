using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class LaneSumTests
{
    [Fact]
    public void Every_length_and_alignment_equals_the_sum_in_turn()
    {
        for (int length = 0; length <= 257; length++)
        {
            ReadOnlySpan<double> values = new SeededNumbers(61).Between(-1e3, 1e3, length + 7).AsSpan(length % 7, length);
            BitAssert.Equal(LaneSum.OfInTurn(values), LaneSum.Of(values), $"{length}:");
            BitAssert.Equal(LaneSum.OfSquaresInTurn(values), LaneSum.OfSquares(values), $"{length}:");
        }
    }

    [Fact]
    public void Of_order_is_eight_lanes_then_the_tree()
    {
        // 2^53 swallows a 1 added to it alone, but not the 2 that lanes 1 and 5 make first.
        double big = Math.ScaleB(1, 53);
        Assert.Equal(big + 2, LaneSum.Of([big, 1, 0, 0, 0, 1, 0, 0]));
        Assert.Equal(big, LaneSum.Of([big, 0, 0, 0, 0, 0, 0, 0, 1, 0, 0, 0, 0, 0, 0, 0, 0 + 1]));
        Assert.Equal(big, LaneSum.Of([big, 0, 1, 0, 0, 0, 0, 0]));
    }

    [Fact]
    public void Of_whole_numbers_is_exact()
    {
        double[] values = [.. Enumerable.Range(1, 1000).Select(i => (double)i)];
        Assert.Equal(500_500, LaneSum.Of(values));
        Assert.Equal(333_833_500, LaneSum.OfSquares(values));
    }

    [Fact]
    public void Of_special_values_follow_the_arithmetic()
    {
        BitAssert.Equal(0.0, LaneSum.Of([]));
        BitAssert.Equal(0.0, LaneSum.Of([-0.0, -0.0]));
        BitAssert.Equal(0.0, LaneSum.Of([-0.0, -0.0, -0.0, -0.0, -0.0, -0.0, -0.0, -0.0, -0.0]));
        BitAssert.Equal(double.NaN, LaneSum.Of([1, double.NaN]));
        BitAssert.Equal(double.NaN, LaneSum.Of([double.PositiveInfinity, double.NegativeInfinity]));
        BitAssert.Equal(double.PositiveInfinity, LaneSum.OfSquares([double.MaxValue, 1]));
    }
}
