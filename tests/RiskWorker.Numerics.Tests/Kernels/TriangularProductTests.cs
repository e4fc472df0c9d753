using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class TriangularProductTests
{
    [Theory]
    [InlineData(1, 1)]
    [InlineData(2, 1)]
    [InlineData(4, 4)]
    [InlineData(5, 2)]
    [InlineData(7, 7)]
    [InlineData(8, 3)]
    [InlineData(9, 6)]
    [InlineData(10, 0)]
    [InlineData(11, 11)]
    public void Multiply_every_width_equals_the_chain_in_turn(int rows, int rank)
    {
        for (int width = 0; width <= 257; width++)
            AssertEqualsChain(rows, rank, width);
    }

    // Around the depth of 128 at which the sums rest between two passes.
    [Theory]
    [InlineData(127, 127)]
    [InlineData(128, 128)]
    [InlineData(130, 129)]
    [InlineData(133, 131)]
    [InlineData(200, 200)]
    [InlineData(300, 257)]
    public void Multiply_deep_matrix_equals_the_chain_in_turn(int rows, int rank)
    {
        foreach (int width in new[] { 1, 8, 17, 24, 61 })
            AssertEqualsChain(rows, rank, width);
    }

    [Fact]
    public void Multiply_known_product_is_exact()
    {
        double[] lower = [2, 0, 3, 4, 5, 6];
        double[] draws = [1, 10, 100, 7, 8, 9];
        double[] moves = new double[9];
        TriangularProduct.Multiply(lower, 3, 2, draws, moves, 3);
        Assert.Equal([2, 20, 200, 31, 62, 336, 47, 98, 554], moves);
    }

    [Fact]
    public void Multiply_what_stands_above_the_diagonal_is_never_read()
    {
        (double[] lower, double[] draws) = Operands(13, 13, 40);
        double[] expected = new double[13 * 40], moves = new double[13 * 40];
        TriangularProduct.Multiply(lower, 13, 13, draws, expected, 40);
        for (int i = 0; i < 13; i++)
            lower.AsSpan((i * 13) + i + 1, 12 - i).Fill(double.NaN);
        TriangularProduct.Multiply(lower, 13, 13, draws, moves, 40);
        BitAssert.Equal(expected, moves);
    }

    [Fact]
    public void Multiply_faulty_shape_is_refused()
    {
        double[] memory = new double[100];
        Assert.Throws<ArgumentOutOfRangeException>(() => TriangularProduct.Multiply(memory.AsSpan(0, 6), 2, 3, memory.AsSpan(10, 12), memory.AsSpan(30, 8), 4));
        Assert.Throws<ArgumentException>(() => TriangularProduct.Multiply(memory.AsSpan(0, 5), 3, 2, memory.AsSpan(10, 8), memory.AsSpan(30, 12), 4));
        Assert.Throws<ArgumentException>(() => TriangularProduct.Multiply(memory.AsSpan(0, 6), 3, 2, memory.AsSpan(10, 8), memory.AsSpan(30, 11), 4));
        Assert.Throws<ArgumentException>(() => TriangularProduct.Multiply(memory.AsSpan(0, 6), 3, 2, memory.AsSpan(10, 8), memory.AsSpan(15, 12), 4));
    }

    [Fact]
    public void Multiply_allocates_nothing()
    {
        (double[] lower, double[] draws) = Operands(20, 20, 100);
        double[] moves = new double[2000];
        Assert.Equal(0, Allocations.FewestOf(() => TriangularProduct.Multiply(lower, 20, 20, draws, moves, 100)));
    }

    private static void AssertEqualsChain(int rows, int rank, int width)
    {
        (double[] lower, double[] draws) = Operands(rows, rank, width);
        var moves = new GuardedBuffer<double>(rows * width, -3.25, width % 5);
        double[] expected = new double[rows * width];
        TriangularProduct.Multiply(lower, rows, rank, draws, moves.Span, width);
        TriangularProduct.MultiplyInTurn(lower, rows, rank, draws, expected, width);
        BitAssert.Equal(expected, moves.Span, $"{rows} x {rank} x {width}:");
        moves.AssertIntact();
    }

    private static (double[] Lower, double[] Draws) Operands(int rows, int rank, int width)
    {
        var numbers = new SeededNumbers(41);
        double[] lower = new double[rows * rank];
        for (int i = 0; i < rows; i++)
        {
            for (int j = 0; j < Math.Min(i + 1, rank); j++)
                lower[(i * rank) + j] = numbers.Between(-1, 1);
        }

        return (lower, numbers.Between(-3, 3, rank * width));
    }
}
