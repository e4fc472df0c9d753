using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>The sum of a number of normal jumps is normal with that many times their mean and variance.</summary>
public sealed class CompoundJumpTests
{
    private static readonly CompoundJumpTerms s_terms = new(-0.05, 0.0004, 0.02, 0.0009);

    [Theory]
    [InlineData(0, 0, 1.5, 0.25, 0.25)]
    [InlineData(4, 0, 0.5, 0, (4 * -0.05) + (0.5 * 0.04))] // sqrt(4 · 0.0004) = 0.04
    [InlineData(0, 1, -2, 0.1, 0.1 + 0.02 - (2 * 0.03))] // sqrt(0.0009) = 0.03
    [InlineData(4, 1, 1, 0, (4 * -0.05) + 0.02 + 0.05)] // sqrt(0.0016 + 0.0009) = 0.05
    public void Add_gives_the_sum_worked_by_hand(double first, double second, double normal, double x, double expected) =>
        Assert.Equal(expected, CompoundJump.Add(first, second, normal, s_terms, x), 1e-15);

    [Theory]
    [InlineData(1)]
    [InlineData(8)]
    [InlineData(77)]
    public void Add_gives_the_bits_of_its_twin_lane_by_lane(int length)
    {
        var n = new SeededNumbers(5);
        double[] first = n.Between(0, 4, length), second = n.Between(0, 2, length), normals = n.Between(-4, 4, length), x = n.Between(-1, 1, length);
        double[] expected = [.. x.Select((value, i) => CompoundJump.Add(first[i], second[i], normals[i], s_terms, value))];
        CompoundJump.Add(first, second, normals, s_terms, x);
        Assert.Equal(expected, x);
    }

    [Fact]
    public void Add_refuses_spans_of_other_lengths() =>
        Assert.Throws<ArgumentException>(() => CompoundJump.Add(new double[3], new double[4], new double[4], s_terms, new double[4]));
}
