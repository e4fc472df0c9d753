using RiskWorker.Numerics.Paths;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Paths;

public sealed class LaneLoopTests
{
    [Fact]
    public void Apply_every_operation_and_length_equals_the_scalar_form()
    {
        AssertSame(new Scaled(1.7, -0.3));
        AssertSame(new ScaledSum(0.43));
        AssertSame(new WeightedSum(-2.5));
        AssertSame(new WeightedGrowth(0.31, -0.02, 0.25));
        AssertSame(new LargerLog(-0.6, 0.1));
        AssertSame(new Hinge(95.0, -12.0));
        AssertSame(new PairMean(0.77));
    }

    [Fact]
    public void Bridge_every_length_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(111);
        var bridge = new BridgeExtreme(0.3, 0.01, 0.05, 0.02);
        for (int length = 0; length <= 41; length++)
        {
            double[] before = numbers.Between(-2, 2, length), after = numbers.Between(-2, 2, length), log = numbers.Between(-9, 0, length);
            var largest = new GuardedBuffer<double>(length, 1e9, length % 5);
            numbers.Between(-0.2, 0.6, length).CopyTo(largest.Span);
            double[] expected = largest.Span.ToArray();
            for (int i = 0; i < length; i++)
                expected[i] = bridge.Of(before[i], after[i], log[i], expected[i]);
            bridge.Apply(before, after, log, largest.Span);
            BitAssert.Equal(expected, largest.Span);
            largest.AssertIntact();
        }
    }

    [Fact]
    public void Dot_whole_lanes_equal_the_scalar_twin()
    {
        var numbers = new SeededNumbers(112);
        for (int length = 0; length <= 520; length += 8)
        {
            double[] a = numbers.Between(-1e3, 1e3, length), b = numbers.Between(-1e3, 1e3, length);
            BitAssert.Equal(LaneLoop.DotInTurn(a, b), LaneLoop.Dot(a, b));
        }
    }

    [Fact]
    public void Apply_spans_of_two_lengths_are_refused() =>
        Assert.Throws<ArgumentException>("to", () => LaneLoop.Apply(new Scaled(1, 0), new double[8], new double[7]));

    private static void AssertSame<TOperation>(TOperation operation)
        where TOperation : struct, ILaneOperation
    {
        var numbers = new SeededNumbers(113);
        for (int length = 0; length <= 41; length++)
        {
            double[] from = numbers.Between(-3, 3, length);
            var to = new GuardedBuffer<double>(length, 1e9, length % 3);
            numbers.Between(-3, 3, length).CopyTo(to.Span);
            double[] expected = to.Span.ToArray();
            for (int i = 0; i < length; i++)
                expected[i] = operation.Of(from[i], expected[i]);
            LaneLoop.Apply(operation, from, to.Span);
            BitAssert.Equal(expected, to.Span, typeof(TOperation).Name);
            to.AssertIntact();
        }
    }
}
