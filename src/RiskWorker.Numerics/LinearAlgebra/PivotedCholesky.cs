namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>
/// The factor of a symmetric positive semidefinite matrix A by Cholesky's method with diagonal (complete) pivoting:
/// A[p_i, p_j] = Σ_k L[i, k] L[j, k], where p is <see cref="Order"/> (Higham, Accuracy and Stability of Numerical Algorithms, 2002, section 10.3).
/// </summary>
/// <remarks>
/// The pivot is the largest diagonal entry that remains, of equal ones that of the smaller index. The factorisation ends at the
/// first pivot that is not above n·eps times the largest diagonal entry of A; the pivots taken are the rank. Every element is a
/// chain of fused multiply-adds over k ascending, one square root or one division: the bits do not depend on the hardware.
/// </remarks>
public sealed class PivotedCholesky
{
    private const double Epsilon = 2.220446049250313e-16; // 2^-52
    private const double IndefiniteFactor = 100;

    private PivotedCholesky(int[] order, int rank, double[] lower, double remainder, double scale)
    {
        Order = order;
        Rank = rank;
        Lower = lower;
        Remainder = remainder;
        IsIndefinite = remainder > IndefiniteFactor * order.Length * Epsilon * scale;
    }

    /// <summary>Index in A of each row of the factor; the pivots come first, in the order taken.</summary>
    public int[] Order { get; }

    /// <summary>Pivots taken: columns of the factor.</summary>
    public int Rank { get; }

    /// <summary>The lower trapezoidal factor, n × <see cref="Rank"/>, row-major, rows in pivot order; exact zeros above the diagonal.</summary>
    public double[] Lower { get; }

    /// <summary>Largest absolute entry of what the pivots leave of A; 0 at full rank.</summary>
    public double Remainder { get; }

    /// <summary>Whether <see cref="Remainder"/> is beyond 100·n·eps times the largest diagonal entry: more than rounding, so A is not semidefinite.</summary>
    public bool IsIndefinite { get; }

    /// <summary>Factors a symmetric n × n matrix, row-major.</summary>
    /// <exception cref="ArgumentException">The matrix has another length, an element that is not finite, or is not symmetric.</exception>
    public static PivotedCholesky Factor(ReadOnlySpan<double> matrix, int n)
    {
        SquareMatrix.RequireSymmetric(matrix, n, nameof(matrix));
        var order = new int[n];
        var diagonal = new double[n];
        var scale = 0.0;
        for (var i = 0; i < n; i++)
        {
            order[i] = i;
            diagonal[i] = matrix[(i * n) + i];
            scale = Math.Max(scale, Math.Abs(diagonal[i]));
        }
        var upper = new double[n * n]; // row k holds column k of the factor, so that every update runs along memory
        var rank = 0;
        for (; rank < n; rank++)
        {
            var pivot = LargestFrom(rank, diagonal, order);
            if (!(diagonal[pivot] > n * Epsilon * scale)) break;
            Swap(rank, pivot, order, diagonal, upper, n);
            Eliminate(rank, matrix, order, diagonal, upper, n);
        }
        return new(order, rank, Transpose(upper, n, rank), LargestLeft(rank, matrix, order, upper, n), scale);
    }

    private static int LargestFrom(int first, ReadOnlySpan<double> diagonal, ReadOnlySpan<int> order)
    {
        var best = first;
        for (var i = first + 1; i < diagonal.Length; i++)
        {
            if (diagonal[i] > diagonal[best] || (diagonal[i] == diagonal[best] && order[i] < order[best])) best = i;
        }
        return best;
    }

    private static void Swap(int k, int pivot, int[] order, double[] diagonal, double[] upper, int n)
    {
        (order[k], order[pivot]) = (order[pivot], order[k]);
        (diagonal[k], diagonal[pivot]) = (diagonal[pivot], diagonal[k]);
        for (var row = 0; row < k; row++)
        {
            var start = row * n;
            (upper[start + k], upper[start + pivot]) = (upper[start + pivot], upper[start + k]);
        }
    }

    private static void Eliminate(int k, ReadOnlySpan<double> matrix, int[] order, double[] diagonal, double[] upper, int n)
    {
        var row = upper.AsSpan((k * n) + k, n - k);
        Remaining(k, k, matrix, order, upper, n, row);
        var root = Math.Sqrt(diagonal[k]);
        row[0] = root;
        for (var j = 1; j < row.Length; j++)
        {
            row[j] /= root;
            diagonal[k + j] = Math.FusedMultiplyAdd(-row[j], row[j], diagonal[k + j]);
        }
    }

    /// <summary>Row <paramref name="i"/>, from its diagonal on, of what the first <paramref name="pivots"/> pivots leave of the matrix.</summary>
    private static void Remaining(int i, int pivots, ReadOnlySpan<double> matrix, int[] order, double[] upper, int n, Span<double> row)
    {
        var source = matrix.Slice(order[i] * n, n);
        for (var j = 0; j < row.Length; j++) row[j] = source[order[i + j]];
        for (var k = 0; k < pivots; k++)
        {
            var start = (k * n) + i;
            Axpy.Add(-upper[start], upper.AsSpan(start, n - i), row);
        }
    }

    private static double LargestLeft(int rank, ReadOnlySpan<double> matrix, int[] order, double[] upper, int n)
    {
        var largest = 0.0;
        var row = new double[n];
        for (var i = rank; i < n; i++)
        {
            var left = row.AsSpan(0, n - i);
            Remaining(i, rank, matrix, order, upper, n, left);
            foreach (var value in left) largest = Math.Max(largest, Math.Abs(value));
        }
        return largest;
    }

    private static double[] Transpose(double[] upper, int n, int rank)
    {
        var lower = new double[n * rank];
        for (var i = 0; i < n; i++)
        {
            for (var k = 0; k < Math.Min(i + 1, rank); k++) lower[(i * rank) + k] = upper[(k * n) + i];
        }
        return lower;
    }
}
