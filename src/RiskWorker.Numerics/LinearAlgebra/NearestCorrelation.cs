namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>
/// The correlation matrix X nearest to a symmetric matrix A in the Frobenius norm (Higham 2002), by Newton's method on the dual
/// (Qi and Sun 2006): X is the positive part of A + diag(y), with y such that its diagonal is 1.
/// </summary>
public sealed class NearestCorrelation
{
    private const int MostIterations = 100;
    private const int MostHalvings = 30;
    private const double Epsilon = 2.220446049250313e-16; // 2^-52
    private const double Acceptable = 1e-9;
    private const double SufficientDecrease = 1e-4;

    private NearestCorrelation(double[] matrix, double distance)
    {
        Matrix = matrix;
        Distance = distance;
    }

    /// <summary>X, n × n, row-major: symmetric and exact ones on the diagonal; eigenvalues clipped at 0, so semidefinite to rounding.</summary>
    public double[] Matrix { get; }

    /// <summary>The Frobenius norm of A - X.</summary>
    public double Distance { get; }

    /// <summary>Finds X for a symmetric n × n matrix, row-major.</summary>
    /// <exception cref="ArgumentException">The matrix has another length, an element that is not finite, or is not symmetric.</exception>
    /// <exception cref="ArithmeticException">The iteration stalls with a diagonal that is more than 1e-9 away from 1.</exception>
    public static NearestCorrelation Of(ReadOnlySpan<double> matrix, int n)
    {
        SquareMatrix.RequireSymmetric(matrix, n, nameof(matrix));
        var start = new double[n];
        for (var i = 0; i < n; i++) start[i] = 1 - matrix[(i * n) + i];
        var given = matrix.ToArray();
        var point = new DualPoint(given, start);
        for (var iteration = 0; iteration < MostIterations && point.Residual > 10 * n * Epsilon; iteration++)
        {
            var next = Step(given, point);
            if (next is null) break;
            point = next;
        }
        if (!(point.Residual <= Acceptable))
            throw new ArithmeticException($"The nearest correlation matrix was not found: the diagonal is {point.Residual:g3} away from 1; at most {Acceptable} is let pass.");
        var nearest = point.PositivePart;
        RescaleDiagonal(nearest, n);
        return new(nearest, DistanceBetween(given, nearest));
    }

    /// <summary>A Newton step, halved until the dual falls or, where rounding hides that, its gradient does; null where neither happens.</summary>
    private static DualPoint? Step(double[] given, DualPoint point)
    {
        var direction = point.NewtonDirection();
        var slope = 0.0;
        for (var i = 0; i < direction.Length; i++) slope += point.Gradient[i] * direction[i];
        var step = 1.0;
        for (var halving = 0; halving < MostHalvings; halving++, step /= 2)
        {
            var y = (double[])point.Y.Clone();
            Axpy.Add(step, direction, y);
            var next = new DualPoint(given, y);
            if (next.Residual <= point.Residual / 2) return next;
            if (next.Value < point.Value && next.Value <= point.Value + (SufficientDecrease * step * slope)) return next;
        }
        return null;
    }

    private static void RescaleDiagonal(double[] matrix, int n)
    {
        var roots = new double[n];
        for (var i = 0; i < n; i++) roots[i] = Math.Sqrt(matrix[(i * n) + i]);
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) matrix[(i * n) + j] = i == j ? 1 : matrix[(i * n) + j] / (roots[i] * roots[j]);
        }
    }

    private static double DistanceBetween(double[] given, double[] nearest)
    {
        var squares = 0.0;
        for (var i = 0; i < given.Length; i++)
        {
            var difference = given[i] - nearest[i];
            squares = Math.FusedMultiplyAdd(difference, difference, squares);
        }
        return Math.Sqrt(squares);
    }
}
