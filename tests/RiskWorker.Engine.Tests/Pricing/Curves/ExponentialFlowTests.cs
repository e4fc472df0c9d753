using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

public sealed class ExponentialFlowTests
{
    private static readonly LinearForm s_one = LinearForm.Of(0, 1), s_two = LinearForm.Of(0, 2);

    [Fact]
    public void ValueAt_is_the_amount_times_the_exponential()
    {
        BitAssert.Equal(100 * Exponential.Of(-0.05), new ExponentialFlow(100, s_one).ValueAt([0.05]));
        Assert.Equal(double.NaN, new ExponentialFlow(100, s_one).ValueAt([double.NaN]));
    }

    [Fact]
    public void Merged_adds_equal_exponents_sorts_and_drops_what_cancels() =>
        Assert.Equal([new(3, LinearForm.Zero), new(5, s_two)],
            ExponentialFlow.Merged([new(4, s_two), new(7, s_one), new(1, s_two), new(-7, LinearForm.Of(0, 1)), new(3, LinearForm.Zero)]));

    [Fact]
    public void Merged_of_nothing_is_nothing() => Assert.Empty(ExponentialFlow.Merged([]));

    // 1e16 + 1 + 1 depends on the order of addition: the merge must not.
    [Fact]
    public void Merged_does_not_depend_on_the_order_of_the_flows()
    {
        ExponentialFlow[] flows = [new(1e16, s_one), new(1, s_one), new(1, s_one), new(-3e15, s_two), new(0.1, s_two), new(0.7, s_two)];
        var expected = ExponentialFlow.Merged(flows);
        Assert.Equal(1e16 + 2, expected.Single(f => f.Exponent.Equals(s_one)).Amount);
        for (var turn = 1; turn < flows.Length; turn++) Assert.Equal(expected, ExponentialFlow.Merged([.. flows[turn..], .. flows[..turn]]));
        Assert.Equal(expected, ExponentialFlow.Merged(flows.Reverse()));
    }

    [Fact]
    public void Sum_is_a_chain_of_fused_multiply_adds_in_the_order_given()
    {
        ExponentialFlow[] flows = [new(3, s_one), new(5, s_two)];
        BitAssert.Equal(Math.FusedMultiplyAdd(5, Exponential.Of(-0.2), Math.FusedMultiplyAdd(3, Exponential.Of(-0.1), 0)), ExponentialFlow.Sum(flows, [0.1]));
        Assert.Equal(0, ExponentialFlow.Sum([], [0.1]));
    }
}
