using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class SelectionTests
{
    [Fact]
    public void Greater_every_length_and_alignment_equals_the_selection_in_turn()
    {
        var numbers = new SeededNumbers(71);
        for (int length = 0; length <= 257; length++)
        {
            // Sixteen levels only, so that many tie with the cutoff.
            double[] memory = new double[length + 7];
            for (int i = 0; i < memory.Length; i++)
                memory[i] = Math.Floor(numbers.Between(-8, 8));
            ReadOnlySpan<double> values = memory.AsSpan(length % 7, length);
            var indices = new GuardedBuffer<int>(length, -9, length % 3);
            int[] expected = new int[length];
            int count = Selection.Greater(values, 3, indices.Span, out int equal);
            int expectedCount = Selection.GreaterInTurn(values, 3, expected, out int expectedEqual);
            Assert.Equal((expectedCount, expectedEqual), (count, equal));
            Assert.Equal(expected.AsSpan(0, count), indices.Span[..count]);
            indices.AssertIntact();
        }
    }

    [Fact]
    public void Greater_ties_are_counted_and_order_is_ascending()
    {
        double[] values = [5, 3, 7, 3, double.PositiveInfinity, -1, 3, 4, 8, double.NegativeInfinity];
        int[] indices = new int[10];
        Assert.Equal(5, Selection.Greater(values, 3, indices, out int equal));
        Assert.Equal(3, equal);
        Assert.Equal([0, 2, 4, 7, 8], indices[..5]);
    }

    [Fact]
    public void Greater_zeros_of_both_signs_are_equal()
    {
        Assert.Equal(0, Selection.Greater([0.0, -0.0, 0, 0, 0, 0, 0, 0, -0.0], 0.0, new int[9], out int equal));
        Assert.Equal(9, equal);
    }

    [Theory]
    [InlineData(3)]
    [InlineData(17)]
    public void Greater_NaN_is_refused_and_named(int position)
    {
        double[] values = new double[18];
        values[position] = double.NaN;
        var error = Assert.Throws<ArgumentException>(() => Selection.Greater(values, 1, new int[18], out _));
        Assert.Contains($"Value {position} is NaN", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Greater_faulty_arguments_are_refused()
    {
        Assert.Throws<ArgumentException>(() => Selection.Greater(new double[9], 1, new int[8], out _));
        Assert.Throws<ArgumentException>(() => Selection.Greater(new double[9], double.NaN, new int[9], out _));
    }
}
