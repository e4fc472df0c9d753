using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of the window's days: prices missing where others have one, and prices where the market is closed.</summary>
internal static class DayChecks
{
    private const string File = "observations.csv";

    public static void Run(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        Missing(snapshot, table, window, findings);
        Closed(snapshot, table, window, findings);
    }

    private static void Missing(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        var missing = new List<(string Name, int Days)>();
        foreach (var calendar in Enumerable.Range(0, table.Factors.Count).GroupBy(j => table.Factors[j].Calendar, StringComparer.Ordinal))
        {
            var observed = ObservedByAny(table, calendar);
            foreach (var j in calendar)
            {
                var days = MissingDays(snapshot.AsOf, table, window, observed, j);
                if (days > 0) missing.Add((table.Factors[j].Name, days));
            }
        }
        if (missing.Count == 0) return;
        string[] names = [.. missing.OrderBy(m => m.Name, StringComparer.Ordinal).Select(m => $"{m.Name} {FindingList.Count(m.Days, "day", "days")}")];
        findings.Add(FindingCodes.DayMissing, File,
            $"{FindingList.Count(missing.Sum(m => m.Days), "price is", "prices are")} missing in the window where others of the same calendar have one ({FindingList.Names(names)}), and each takes the shocks on both its sides out of the estimation");
    }

    private static bool[] ObservedByAny(ShockTable table, IEnumerable<int> factors)
    {
        var observed = new bool[table.Dates.Length];
        foreach (var j in factors)
        {
            var values = table.Values(j);
            for (var t = 0; t < observed.Length; t++) observed[t] |= !double.IsNaN(values[t]);
        }
        return observed;
    }

    /// <summary>Days missing after the factor's first price; the as-of date has findings of its own.</summary>
    private static int MissingDays(DateOnly asOf, ShockTable table, EstimationWindow window, bool[] observed, int factor)
    {
        var values = table.Values(factor);
        var (days, hasBegun) = (0, false);
        for (var t = 0; t < observed.Length && table.Dates[t] < asOf; t++)
        {
            hasBegun |= !double.IsNaN(values[t]);
            if (hasBegun && t >= window.FirstRow && observed[t] && double.IsNaN(values[t])) days++;
        }
        return days;
    }

    private static void Closed(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        var (total, names) = (0, new List<string>());
        for (var j = 0; j < table.Factors.Count; j++)
        {
            if (table.ClosedDayObservations(j) == 0) continue;
            var observed = snapshot.Observations.Column(snapshot.Observations.ColumnOf(table.Factors[j].Name));
            var days = 0;
            for (var t = window.FirstRow; t < table.Dates.Length; t++)
            {
                if (!double.IsNaN(observed[t]) && !table.IsOpen(j, t)) days++;
            }
            if (days == 0) continue;
            total += days;
            names.Add($"{table.Factors[j].Name} {FindingList.Count(days, "day", "days")}");
        }
        if (total == 0) return;
        findings.Add(FindingCodes.DayClosed, File,
            $"{FindingList.Count(total, "price stands", "prices stand")} on days of the window when the calendar is closed ({FindingList.Names(names)}), and no figure uses them");
    }
}
