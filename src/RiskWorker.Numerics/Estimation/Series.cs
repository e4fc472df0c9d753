using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>Guards on series of numbers and tables of them, and their mean squares.</summary>
internal static class Series
{
    /// <summary>The mean of (x - centre)², in the fixed order of <see cref="LaneSum"/>.</summary>
    public static double MeanSquare(ReadOnlySpan<double> values, double centre)
    {
        var deviations = new double[values.Length];
        for (var t = 0; t < deviations.Length; t++) deviations[t] = values[t] - centre;
        return LaneSum.OfSquares(deviations) / values.Length;
    }

    /// <summary>The mean, corrected by the mean of what it leaves.</summary>
    public static double Mean(ReadOnlySpan<double> values)
    {
        var rough = LaneSum.Of(values) / values.Length;
        var left = new double[values.Length];
        for (var t = 0; t < left.Length; t++) left[t] = values[t] - rough;
        return rough + (LaneSum.Of(left) / values.Length);
    }

    public static void RequireFinite(ReadOnlySpan<double> values, int fewest, string name)
    {
        if (values.Length < fewest) throw new ArgumentException($"{name} has {values.Length} days; at least {fewest} are needed.", name);
        for (var t = 0; t < values.Length; t++)
        {
            if (!double.IsFinite(values[t])) throw new ArgumentException($"{name} has {values[t]} on day {t}; every value must be finite.", name);
        }
    }

    public static void RequireFinite(double value, string name)
    {
        if (!double.IsFinite(value)) throw new ArgumentOutOfRangeException(name, value, $"{name} must be finite.");
    }

    /// <summary>Days of a table of <paramref name="count"/> series, row-major.</summary>
    public static int RequireTable(ReadOnlySpan<double> rows, int count, int fewest, string name)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        if (rows.Length % count != 0) throw new ArgumentException($"{name} has {rows.Length} elements; {count} rows of one length cannot be made of them.", name);
        var days = rows.Length / count;
        if (days < fewest) throw new ArgumentException($"{name} has {days} days; at least {fewest} are needed.", name);
        return days;
    }

    public static void RequireFiniteTable(ReadOnlySpan<double> rows, int days, string name)
    {
        for (var k = 0; k < rows.Length; k++)
        {
            if (!double.IsFinite(rows[k])) throw new ArgumentException($"{name} has {rows[k]} in row {k / days} on day {k % days}; every value must be finite.", name);
        }
    }
}
