using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of single prices: missing, closed, stale, not positive.</summary>
internal static class PriceChecks
{
    private const string File = "observations.csv";

    public static void Run(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        Unobserved(histories, findings);
        LastDay(snapshot, histories, findings);
        NotPositive(snapshot, histories, window, findings);
        Stale(snapshot, histories, findings);
        MissingDays(snapshot, histories, window, findings);
        ClosedDays(snapshot, histories, window, findings);
    }

    private static void Unobserved(IReadOnlyList<FactorHistory> histories, FindingList findings)
    {
        string[] names = [.. histories.Where(h => h.Last < 0).Select(h => h.Factor.Name)];
        if (names.Length == 0) return;
        findings.Add(FindingCodes.FactorUnobserved, File,
            $"{FindingList.Count(names.Length, "factor was", "factors were")} never observed ({FindingList.Names(names)}), so there is neither a price nor a move");
    }

    private static void LastDay(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, FindingList findings)
    {
        var (missing, closed) = (new List<string>(), new List<string>());
        foreach (var history in histories.Where(h => h.Last >= 0))
        {
            var last = snapshot.Observations.Dates[history.Last];
            if (last == snapshot.AsOf) continue;
            var isOpen = history.Days.Calendar.IsOpen(snapshot.AsOf);
            (isOpen ? missing : closed).Add($"{history.Factor.Name} {FindingList.Count(snapshot.AsOf.DayNumber - last.DayNumber, "day", "days")} old");
        }
        if (missing.Count > 0)
        {
            findings.Add(FindingCodes.FactorMissing, File,
                $"{FindingList.Count(missing.Count, "factor has", "factors have")} no observation on {snapshot.AsOf:yyyy-MM-dd} although the calendar is open ({FindingList.Names(missing)}), so an old price would stand under the new date");
        }
        if (closed.Count == 0) return;
        findings.Add(FindingCodes.FactorClosed, File,
            $"{FindingList.Count(closed.Count, "factor has", "factors have")} a calendar that is closed on {snapshot.AsOf:yyyy-MM-dd} ({FindingList.Names(closed)}), so the last price is used");
    }

    private static void NotPositive(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        var found = new List<string>();
        foreach (var history in histories.Where(h => h.Factor.Shock == ShockKind.Lognormal && h.Last >= 0))
        {
            for (var row = Math.Min(window.FirstRow, history.Last); row <= history.Last; row++)
            {
                if (history.Observed[row] <= 0) found.Add($"{history.Factor.Name} on {snapshot.Observations.Dates[row]:yyyy-MM-dd}");
            }
        }
        if (found.Count == 0) return;
        findings.Add(FindingCodes.PriceNotPositive, File,
            $"{FindingList.Count(found.Count, "price of a factor", "prices of factors")} with lognormal shocks {(found.Count == 1 ? "is" : "are")} zero or negative ({FindingList.Names(found)}), so the move has no logarithm");
    }

    private static void Stale(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, FindingList findings)
    {
        var stale = new List<string>();
        foreach (var history in histories)
        {
            var days = UnchangedDays(history);
            if (days >= snapshot.Settings.Checks.StaleDays) stale.Add($"{history.Factor.Name} for {days}");
        }
        if (stale.Count == 0) return;
        findings.Add(FindingCodes.PriceStale, File,
            $"{FindingList.Count(stale.Count, "factor is", "factors are")} unchanged for {snapshot.Settings.Checks.StaleDays} or more business days at the end ({FindingList.Names(stale)}), which understates the risk if the price is not live");
    }

    /// <summary>Business days at the end whose price equals the one observed before; a day without a price neither counts nor ends the row.</summary>
    private static int UnchangedDays(FactorHistory history)
    {
        var (days, later) = (-1, double.NaN);
        for (var row = history.Last; row >= 0; row--)
        {
            var value = history.Adjusted[row];
            if (double.IsNaN(value) || !history.Days.IsOpen(row)) continue;
            if (days >= 0 && value != later) break;
            (days, later) = (days + 1, value);
        }
        return Math.Max(days, 0);
    }

    private static void MissingDays(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        var missing = new List<(string Name, int Days)>();
        foreach (var group in histories.GroupBy(h => h.Days))
        {
            var observed = new bool[snapshot.Observations.Count];
            for (var row = window.FirstRow; row < observed.Length; row++) observed[row] = group.Key.IsOpen(row) && group.Any(h => !double.IsNaN(h.Observed[row]));
            foreach (var history in group.Where(h => h.First >= 0))
            {
                var days = 0;
                for (var row = Math.Max(window.FirstRow, history.First); row < observed.Length; row++)
                {
                    // The as-of date has findings of its own.
                    if (observed[row] && double.IsNaN(history.Observed[row]) && snapshot.Observations.Dates[row] != snapshot.AsOf) days++;
                }
                if (days > 0) missing.Add((history.Factor.Name, days));
            }
        }
        if (missing.Count == 0) return;
        string[] names = [.. missing.OrderBy(m => m.Name, StringComparer.Ordinal).Select(m => $"{m.Name} {FindingList.Count(m.Days, "day", "days")}")];
        findings.Add(FindingCodes.DayMissing, File,
            $"{FindingList.Count(missing.Sum(m => m.Days), "price is", "prices are")} missing in the window where others of the same calendar have one ({FindingList.Names(names)}), and each takes the shocks on both its sides out of the estimation");
    }

    private static void ClosedDays(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        var (total, names) = (0, new List<string>());
        foreach (var history in histories)
        {
            var days = 0;
            for (var row = window.FirstRow; row <= history.Last; row++)
            {
                if (!history.Days.IsOpen(row) && !double.IsNaN(history.Observed[row])) days++;
            }
            if (days == 0) continue;
            total += days;
            names.Add($"{history.Factor.Name} {FindingList.Count(days, "day", "days")}");
        }
        if (total == 0) return;
        findings.Add(FindingCodes.DayClosed, File,
            $"{FindingList.Count(total, "price stands", "prices stand")} on days of the window when the calendar is closed ({FindingList.Names(names)}), and no shock uses them");
    }
}
