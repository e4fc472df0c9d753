using MathNet.Numerics.LinearAlgebra;
using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Tests.Estimation;

/// <summary>
/// The expected figures were computed from the papers' formulas with numpy, the intensities also with plain loops in R (agreeing to
/// 1e-15): by hand-made data of 6 days, and the log-returns of four indices over all 1,859 days and the last 60. Means removed, divisor n.
/// </summary>
public sealed class LedoitWolfTests
{
    private static readonly double[] s_byHand = [1.0, 2.0, -1.0, 0.3, -2.0, 1.2, 2.0, 1.0, -0.5, 0.7, -1.5, 0.4, 0.5, -0.3, 0.8, -1.2, 0.1, 0.9];

    [Fact]
    public void ScaledIdentity_by_hand_equals_the_formulas() =>
        AssertShrunk(LedoitWolf.ScaledIdentity(s_byHand, 3, removeMean: true), 0.3912532421269912, 1.205740740740741,
            [1.6035116546583172, 0.7776739831827688, -0.0588455199277242, 0.7776739831827688, 1.224059508917475, -0.061889253717089227, -0.0588455199277242, -0.061889253717089227, 0.7896510586464306]);

    [Fact]
    public void ConstantCorrelation_by_hand_equals_the_formulas() =>
        AssertShrunk(LedoitWolf.ConstantCorrelation(s_byHand, 3, removeMean: true), 0.305508227609697, 0.2060458030463117,
            [1.8591666666666669, 0.98263024807481, -0.005108241080794135, 0.98263024807481, 1.2358333333333336, -0.02003650556439867, -0.005108241080794135, -0.02003650556439867, 0.5222222222222223]);

    [Fact]
    public void ScaledIdentity_of_index_returns_equals_the_formulas()
    {
        AssertShrunk(LedoitWolf.ScaledIdentity(ReturnSeries.Indices(), 4, removeMean: true), 0.007675822786863074, 9.411835346406808e-05,
            [0.00010595857064211892, 6.644562906236897e-05, 8.276619367475851e-05, 5.198761319156978e-05, 6.644562906236897e-05, 8.558316113527335e-05, 6.234276133253977e-05, 4.269178091232258e-05, 8.276619367475851e-05, 6.234276133253977e-05, 0.00012140369171203618, 5.6464355367292966e-05, 5.198761319156978e-05, 4.269178091232258e-05, 5.6464355367292966e-05, 6.35279903668439e-05]);
        AssertShrunk(LedoitWolf.ScaledIdentity(Last(60), 4, removeMean: true), 0.05471492990748059, 0.0001514861683442701,
            [0.0001732618507828913, 0.00013049322535442208, 0.00013236140100477347, 0.00010780384738281974, 0.00013049322535442208, 0.00015941906184151197, 0.00011343138664809, 9.666001468970799e-05, 0.00013236140100477347, 0.00011343138664809, 0.00015591419535061193, 0.00010339806080574708, 0.00010780384738281974, 9.666001468970799e-05, 0.00010339806080574708, 0.00011734956540206523]);
    }

    [Fact]
    public void ConstantCorrelation_of_index_returns_equals_the_formulas()
    {
        AssertShrunk(LedoitWolf.ConstantCorrelation(ReturnSeries.Indices(), 4, removeMean: true), 0.2780194806639849, 0.654402017654195,
            [0.00010605015705198744, 6.566967726904515e-05, 8.087962379319374e-05, 5.272991863217883e-05, 6.566967726904515e-05, 8.551713974299848e-05, 6.391250840601376e-05, 4.444606273500606e-05, 8.087962379319374e-05, 6.391250840601376e-05, 0.00012161474917277365, 5.70434223287667e-05, 5.272991863217883e-05, 4.444606273500606e-05, 5.70434223287667e-05, 6.329136788851277e-05]);
        AssertShrunk(LedoitWolf.ConstantCorrelation(Last(60), 4, removeMean: true), 1, 0.8009118508679101,
            [0.0001745222694396676, 0.00013378419682803346, 0.00013222380281713455, 0.00011364844679386188, 0.00013378419682803346, 0.0001598782330750348, 0.00012655487743975139, 0.00010877591590000371, 0.00013222380281713455, 0.00012655487743975139, 0.00015617049812629918, 0.00010750720635340019, 0.00011364844679386188, 0.00010877591590000371, 0.00010750720635340019, 0.00011537367273607885]);
    }

    // The sums over pairs and days as the papers write them, without what the code saves.
    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Intensities_equal_the_plain_sums_over_all_pairs(bool removeMean)
    {
        const int n = 7, days = 23;
        var (rows, common) = (ReturnSeries.Normals(n * days, 12), ReturnSeries.Normals(days, 13));
        for (var k = 0; k < rows.Length; k++) rows[k] = (rows[k] + ((1.5 - (k / days % 3)) * common[k % days])) * (1 + (k / days));
        var x = (double[])rows.Clone();
        for (var i = 0; removeMean && i < n; i++)
        {
            var mean = x.Skip(i * days).Take(days).Average();
            for (var t = 0; t < days; t++) x[(i * days) + t] -= mean;
        }
        double Mean(Func<int, double> term) => Enumerable.Range(0, days).Average(term);
        double At(int i, int t) => x[(i * days) + t];
        double S(int i, int j) => Mean(t => At(i, t) * At(j, t));
        double Theta(int i, int j) => Mean(t => ((At(i, t) * At(i, t)) - S(i, i)) * ((At(i, t) * At(j, t)) - S(i, j)));
        double R(int i, int j) => S(i, j) / Math.Sqrt(S(i, i) * S(j, j));
        (int I, int J)[] pairs = [.. Enumerable.Range(0, n * n).Select(k => (k / n, k % n))];
        var level = pairs.Where(p => p.I != p.J).Average(p => R(p.I, p.J));
        var pi = pairs.Sum(p => Mean(t => Math.Pow((At(p.I, t) * At(p.J, t)) - S(p.I, p.J), 2)));
        var rho = pairs.Sum(p => p.I == p.J
            ? Mean(t => Math.Pow((At(p.I, t) * At(p.I, t)) - S(p.I, p.I), 2))
            : level / 2 * ((Math.Sqrt(S(p.J, p.J) / S(p.I, p.I)) * Theta(p.I, p.J)) + (Math.Sqrt(S(p.I, p.I) / S(p.J, p.J)) * Theta(p.J, p.I))));
        var gamma = pairs.Where(p => p.I != p.J).Sum(p => Math.Pow((level * Math.Sqrt(S(p.I, p.I) * S(p.J, p.J))) - S(p.I, p.J), 2));
        var mean2 = Enumerable.Range(0, n).Average(i => S(i, i));
        var apart = pairs.Sum(p => Math.Pow(S(p.I, p.J) - (p.I == p.J ? mean2 : 0), 2));

        var constant = LedoitWolf.ConstantCorrelation(rows, n, removeMean);
        var identity = LedoitWolf.ScaledIdentity(rows, n, removeMean);

        Assert.InRange((pi - rho) / gamma / days, 0.01, 0.99);
        Assert.Equal((pi - rho) / gamma / days, constant.Intensity, 1e-12);
        Assert.Equal(level, constant.Level, 1e-13);
        Assert.Equal(pi / days / apart, identity.Intensity, 1e-12);
        Assert.Equal(mean2, identity.Level, 1e-12);
    }

    [Fact]
    public void Correlation_is_the_scaled_identity_of_standardised_data()
    {
        var rows = Last(60);
        var standardised = (double[])rows.Clone();
        for (var i = 0; i < 4; i++)
        {
            var root = Math.Sqrt(rows.Skip(i * 60).Take(60).Average(x => x * x));
            for (var t = 0; t < 60; t++) standardised[(i * 60) + t] /= root;
        }

        var (shrunk, expected) = (LedoitWolf.Correlation(rows, 4), LedoitWolf.ScaledIdentity(standardised, 4));

        AssertShrunk(shrunk, expected.Intensity, 1, expected.Matrix);
        for (var i = 0; i < 4; i++) Assert.Equal(1, shrunk.Matrix[(i * 4) + i]);
    }

    // Rates move by 0.0005 a day, a price by 3: the unit must not decide which correlations survive.
    [Fact]
    public void Correlation_and_constant_correlation_do_not_depend_on_the_units_of_the_rows()
    {
        var rows = Last(100);
        var scaled = (double[])rows.Clone();
        for (var k = 0; k < scaled.Length; k++) scaled[k] *= (k / 100) switch { 0 => 1024, 1 => 1.0 / 4096, 2 => 1, _ => 16 };

        var (one, other) = (LedoitWolf.Correlation(rows, 4), LedoitWolf.Correlation(scaled, 4));
        Assert.Equal(one.Matrix, other.Matrix);
        Assert.Equal(one.Intensity, other.Intensity);

        var (constant, constantScaled) = (LedoitWolf.ConstantCorrelation(rows, 4), LedoitWolf.ConstantCorrelation(scaled, 4));
        Assert.Equal(constant.Level, constantScaled.Level, 1e-14);
        Assert.NotEqual(LedoitWolf.ScaledIdentity(rows, 4).Intensity, LedoitWolf.ScaledIdentity(scaled, 4).Intensity, 1e-3);
    }

    [Fact]
    public void Shrunk_matrices_are_definite_with_more_rows_than_days()
    {
        var rows = ReturnSeries.Normals(40 * 15, 7);
        foreach (var shrunk in new[] { LedoitWolf.ScaledIdentity(rows, 40), LedoitWolf.Correlation(rows, 40) })
        {
            Assert.InRange(shrunk.Intensity, 0.01, 1);
            Assert.True(Matrix<double>.Build.DenseOfRowMajor(40, 40, shrunk.Matrix).Evd(Symmetricity.Symmetric).EigenValues[0].Real > 1e-3);
            Assert.Equal(40, PivotedCholesky.Factor(shrunk.Matrix, 40).Rank);
        }
    }

    // Independent rows of one variance: the target is the truth, and the intensity tends to 1 as n/T grows, to 0 as days grow.
    [Fact]
    public void ScaledIdentity_of_many_days_hardly_shrinks_correlated_rows()
    {
        var common = ReturnSeries.Normals(4000, 3);
        var rows = ReturnSeries.Normals(3 * 4000, 4);
        for (var k = 0; k < rows.Length; k++) rows[k] += common[k % 4000];
        Assert.InRange(LedoitWolf.ScaledIdentity(rows, 3).Intensity, 0, 0.005);
        Assert.InRange(LedoitWolf.ScaledIdentity(ReturnSeries.Normals(50 * 100, 5), 50).Intensity, 0.9, 1);
    }

    [Fact]
    public void Rows_that_never_move_take_no_part()
    {
        var rows = Last(60);
        double[] still = [.. rows[..60], .. new double[60], .. rows[60..]];
        int[] moving = [0, 2, 3, 4];
        foreach (var (with, without, diagonal) in new[]
        {
            (LedoitWolf.ConstantCorrelation(still, 5), LedoitWolf.ConstantCorrelation(rows, 4), 0.0),
            (LedoitWolf.Correlation(still, 5), LedoitWolf.Correlation(rows, 4), 1.0),
        })
        {
            Assert.Equal(without.Intensity, with.Intensity);
            for (var a = 0; a < 4; a++)
            {
                for (var b = 0; b < 4; b++) Assert.Equal(without.Matrix[(a * 4) + b], with.Matrix[(moving[a] * 5) + moving[b]]);
                Assert.Equal(0, with.Matrix[5 + moving[a]]);
            }
            Assert.Equal(diagonal, with.Matrix[6]);
            Assert.Equal(0, with.Deviations[1]);
        }
    }

    [Fact]
    public void Of_one_row_is_its_variance()
    {
        Assert.Equal([2.5], LedoitWolf.ScaledIdentity([1, 2], 1).Matrix);
        Assert.Equal([2.5], LedoitWolf.ConstantCorrelation([1, 2], 1).Matrix);
        Assert.Equal([1], LedoitWolf.Correlation([1, 2], 1).Matrix);
    }

    [Fact]
    public void Of_faulty_tables_says_what_is_wrong()
    {
        Assert.Contains("5 elements; 2 rows", Assert.Throws<ArgumentException>(() => LedoitWolf.ScaledIdentity([1, 2, 3, 4, 5], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("NaN in row 1 on day 0", Assert.Throws<ArgumentException>(() => LedoitWolf.Correlation([1, 2, double.NaN, 3], 2)).Message, StringComparison.Ordinal);
        Assert.Contains("None of the 2 rows moves", Assert.Throws<ArgumentException>(() => LedoitWolf.Correlation([0.1, 0.1, 0.1, 7, 7, 7], 2, removeMean: true)).Message, StringComparison.Ordinal);
        Assert.Contains("at least 2", Assert.Throws<ArgumentException>(() => LedoitWolf.ConstantCorrelation([1, 2], 2)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => LedoitWolf.ScaledIdentity([1, 2], 0));
    }

    private static double[] Last(int days)
    {
        var all = ReturnSeries.Indices();
        var length = all.Length / 4;
        return [.. Enumerable.Range(0, 4).SelectMany(i => all.Skip((i * length) + length - days).Take(days))];
    }

    private static void AssertShrunk(ShrunkCovariance shrunk, double intensity, double level, double[] matrix)
    {
        Assert.Equal(intensity, shrunk.Intensity, 1e-12);
        Assert.Equal(level, shrunk.Level, 1e-12 * level);
        var n = (int)Math.Sqrt(matrix.Length);
        var largest = matrix.Max();
        for (var k = 0; k < matrix.Length; k++)
        {
            Assert.Equal(matrix[k], shrunk.Matrix[k], 1e-12 * largest);
            Assert.Equal(shrunk.Matrix[k], shrunk.Matrix[(k % n * n) + (k / n)]);
        }
    }
}
