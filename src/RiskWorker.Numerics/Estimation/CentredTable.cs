using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Numerics.Estimation;

/// <summary>Rows of numbers over days, about 0 or about their own means, with their deviations.</summary>
internal sealed class CentredTable
{
    private readonly double[] _rows;

    public CentredTable(ReadOnlySpan<double> rows, int count, bool removeMean)
        : this(Centred(rows, count, removeMean), count, rows.Length / count)
    {
    }

    private CentredTable(double[] rows, int count, int days)
    {
        (_rows, Count, Days, Deviations) = (rows, count, days, new double[count]);
        for (var i = 0; i < count; i++) Deviations[i] = Math.Sqrt(Series.MeanSquare(Row(i), 0));
    }

    /// <summary>Rows.</summary>
    public int Count { get; }

    /// <summary>Days.</summary>
    public int Days { get; }

    /// <summary>Root mean squares of the rows.</summary>
    public double[] Deviations { get; }

    public ReadOnlySpan<double> Row(int i) => _rows.AsSpan(i * Days, Days);

    /// <summary>The rows that move at all; an error where none does.</summary>
    public int[] Moving()
    {
        int[] moving = [.. Enumerable.Range(0, Count).Where(i => Deviations[i] > 0)];
        return moving.Length > 0 ? moving : throw new ArgumentException($"None of the {Count} rows moves; there is no correlation to estimate.");
    }

    /// <summary>The table of some rows.</summary>
    public CentredTable Only(int[] kept)
    {
        if (kept.Length == Count) return this;
        var rows = new double[kept.Length * Days];
        for (var k = 0; k < kept.Length; k++) Row(kept[k]).CopyTo(rows.AsSpan(k * Days));
        return new(rows, kept.Length, Days);
    }

    /// <summary>The table of some rows, each divided by its deviation.</summary>
    public CentredTable Standardized(int[] kept)
    {
        var rows = new double[kept.Length * Days];
        for (var k = 0; k < kept.Length; k++)
        {
            var row = Row(kept[k]);
            for (var t = 0; t < Days; t++) rows[(k * Days) + t] = row[t] / Deviations[kept[k]];
        }
        return new(rows, kept.Length, Days);
    }

    /// <summary>Σ_t x_it x_jt / T.</summary>
    public double[] Covariance()
    {
        var matrix = WeightedGram.Of(_rows, Count, DayWeights.Equal(Days));
        for (var k = 0; k < matrix.Length; k++) matrix[k] /= Days;
        return matrix;
    }

    /// <summary>Σ_t (Σ_i x_it²)² / T.</summary>
    public double FourthPower()
    {
        var squares = new double[Days];
        for (var i = 0; i < Count; i++)
        {
            var row = Row(i);
            for (var t = 0; t < Days; t++) squares[t] = Math.FusedMultiplyAdd(row[t], row[t], squares[t]);
        }
        return Kernels.LaneSum.OfSquares(squares) / Days;
    }

    private static double[] Centred(ReadOnlySpan<double> rows, int count, bool removeMean)
    {
        var days = Series.RequireTable(rows, count, 2, nameof(rows));
        Series.RequireFiniteTable(rows, days, nameof(rows));
        var centred = rows.ToArray();
        if (!removeMean) return centred;
        for (var i = 0; i < count; i++)
        {
            var row = centred.AsSpan(i * days, days);
            // A row of equal numbers has no deviation, whatever the last bit of its mean says.
            var mean = row.IndexOfAnyExcept(row[0]) < 0 ? row[0] : Series.Mean(row);
            for (var t = 0; t < days; t++) row[t] -= mean;
        }
        return centred;
    }
}
