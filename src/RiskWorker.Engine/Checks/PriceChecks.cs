using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of the newest price of each factor, and of prices that have no logarithm.</summary>
internal static class PriceChecks
{
    private const string File = "observations.csv";

    public static void Run(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        Unobserved(table, findings);
        LastDay(snapshot, table, findings);
        NotPositive(table, window, findings);
        Stale(snapshot.Settings.Checks.StaleDays, table, findings);
    }

    private static void Unobserved(ShockTable table, FindingList findings)
    {
        string[] names = [.. table.Factors.Where((_, j) => table.LastObserved(j) < 0).Select(f => f.Name)];
        if (names.Length == 0) return;
        findings.Add(FindingCodes.FactorUnobserved, File,
            $"{FindingList.Count(names.Length, "factor was", "factors were")} never observed on an open day ({FindingList.Names(names)}), so there is neither a price nor a move");
    }

    private static void LastDay(Snapshot snapshot, ShockTable table, FindingList findings)
    {
        var calendars = BusinessCalendar.ByName(snapshot.Holidays);
        var (missing, closed) = (new List<string>(), new List<string>());
        for (var j = 0; j < table.Factors.Count; j++)
        {
            if (table.LastObserved(j) is not (>= 0 and var last) || table.Dates[last] == snapshot.AsOf) continue;
            var isOpen = calendars.GetValueOrDefault(table.Factors[j].Calendar ?? "", BusinessCalendar.Weekdays).IsOpen(snapshot.AsOf);
            (isOpen ? missing : closed).Add($"{table.Factors[j].Name} {FindingList.Count(snapshot.AsOf.DayNumber - table.Dates[last].DayNumber, "day", "days")} old");
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

    private static void NotPositive(ShockTable table, EstimationWindow window, FindingList findings)
    {
        var found = new List<string>();
        for (var j = 0; j < table.Factors.Count; j++)
        {
            if (table.Factors[j].Shock != ShockKind.Lognormal) continue;
            var values = table.Values(j);
            for (var t = FirstUsed(table, window, j); t < values.Length; t++)
            {
                if (values[t] <= 0) found.Add($"{table.Factors[j].Name} on {table.Dates[t]:yyyy-MM-dd}");
            }
        }
        if (found.Count == 0) return;
        findings.Add(FindingCodes.PriceNotPositive, File,
            $"{FindingList.Count(found.Count, "price is", "prices are")} zero or negative where the factor has lognormal shocks ({FindingList.Names(found)}), so the moves there have no logarithm");
    }

    /// <summary>The business day before the window, whose price its first shock reads; the last price where that is older still.</summary>
    private static int FirstUsed(ShockTable table, EstimationWindow window, int factor)
    {
        if (table.LastObserved(factor) is var last && last <= window.FirstRow) return Math.Max(last, 0);
        return table.Previous(factor, window.FirstRow) is >= 0 and var before ? before : window.FirstRow;
    }

    private static void Stale(int limit, ShockTable table, FindingList findings)
    {
        var stale = new List<string>();
        for (var j = 0; j < table.Factors.Count; j++)
        {
            var days = UnchangedDays(table.Values(j));
            if (days >= limit) stale.Add($"{table.Factors[j].Name} for {days}");
        }
        if (stale.Count == 0) return;
        findings.Add(FindingCodes.PriceStale, File,
            $"{FindingList.Count(stale.Count, "factor is", "factors are")} unchanged at the end for {limit} or more of {(stale.Count == 1 ? "its" : "their")} business days ({FindingList.Names(stale)}), which understates the risk if the price is not live");
    }

    /// <summary>Business days at the end whose price equals the one observed before; a day without a price neither counts nor ends the row.</summary>
    private static int UnchangedDays(ReadOnlySpan<double> values)
    {
        var (days, later) = (-1, double.NaN);
        for (var t = values.Length - 1; t >= 0; t--)
        {
            if (double.IsNaN(values[t])) continue;
            if (days >= 0 && values[t] != later) break;
            (days, later) = (days + 1, values[t]);
        }
        return Math.Max(days, 0);
    }
}
