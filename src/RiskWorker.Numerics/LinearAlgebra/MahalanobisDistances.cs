using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>
/// Squared Mahalanobis distances d² = x' A⁻¹ x of days under a matrix A of full rank: forward substitution through its pivoted factor, all
/// days side by side, and the sum of squares of what it leaves.
/// </summary>
/// <remarks>Every element is a chain of fused multiply-adds over rows ascending: the bits do not depend on the hardware.</remarks>
public static class MahalanobisDistances
{
    /// <summary>d² of each day.</summary>
    /// <param name="factor">The factor of A, n × n and of rank n.</param>
    /// <param name="rows">n rows of T days, row-major, in the order of A.</param>
    /// <param name="squares">T elements, one a day.</param>
    /// <exception cref="ArgumentException">The rank is below n, or the rows are not n times the days.</exception>
    public static void Of(PivotedCholesky factor, ReadOnlySpan<double> rows, Span<double> squares)
    {
        ArgumentNullException.ThrowIfNull(factor);
        int n = factor.Order.Length, days = squares.Length;
        if (factor.Rank < n)
            throw new ArgumentException($"The factor has rank {factor.Rank} of {n}; distances need a matrix of full rank.", nameof(factor));
        if (rows.Length != (long)n * days)
            throw new ArgumentException($"rows has {rows.Length} elements; {n} rows of {days} days have {(long)n * days}.", nameof(rows));
        double[] white = new double[n * days];
        squares.Clear();
        for (int i = 0; i < n; i++)
        {
            Span<double> row = white.AsSpan(i * days, days);
            rows.Slice(factor.Order[i] * days, days).CopyTo(row);
            ReadOnlySpan<double> lower = factor.Lower.AsSpan(i * n, i + 1);
            for (int k = 0; k < i; k++)
                Axpy.Add(-lower[k], white.AsSpan(k * days, days), row);
            for (int t = 0; t < days; t++)
                row[t] /= lower[i];
            Elementwise.AddSquare(row, 1.0, squares);
        }
    }

    /// <summary>ln det A of the factored matrix, 2 Σ ln of the factor's diagonal.</summary>
    /// <param name="factor">The factor of A, of full rank.</param>
    /// <exception cref="ArgumentException">The rank is below n.</exception>
    public static double LogDeterminant(PivotedCholesky factor)
    {
        ArgumentNullException.ThrowIfNull(factor);
        int n = factor.Order.Length;
        if (factor.Rank < n)
            throw new ArgumentException($"The factor has rank {factor.Rank} of {n}; a singular matrix has no logarithm of its determinant.", nameof(factor));
        double sum = 0.0;
        for (int i = 0; i < n; i++)
            sum = Math.FusedMultiplyAdd(2.0, Logarithm.Of(factor.Lower[(i * n) + i]), sum);
        return sum;
    }
}
