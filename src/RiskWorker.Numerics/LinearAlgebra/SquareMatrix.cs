namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>Guards on square matrices, row-major.</summary>
internal static class SquareMatrix
{
    /// <summary>Refuses a matrix that is not n × n, not finite or not symmetric to the bit.</summary>
    public static void RequireSymmetric(ReadOnlySpan<double> matrix, int n, string name)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(n);
        if (matrix.Length != (long)n * n)
            throw new ArgumentException($"{name} has {matrix.Length} elements; {n} × {n} are {(long)n * n}.", name);
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var value = matrix[(i * n) + j];
                if (!double.IsFinite(value)) throw new ArgumentException($"{name} has {value} at row {i}, column {j}; every element must be finite.", name);
                if (value != matrix[(j * n) + i])
                    throw new ArgumentException($"{name} has {value} at row {i}, column {j} and {matrix[(j * n) + i]} across the diagonal; it must be symmetric.", name);
            }
        }
    }
}
