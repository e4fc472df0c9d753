namespace RiskWorker.Numerics.Tests.LinearAlgebra;

/// <summary>Matrices of the tests and their plain, scalar arithmetic.</summary>
internal static class Matrices
{
    /// <summary>Row-major elements of a square matrix written as rows.</summary>
    public static double[] Flat(double[,] rows) => [.. rows.Cast<double>()];

    /// <summary>Standard normal-like shocks (sums of twelve uniforms less six), rows × length.</summary>
    public static double[] Shocks(int rows, int length, int seed)
    {
        var random = new System.Random(seed);
        var shocks = new double[rows * length];
        for (var i = 0; i < shocks.Length; i++)
        {
            for (var k = 0; k < 12; k++) shocks[i] += random.NextDouble();
            shocks[i] -= 6;
        }
        return shocks;
    }

    /// <summary>Zero-mean sample correlation of the rows, exact ones on the diagonal.</summary>
    public static double[] Correlation(double[] shocks, int rows)
    {
        var length = shocks.Length / rows;
        var correlation = new double[rows * rows];
        for (var i = 0; i < rows; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var (xy, xx, yy) = (0.0, 0.0, 0.0);
                for (var t = 0; t < length; t++)
                {
                    var (x, y) = (shocks[(i * length) + t], shocks[(j * length) + t]);
                    (xy, xx, yy) = (xy + (x * y), xx + (x * x), yy + (y * y));
                }
                correlation[(i * rows) + j] = correlation[(j * rows) + i] = i == j ? 1 : xy / Math.Sqrt(xx * yy);
            }
        }
        return correlation;
    }

    /// <summary>The textbook factor, element by element, without pivoting; it needs a definite matrix.</summary>
    public static double[] Cholesky(double[] matrix, int n)
    {
        var lower = new double[n * n];
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var rest = matrix[(i * n) + j];
                for (var k = 0; k < j; k++) rest = Math.FusedMultiplyAdd(-lower[(j * n) + k], lower[(i * n) + k], rest);
                lower[(i * n) + j] = i == j ? Math.Sqrt(rest) : rest / lower[(j * n) + j];
            }
        }
        return lower;
    }

    /// <summary>The matrix with rows and columns in another order.</summary>
    public static double[] Permute(double[] matrix, int[] order)
    {
        var n = order.Length;
        var permuted = new double[n * n];
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++) permuted[(i * n) + j] = matrix[(order[i] * n) + order[j]];
        }
        return permuted;
    }

    /// <summary>Largest absolute element of L L' - A.</summary>
    public static double ProductError(double[] lower, int rank, double[] matrix, int n)
    {
        var worst = 0.0;
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var product = 0.0;
                for (var k = 0; k < rank; k++) product += lower[(i * rank) + k] * lower[(j * rank) + k];
                worst = Math.Max(worst, Math.Abs(product - matrix[(i * n) + j]));
            }
        }
        return worst;
    }
}
