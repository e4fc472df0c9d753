using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Tests.LinearAlgebra;

public sealed class PivotedCholeskyTests
{
    private static readonly double[] Textbook = Matrices.Flat(new double[,] { { 4, 12, -16 }, { 12, 37, -43 }, { -16, -43, 98 } });

    // A standard textbook matrix, whose factor in its own order is [[2], [6, 1], [-8, 5, 3]].
    [Fact]
    public void Factor_of_the_textbook_matrix_is_the_textbook_factor_of_its_permutation()
    {
        Assert.Equal([2, 0, 0, 6, 1, 0, -8, 5, 3], Matrices.Cholesky(Textbook, 3));

        var factor = PivotedCholesky.Factor(Textbook, 3);

        Assert.Equal([2, 1, 0], factor.Order);
        Assert.Equal(3, factor.Rank);
        Assert.Equal(0, factor.Remainder);
        Assert.Equal(36, Math.Pow(factor.Lower[0] * factor.Lower[4] * factor.Lower[8], 2), 1e-11); // the determinant, (2·1·3)²
        Assert.Equal(Matrices.Cholesky(Matrices.Permute(Textbook, factor.Order), 3), factor.Lower);
        Assert.InRange(Matrices.ProductError(factor.Lower, 3, Matrices.Permute(Textbook, factor.Order), 3), 0, 1e-12);
    }

    [Fact]
    public void Factor_of_any_size_equals_the_scalar_factor_of_the_permuted_matrix_bit_for_bit()
    {
        for (var n = 1; n <= 70; n++)
        {
            var matrix = Matrices.Correlation(Matrices.Shocks(n, 2 * n, seed: n), n);

            var factor = PivotedCholesky.Factor(matrix, n);

            Assert.Equal(n, factor.Rank);
            Assert.Equal(n, factor.Order.Distinct().Count());
            Assert.Equal(Matrices.Cholesky(Matrices.Permute(matrix, factor.Order), n), factor.Lower);
        }
    }

    [Fact]
    public void Factor_takes_the_largest_remaining_diagonal_and_of_equal_ones_the_smaller_index()
    {
        var matrix = Matrices.Flat(new double[,]
        {
            { 1, 0, 0, 0.5 },
            { 0, 1, 0, 0 },
            { 0, 0, 1, 0 },
            { 0.5, 0, 0, 1 },
        });

        Assert.Equal([0, 1, 2, 3], PivotedCholesky.Factor(matrix, 4).Order);
        Assert.Equal([0, 2, 3, 1], PivotedCholesky.Factor(Matrices.Permute(matrix, [0, 3, 1, 2]), 4).Order);
    }

    [Fact]
    public void Factor_of_rows_that_always_move_together_or_opposite_has_one_column_for_them()
    {
        var matrix = Matrices.Flat(new double[,] { { 1, 0.25, 1, -1 }, { 0.25, 1, 0.25, -0.25 }, { 1, 0.25, 1, -1 }, { -1, -0.25, -1, 1 } });

        var factor = PivotedCholesky.Factor(matrix, 4);

        Assert.Equal(2, factor.Rank);
        Assert.Equal([0, 1, 2, 3], factor.Order);
        Assert.Equal([1, 0, 0.25, Math.Sqrt(0.9375), 1, 0, -1, 0], factor.Lower);
        Assert.Equal(0, factor.Remainder);
        Assert.False(factor.IsIndefinite);
    }

    [Fact]
    public void Factor_of_500_rows_of_300_days_has_rank_300_and_reproduces_the_matrix()
    {
        var matrix = Matrices.Correlation(Matrices.Shocks(500, 300, seed: 1), 500);

        var factor = PivotedCholesky.Factor(matrix, 500);

        Assert.Equal(300, factor.Rank);
        Assert.False(factor.IsIndefinite);
        Assert.Equal(500 * 300, factor.Lower.Length);
        Assert.InRange(Matrices.ProductError(factor.Lower, 300, Matrices.Permute(matrix, factor.Order), 500), 0, 1e-12);
        for (var i = 0; i < 300; i++)
        {
            for (var k = i + 1; k < 300; k++) Assert.Equal(0, factor.Lower[(i * 300) + k]);
        }
    }

    [Theory]
    [InlineData(1e-14, false)] // leaves 2e-14, below 100·2·2^-52 = 4.4e-14
    [InlineData(1e-13, true)]
    [InlineData(0.5, true)]
    public void Factor_is_indefinite_where_more_than_rounding_remains(double excess, bool indefinite)
    {
        var factor = PivotedCholesky.Factor([1, 1 + excess, 1 + excess, 1], 2);

        Assert.Equal(1, factor.Rank);
        Assert.Equal(indefinite, factor.IsIndefinite);
    }

    [Fact]
    public void Factor_sees_an_indefinite_matrix_whose_remaining_diagonal_is_zero()
    {
        // Once rows 0 and 1 are eliminated, [[0, 0.1], [0.1, 0]] remains.
        var matrix = Matrices.Flat(new double[,] { { 1, 0, 1, 0 }, { 0, 1, 0, 1 }, { 1, 0, 1, 0.1 }, { 0, 1, 0.1, 1 } });

        var factor = PivotedCholesky.Factor(matrix, 4);

        Assert.Equal(2, factor.Rank);
        Assert.Equal(0.1, factor.Remainder);
        Assert.True(factor.IsIndefinite);
    }

    [Fact]
    public void Factor_of_nothing_is_empty()
    {
        var factor = PivotedCholesky.Factor([], 0);

        Assert.Equal(0, factor.Rank);
        Assert.Empty(factor.Lower);
        Assert.False(factor.IsIndefinite);
    }

    [Fact]
    public void Factor_of_a_matrix_that_is_not_square_finite_or_symmetric_names_the_fault()
    {
        Assert.Contains("3 elements; 2 × 2 are 4", Assert.Throws<ArgumentException>(() => PivotedCholesky.Factor([1, 0, 1], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("NaN at row 1, column 0", Assert.Throws<ArgumentException>(() => PivotedCholesky.Factor([1, 0, double.NaN, 1], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("0.5 at row 1, column 0 and 0.25", Assert.Throws<ArgumentException>(() => PivotedCholesky.Factor([1, 0.25, 0.5, 1], 2)).Message, StringComparison.Ordinal);
    }
}
