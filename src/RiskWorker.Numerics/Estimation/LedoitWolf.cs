using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Shrinkage of a sample covariance S (divisor n of days, here T) with the intensity that minimises the expected squared error in the
/// limit of many days: Ledoit and Wolf, "A well-conditioned estimator for large-dimensional covariance matrices" (2004, Journal of
/// Multivariate Analysis 88, 365-411) and "Honey, I shrunk the sample covariance matrix" (2004, Journal of Portfolio Management 30(4), 110-119).
/// </summary>
/// <remarks>
/// Tables are n rows of T days, row-major, all finite. Means are taken as 0, or, with <c>removeMean</c>, estimated and taken off first
/// (the divisor stays T). With Q = Σ_t ‖x_t‖⁴/T - ‖S‖², the sum of the variances of all products x_i x_j, both intensities need O(nT)
/// beyond S itself. Sums run in the order of the days.
/// </remarks>
public static class LedoitWolf
{
    /// <summary>
    /// Towards m·I, m the mean variance: intensity = min(1, (Q/T) / ‖S - m I‖²). It mixes the rows' scales, and a row that never moves
    /// is given a variance: for factors in different units take <see cref="Correlation"/>.
    /// </summary>
    /// <exception cref="ArgumentException">The rows are not n of one length, or a value is not finite.</exception>
    public static ShrunkCovariance ScaledIdentity(ReadOnlySpan<double> rows, int n, bool removeMean = false)
    {
        var table = new CentredTable(rows, n, removeMean);
        var matrix = table.Covariance();
        var (intensity, level) = TowardsIdentity(table, matrix);
        return new(matrix, intensity, level, table.Deviations);
    }

    /// <summary>
    /// The correlation of the rows towards the identity, by <see cref="ScaledIdentity"/> on standardised data: each row is divided by its own
    /// deviation first, so units do not matter, the level is 1 and the diagonal stays 1. The intensity treats the deviations as known.
    /// Rows that never move take no part; they have zeros beside their 1. The covariance is deviation · matrix · deviation.
    /// </summary>
    /// <exception cref="ArgumentException">The rows are not n of one length, a value is not finite, or no row moves.</exception>
    public static ShrunkCovariance Correlation(ReadOnlySpan<double> rows, int n, bool removeMean = false)
    {
        var all = new CentredTable(rows, n, removeMean);
        var moving = all.Moving();
        var table = all.Standardized(moving);
        var matrix = table.Covariance();
        // Exact ones: a standardised row's mean square is 1 to rounding only.
        for (var i = 0; i < table.Count; i++) matrix[(i * table.Count) + i] = 1;
        var (intensity, level) = TowardsIdentity(table, matrix);
        for (var i = 0; i < table.Count; i++) matrix[(i * table.Count) + i] = 1;
        var whole = Spread(matrix, moving, n);
        for (var i = 0; i < n; i++) whole[(i * n) + i] = 1;
        return new(whole, intensity, level, all.Deviations);
    }

    /// <summary>
    /// Towards the variances of S with one correlation everywhere, the mean of all: intensity = (Q - R)/(T ‖F - S‖²), held to 0 to 1, R the
    /// sum of the covariances of target and sample. Variances stay as they are. Rows that never move take no part and keep zeros.
    /// </summary>
    /// <exception cref="ArgumentException">The rows are not n of one length, a value is not finite, or no row moves.</exception>
    public static ShrunkCovariance ConstantCorrelation(ReadOnlySpan<double> rows, int n, bool removeMean = false)
    {
        var all = new CentredTable(rows, n, removeMean);
        var moving = all.Moving();
        var table = all.Only(moving);
        var matrix = table.Covariance();
        var level = MeanCorrelation(matrix, table);
        var (target, distance) = ConstantTarget(matrix, table, level);
        var spread = table.FourthPower() - LaneSum.OfSquares(matrix);
        var shared = Shared(matrix, table, level);
        var intensity = distance > 0 ? Math.Clamp((spread - shared) / distance / table.Days, 0, 1) : 0;
        Mix(matrix, target, intensity);
        return new(Spread(matrix, moving, n), intensity, level, all.Deviations);
    }

    private static (double Intensity, double Level) TowardsIdentity(CentredTable table, double[] matrix)
    {
        var n = table.Count;
        var level = 0.0;
        for (var i = 0; i < n; i++) level += matrix[(i * n) + i];
        level /= n;
        var spread = table.FourthPower() - LaneSum.OfSquares(matrix);
        var apart = (double[])matrix.Clone();
        for (var i = 0; i < n; i++) apart[(i * n) + i] -= level;
        var distance = LaneSum.OfSquares(apart);
        var intensity = distance > 0 ? Math.Clamp(spread / table.Days / distance, 0, 1) : 0;
        var target = new double[n * n];
        for (var i = 0; i < n; i++) target[(i * n) + i] = level;
        Mix(matrix, target, intensity);
        return (intensity, level);
    }

    private static double MeanCorrelation(double[] matrix, CentredTable table)
    {
        var (n, sum) = (table.Count, 0.0);
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < i; j++) sum += matrix[(i * n) + j] / (table.Deviations[i] * table.Deviations[j]);
        }
        return n > 1 ? sum / (n * (n - 1.0) / 2) : 0;
    }

    private static (double[] Target, double Distance) ConstantTarget(double[] matrix, CentredTable table, double level)
    {
        var n = table.Count;
        var (target, apart) = (new double[n * n], new double[n * n]);
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j < n; j++)
            {
                var k = (i * n) + j;
                target[k] = i == j ? matrix[k] : level * (table.Deviations[i] * table.Deviations[j]);
                apart[k] = target[k] - matrix[k];
            }
        }
        return (target, LaneSum.OfSquares(apart));
    }

    // Σ_i Var(x_i²) + level Σ_{i≠j} √(s_jj/s_ii) Cov(x_i², x_i x_j); over j the sum is one of d_j x_j, so it costs a row and not a matrix.
    private static double Shared(double[] matrix, CentredTable table, double level)
    {
        var (n, days) = (table.Count, table.Days);
        var combined = new double[days];
        for (var j = 0; j < n; j++) Axpy.Add(table.Deviations[j], table.Row(j), combined);
        var (own, cross) = (0.0, 0.0);
        for (var i = 0; i < n; i++)
        {
            var row = table.Row(i);
            var (deviation, variance) = (table.Deviations[i], matrix[(i * n) + i]);
            var (fourth, mixed, covariances) = (0.0, 0.0, 0.0);
            for (var t = 0; t < days; t++)
            {
                var square = row[t] * row[t];
                fourth = Math.FusedMultiplyAdd(square, square, fourth);
                mixed = Math.FusedMultiplyAdd(square * row[t], Math.FusedMultiplyAdd(-deviation, row[t], combined[t]), mixed);
            }
            for (var j = 0; j < n; j++)
            {
                if (j != i) covariances = Math.FusedMultiplyAdd(table.Deviations[j], matrix[(i * n) + j], covariances);
            }
            own += (fourth / days) - (variance * variance);
            cross += ((mixed / days) - (variance * covariances)) / deviation;
        }
        return Math.FusedMultiplyAdd(level, cross, own);
    }

    private static void Mix(double[] matrix, double[] target, double intensity)
    {
        for (var k = 0; k < matrix.Length; k++) matrix[k] = Math.FusedMultiplyAdd(intensity, target[k], (1 - intensity) * matrix[k]);
    }

    private static double[] Spread(double[] matrix, int[] moving, int n)
    {
        var whole = new double[n * n];
        for (var a = 0; a < moving.Length; a++)
        {
            for (var b = 0; b < moving.Length; b++) whole[(moving[a] * n) + moving[b]] = matrix[(a * moving.Length) + b];
        }
        return whole;
    }
}
