using MathNet.Numerics.LinearAlgebra;
using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Tests.LinearAlgebra;

public sealed class NearestCorrelationTests
{
    private static readonly double[] Banded = Matrices.Flat(new double[,] { { 1, 1, 0 }, { 1, 1, 1 }, { 0, 1, 1 } });
    private static readonly double[] Tridiagonal = Matrices.Flat(new double[,] { { 2, -1, 0, 0 }, { -1, 2, -1, 0 }, { 0, -1, 2, -1 }, { 0, 0, -1, 2 } });

    // Higham 2002, IMA J. Numer. Anal. 22, 329-343, computed to 1e-15 by two methods. In closed form a is the real root of 4a³ - a - 1 = 0, b = 2a² - 1.
    [Fact]
    public void Of_the_three_by_three_of_Higham_gives_its_nearest_matrix()
    {
        const double a = 0.7606898534022839;
        const double b = 0.15729810613837603;
        Assert.Equal(0, (4 * a * a * a) - a - 1, 1e-15);

        AssertNearest(Banded, [1, a, b, a, 1, a, b, a, 1], 0.5277904635818282);
    }

    [Fact]
    public void Of_the_four_by_four_of_Higham_gives_its_nearest_matrix()
    {
        const double a = -0.8084124981492997;
        const double b = 0.19158750185069903;
        const double c = 0.10677504902551535;
        const double d = -0.6562326948066233;
        AssertNearest(Tridiagonal, [1, a, b, c, a, 1, d, b, b, d, 1, a, c, b, a, 1], 2.1337291087089216);
    }

    // Computed to 1e-15 by Newton on the dual and by alternating projections with Dykstra's correction.
    [Theory]
    [InlineData(0.9, 0.7, 0.3, 0.8945752919940257, 0.6966207665888753, 0.3025436001268445, 0.009727957339773457)]
    [InlineData(0.95, -0.8, 0.9, 0.5520802606664883, -0.43209980331619535, 0.5133804324633346, 0.9414513940437607)]
    public void Of_inconsistent_correlations_gives_the_nearest_matrix(double ab, double ac, double bc, double nearAb, double nearAc, double nearBc, double distance) =>
        AssertNearest([1, ab, ac, ab, 1, bc, ac, bc, 1], [1, nearAb, nearAc, nearAb, 1, nearBc, nearAc, nearBc, 1], distance);

    [Fact]
    public void Of_a_correlation_matrix_is_that_matrix()
    {
        var matrix = Matrices.Correlation(Matrices.Shocks(6, 20, seed: 5), 6);

        var nearest = NearestCorrelation.Of(matrix, 6);

        Assert.InRange(nearest.Distance, 0, 1e-14);
    }

    // The conditions of optimality: X = (A + diag y)₊ for a diagonal y, so (A - X + diag y) X = 0, from which y = diag((X - A)X) follows.
    [Theory]
    [InlineData(10)]
    [InlineData(40)]
    [InlineData(120)]
    public void Of_disturbed_correlations_meets_the_conditions_of_optimality(int n)
    {
        var matrix = Disturbed(n, seed: n);
        Assert.True(PivotedCholesky.Factor(matrix, n).IsIndefinite);

        var nearest = NearestCorrelation.Of(matrix, n);

        var a = Matrix<double>.Build.DenseOfRowMajor(n, n, matrix);
        var x = Matrix<double>.Build.DenseOfRowMajor(n, n, nearest.Matrix);
        var y = ((x - a) * x).Diagonal();
        var rest = a + Matrix<double>.Build.DiagonalOfDiagonalVector(y) - x;
        Assert.InRange((rest * x).FrobeniusNorm(), 0, 1e-10);
        Assert.InRange(rest.Evd(Symmetricity.Symmetric).EigenValues.Max(v => v.Real), -1, 1e-10);
        Assert.False(PivotedCholesky.Factor(nearest.Matrix, n).IsIndefinite);
        for (var i = 0; i < n; i++) Assert.Equal(1, nearest.Matrix[(i * n) + i]);
    }

    [Fact]
    public void Of_an_asymmetric_matrix_is_refused() =>
        Assert.Throws<ArgumentException>(() => NearestCorrelation.Of([1, 0.5, 0.4, 1], 2));

    private static void AssertNearest(double[] matrix, double[] expected, double distance)
    {
        var n = (int)Math.Sqrt(matrix.Length);

        var nearest = NearestCorrelation.Of(matrix, n);

        for (var i = 0; i < matrix.Length; i++) Assert.Equal(expected[i], nearest.Matrix[i], 1e-12);
        Assert.Equal(distance, nearest.Distance, 1e-12);
        for (var i = 0; i < n; i++)
        {
            Assert.Equal(1, nearest.Matrix[(i * n) + i]);
            for (var j = 0; j < i; j++) Assert.Equal(nearest.Matrix[(i * n) + j], nearest.Matrix[(j * n) + i]);
        }
        Assert.False(PivotedCholesky.Factor(nearest.Matrix, n).IsIndefinite);
    }

    private static double[] Disturbed(int n, int seed)
    {
        var matrix = Matrices.Correlation(Matrices.Shocks(n, n / 2, seed), n);
        var noise = Matrices.Shocks(n, n, seed + 1);
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < i; j++) matrix[(i * n) + j] = matrix[(j * n) + i] = Math.Clamp(matrix[(i * n) + j] + (0.1 * noise[(i * n) + j]), -1, 1);
        }
        return matrix;
    }
}
