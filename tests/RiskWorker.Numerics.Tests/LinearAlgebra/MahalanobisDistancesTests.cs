using RiskWorker.Numerics.LinearAlgebra;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.LinearAlgebra;

public sealed class MahalanobisDistancesTests
{
    [Fact]
    public void Of_two_factors_is_the_closed_form()
    {
        double[] matrix = [1.5, 0.9, 0.9, 1.8], rows = [0.3, -1.1, 2.9, -0.4, -0.3, 3.6], squares = new double[3];
        MahalanobisDistances.Of(PivotedCholesky.Factor(matrix, 2), rows, squares);
        for (int t = 0; t < 3; t++)
        {
            double x = rows[t], y = rows[3 + t];
            Assert.Equal(((1.8 * x * x) - (1.8 * x * y) + (1.5 * y * y)) / ((1.5 * 1.8) - 0.81), squares[t], 1e-14);
        }

        Assert.Equal(Math.Log((1.5 * 1.8) - 0.81), MahalanobisDistances.LogDeterminant(PivotedCholesky.Factor(matrix, 2)), 1e-15);
    }

    // Under the sample's own covariance with divisor n the distances add up to n times the number of factors.
    [Fact]
    public void Of_the_sample_itself_adds_up_to_days_times_factors()
    {
        const int factors = 23, days = 301;
        double[] rows = Matrices.Shocks(factors, days, 5), weights = new double[days], squares = new double[days];
        Array.Fill(weights, 1.0 / days);
        MahalanobisDistances.Of(PivotedCholesky.Factor(WeightedGram.Of(rows, factors, weights), factors), rows, squares);
        Assert.Equal(factors * days, squares.Sum(), 1e-8);
        Assert.All(squares, square => Assert.True(square > 0));
    }

    [Fact]
    public void Of_reordered_factors_is_the_same_to_rounding()
    {
        const int factors = 7, days = 40;
        double[] rows = Matrices.Shocks(factors, days, 6), correlation = Matrices.Correlation(rows, factors), squares = new double[days], reversed = new double[days];
        MahalanobisDistances.Of(PivotedCholesky.Factor(correlation, factors), rows, squares);
        double[] otherRows = new double[rows.Length], other = new double[correlation.Length];
        for (int i = 0; i < factors; i++)
        {
            rows.AsSpan(i * days, days).CopyTo(otherRows.AsSpan((factors - 1 - i) * days));
            for (int j = 0; j < factors; j++)
                other[((factors - 1 - i) * factors) + factors - 1 - j] = correlation[(i * factors) + j];
        }

        MahalanobisDistances.Of(PivotedCholesky.Factor(other, factors), otherRows, reversed);
        for (int t = 0; t < days; t++)
            Assert.InRange(reversed[t] / squares[t], 1 - 1e-12, 1 + 1e-12);
    }

    [Fact]
    public void Of_a_day_alone_is_the_same_to_the_bit()
    {
        const int factors = 5, days = 19;
        double[] rows = Matrices.Shocks(factors, days, 7), squares = new double[days], one = new double[1], day = new double[factors];
        PivotedCholesky factor = PivotedCholesky.Factor(Matrices.Correlation(rows, factors), factors);
        MahalanobisDistances.Of(factor, rows, squares);
        for (int t = 0; t < days; t++)
        {
            for (int i = 0; i < factors; i++)
                day[i] = rows[(i * days) + t];
            MahalanobisDistances.Of(factor, day, one);
            BitAssert.Equal(squares[t], one[0]);
        }
    }

    [Fact]
    public void Singular_matrices_and_wrong_lengths_are_refused()
    {
        PivotedCholesky singular = PivotedCholesky.Factor([1, 1, 1, 1], 2);
        Assert.Contains("rank 1 of 2", Assert.Throws<ArgumentException>(() => MahalanobisDistances.Of(singular, new double[4], new double[2])).Message, StringComparison.Ordinal);
        Assert.Contains("rank 1 of 2", Assert.Throws<ArgumentException>(() => MahalanobisDistances.LogDeterminant(singular)).Message, StringComparison.Ordinal);
        PivotedCholesky regular = PivotedCholesky.Factor([1, 0, 0, 1], 2);
        Assert.Contains("3 elements; 2 rows of 2 days have 4", Assert.Throws<ArgumentException>(() => MahalanobisDistances.Of(regular, new double[3], new double[2])).Message, StringComparison.Ordinal);
    }
}
