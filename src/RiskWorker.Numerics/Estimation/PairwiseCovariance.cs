using System.Numerics;
using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Zero-mean covariance where days are missing, each pair over the days that both have: Σ w_t x_it x_jt / Σ w_t, t over the common
/// days. Every pair uses all it has, so the matrix may be indefinite, and a correlation made of it may exceed 1; see
/// <see cref="NearestCorrelation"/> for the repair.
/// </summary>
/// <remarks>
/// A missing day is NaN. A weight belongs to its day of the table, whichever days a pair has. The sums are those of
/// <see cref="WeightedGram"/> with zeros on missing days; without any the matrix equals the plain one to the bit.
/// </remarks>
public sealed class PairwiseCovariance
{
    private PairwiseCovariance(double[] matrix, CommonDays fewest)
    {
        Matrix = matrix;
        Fewest = fewest;
    }

    /// <summary>n × n, row-major, symmetric to the bit.</summary>
    public double[] Matrix { get; }

    /// <summary>The pair with the fewest common days; the first such.</summary>
    public CommonDays Fewest { get; }

    /// <summary>Estimates the matrix.</summary>
    /// <param name="rows">n rows of as many days as there are weights, row-major, the oldest day first; NaN where a day is missing.</param>
    /// <param name="n">Rows.</param>
    /// <param name="weights">Positive weights of the days: <see cref="DayWeights"/>.</param>
    /// <param name="fewestDays">Common days that every pair must have, at least 1.</param>
    /// <exception cref="ArgumentException">Lengths do not fit, a value is infinite, a weight is not positive, or a pair has too few days in common.</exception>
    public static PairwiseCovariance Of(ReadOnlySpan<double> rows, int n, ReadOnlySpan<double> weights, int fewestDays)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(fewestDays, 1);
        RequireWeights(weights);
        var fewest = FewestDays(rows, n);
        if (rows.Length != (long)n * weights.Length)
            throw new ArgumentException($"rows has {rows.Length} elements; {n} rows under {weights.Length} weights have {(long)n * weights.Length}.", nameof(rows));
        if (fewest.Days < fewestDays)
            throw new ArgumentException($"Rows {fewest.First} and {fewest.Second} have {fewest.Days} days in common; every pair must have at least {fewestDays}.", nameof(rows));
        var (filled, present) = (rows.ToArray(), new double[rows.Length]);
        for (var k = 0; k < filled.Length; k++)
        {
            if (double.IsNaN(filled[k])) filled[k] = 0;
            else present[k] = 1;
        }
        var matrix = WeightedGram.Of(filled, n, weights);
        var totals = WeightedGram.Of(present, n, weights);
        for (var k = 0; k < matrix.Length; k++) matrix[k] /= totals[k];
        return new(matrix, fewest);
    }

    /// <summary>The pair of rows with the fewest days on which neither is NaN; a row by itself is a pair too.</summary>
    /// <exception cref="ArgumentException">The rows are not n of one length, or a value is infinite.</exception>
    public static CommonDays FewestDays(ReadOnlySpan<double> rows, int n)
    {
        var days = Series.RequireTable(rows, n, 1, nameof(rows));
        var words = (days + 63) / 64;
        var bits = Presence(rows, n, days, words);
        var fewest = new CommonDays(0, 0, int.MaxValue);
        for (var i = 0; i < n; i++)
        {
            for (var j = 0; j <= i; j++)
            {
                var count = 0;
                for (var w = 0; w < words; w++) count += BitOperations.PopCount(bits[(i * words) + w] & bits[(j * words) + w]);
                if (count < fewest.Days) fewest = new(j, i, count);
            }
        }
        return fewest;
    }

    private static ulong[] Presence(ReadOnlySpan<double> rows, int n, int days, int words)
    {
        var bits = new ulong[n * words];
        for (var i = 0; i < n; i++)
        {
            for (var t = 0; t < days; t++)
            {
                var value = rows[(i * days) + t];
                if (double.IsInfinity(value)) throw new ArgumentException($"rows has {value} in row {i} on day {t}; a value must be finite, or NaN where it is missing.", nameof(rows));
                if (!double.IsNaN(value)) bits[(i * words) + (t / 64)] |= 1UL << (t % 64);
            }
        }
        return bits;
    }

    private static void RequireWeights(ReadOnlySpan<double> weights)
    {
        for (var t = 0; t < weights.Length; t++)
        {
            if (!(weights[t] > 0 && weights[t] < double.PositiveInfinity))
                throw new ArgumentException($"weights has {weights[t]} on day {t}; every weight must be positive and finite.", nameof(weights));
        }
    }
}

/// <summary>How many days two rows of a table have in common.</summary>
/// <param name="First">The lower number of the two, from 0.</param>
/// <param name="Second">The higher; equal to the first for a row by itself.</param>
/// <param name="Days">Days on which both have a value.</param>
public readonly record struct CommonDays(int First, int Second, int Days);
