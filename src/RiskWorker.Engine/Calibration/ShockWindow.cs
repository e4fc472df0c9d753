namespace RiskWorker.Engine.Calibration;

/// <summary>The newest days on which every factor has a shock, and what was dropped between them.</summary>
public sealed class ShockWindow
{
    private const int CausesNamed = 10;

    private readonly int[] _kept;

    private ShockWindow(ShockTable table, int[] kept, int[] dropped)
    {
        _kept = kept;
        Days = Array.ConvertAll(kept, t => table.Dates[t]);
        Dropped = Array.ConvertAll(dropped, t => table.Dates[t]);
        DropCauses = Causes(table, dropped);
        Shocks = new double[table.Factors.Count * kept.Length];
        for (var j = 0; j < table.Factors.Count; j++)
        {
            var shocks = table.Shocks(j);
            for (var k = 0; k < kept.Length; k++) Shocks[(j * kept.Length) + k] = shocks[kept[k]];
        }
        Filled = [.. table.Factors.Select((_, j) => kept.Count(t => t < table.FirstOwn(j) && !double.IsNaN(table.Shocks(j)[t])))]; // a factor without a proxy has none there
    }

    /// <summary>The days kept, ascending; at most as many as asked for.</summary>
    public IReadOnlyList<DateOnly> Days { get; }

    /// <summary>Factors × days, row-major: row j holds the shocks of factor j in the order of <see cref="Days"/>.</summary>
    public double[] Shocks { get; }

    /// <summary>Days kept on which the shock of each factor is its proxy's.</summary>
    public IReadOnlyList<int> Filled { get; }

    /// <summary>Days after the first kept one that any factor was observed on, but on which not every factor has a shock.</summary>
    public IReadOnlyList<DateOnly> Dropped { get; }

    /// <summary>The ten factors without a shock on most of the dropped days, most first, then by name.</summary>
    public IReadOnlyList<DropCause> DropCauses { get; }

    /// <summary>Index of the first kept day in the table.</summary>
    internal int First => _kept[0];

    /// <summary>The shocks of one factor, oldest first.</summary>
    public ReadOnlySpan<double> Row(int factor) => Shocks.AsSpan(factor * _kept.Length, _kept.Length);

    /// <summary>Takes the newest <paramref name="window"/> complete days of <paramref name="table"/>.</summary>
    /// <param name="table">The shocks.</param>
    /// <param name="window">Most days.</param>
    /// <param name="lastDay">Days after it are left alone; null where none is.</param>
    /// <exception cref="CalibrationException">No day is complete.</exception>
    public static ShockWindow Newest(ShockTable table, int window, DateOnly? lastDay = null)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(window, 1);
        var (missing, observed) = Coverage(table);
        var (kept, dropped) = (new List<int>(), new List<int>());
        var end = missing.Length;
        while (end > 0 && table.Dates[end - 1] > lastDay) end--;
        for (var t = end - 1; t >= 0 && kept.Count < window; t--)
        {
            if (!observed[t]) continue;
            if (missing[t] == 0) kept.Add(t);
            else dropped.Add(t);
        }
        if (kept.Count == 0) throw new CalibrationException("observations", "There is no day on which every factor has a shock.");
        kept.Reverse();
        dropped.RemoveAll(t => t < kept[0]);
        dropped.Reverse();
        return new(table, [.. kept], [.. dropped]);
    }

    /// <summary>Takes the newest <paramref name="window"/> days of <paramref name="table"/> on which any factor has a shock; those of the others are NaN.</summary>
    /// <exception cref="CalibrationException">There is no such day.</exception>
    public static ShockWindow Observed(ShockTable table, int window, DateOnly? lastDay = null)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(window, 1);
        var (missing, _) = Coverage(table);
        var kept = new List<int>();
        for (var t = missing.Length - 1; t >= 0 && kept.Count < window; t--)
        {
            if (missing[t] < table.Factors.Count && !(table.Dates[t] > lastDay)) kept.Add(t);
        }
        if (kept.Count == 0) throw new CalibrationException("observations", "There is no day on which any factor has a shock.");
        kept.Reverse();
        return new(table, [.. kept], []);
    }

    /// <summary>For each date how many factors lack a shock, and whether any factor was observed.</summary>
    private static (int[] Missing, bool[] Observed) Coverage(ShockTable table)
    {
        var missing = new int[table.Dates.Length];
        var observed = new bool[table.Dates.Length];
        for (var j = 0; j < table.Factors.Count; j++)
        {
            var shocks = table.Shocks(j);
            var values = table.Values(j);
            for (var t = 0; t < missing.Length; t++)
            {
                if (double.IsNaN(shocks[t])) missing[t]++;
                if (!double.IsNaN(values[t])) observed[t] = true;
            }
        }
        return (missing, observed);
    }

    private static DropCause[] Causes(ShockTable table, int[] dropped)
    {
        var causes = new List<DropCause>();
        for (var j = 0; j < table.Factors.Count; j++)
        {
            var days = 0;
            foreach (var t in dropped)
            {
                if (double.IsNaN(table.Shocks(j)[t])) days++;
            }
            if (days > 0) causes.Add(new(table.Factors[j].Name, days));
        }
        return [.. causes.OrderByDescending(c => c.Days).ThenBy(c => c.Factor, StringComparer.Ordinal).Take(CausesNamed)];
    }
}

/// <summary>A factor that has no shock on some of the dropped days.</summary>
/// <param name="Factor">Its name.</param>
/// <param name="Days">On how many of them.</param>
public readonly record struct DropCause(string Factor, int Days);
