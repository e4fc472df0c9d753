using System.Globalization;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Models;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of what the estimation rests on: how many shocks, and whether one of them stands out.</summary>
internal static class HistoryChecks
{
    private const string File = "observations.csv";

    public static void Run(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        Jumps(snapshot, table, window, findings);
        var model = snapshot.Settings.Model;
        if (model.Covariance == CovarianceEstimator.Given && model.Drift != DriftKind.Historical) return; // nothing is estimated
        Lengths(snapshot, table, window, findings);
        if (model.MissingDays == MissingDays.Complete || Drift.NeedsShocks(model) || ScenarioLaws.NeedShocks(model)) Days(snapshot, table, window, findings); // pairs of factors need no day that all have
    }

    private static void Lengths(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        var (minimum, length) = (snapshot.Settings.Checks.MinimumHistory, snapshot.Settings.Model.Window);
        var (shorter, proxied, partial) = (new List<string>(), new List<string>(), new List<string>());
        for (var j = 0; j < table.Factors.Count; j++)
        {
            if (table.LastObserved(j) < 0 || table.OwnCount(j) >= length) continue;
            var own = $"{table.Factors[j].Name} {table.OwnCount(j)}";
            if (HistoryLength.HasProxy(table.Factors[j], table.Factors)) proxied.Add($"{own} {Filled(table, window, j)}");
            else if (HistoryLength.IsShort(snapshot, table, j)) shorter.Add(own);
            else partial.Add(own);
        }
        if (shorter.Count > 0)
        {
            findings.Add(FindingCodes.HistoryShort, File,
                $"{FindingList.Count(shorter.Count, "factor has", "factors have")} fewer than {minimum} shocks and no proxy with a beta ({FindingList.Names(shorter)}), too few to estimate a variance from");
        }
        if (proxied.Count > 0)
        {
            findings.Add(FindingCodes.HistoryProxied, File,
                $"{FindingList.Count(proxied.Count, "factor has", "factors have")} fewer shocks than the window of {length} and a proxy's moves stand in before the first ({FindingList.Names(proxied)}), so what such a factor did on its own on those days is not in the risk");
        }
        if (partial.Count > 0)
        {
            findings.Add(FindingCodes.HistoryPartial, File,
                $"{FindingList.Count(partial.Count, "factor has", "factors have")} fewer shocks than the window of {length} ({FindingList.Names(partial)}), so fewer days enter the covariance");
        }
    }

    /// <summary>How much of the window rests on the proxy.</summary>
    private static string Filled(ShockTable table, EstimationWindow window, int factor)
    {
        var filled = 0;
        for (var t = window.FirstRow; t < table.FirstOwn(factor); t++)
        {
            if (window.IsKept(t)) filled++;
        }
        var share = window.Kept == 0 ? 0 : 100.0 * filled / window.Kept;
        return string.Create(CultureInfo.InvariantCulture, $"of its own, {table.Factors[factor].Beta} times {table.Factors[factor].Proxy} on {filled} of {window.Kept} days, {share:0.#}% of the window");
    }

    private static void Days(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        if (window.Factors.Count > 0 && (window.Kept == 0 || window.Kept < FewestExpected(snapshot, table, window)))
        {
            findings.Add(window.Kept == 0 ? FindingCodes.DaysNone : FindingCodes.DaysFew, File,
                $"{FindingList.Count(window.Kept, "day is", "days are")} complete over all factors, of at least {snapshot.Settings.Checks.MinimumHistory} wanted, although the single factors have more, so there is too little to estimate a covariance from");
        }
        if (window.Dropped == 0) return;
        string[] causes = [.. window.DropCauses().Select(c => $"{c.Factor} {FindingList.Count(c.Days, "day", "days")}")];
        findings.Add(FindingCodes.DaysDropped, File,
            $"{FindingList.Count(window.Dropped, "day is", "days are")} left out of the covariance because not every factor has a shock on them ({FindingList.Names(causes)}), so the {window.Kept} days used, of a window of {snapshot.Settings.Model.Window}, are not consecutive");
    }

    /// <summary>The minimum, or what the shortest factor has where that was let pass.</summary>
    private static int FewestExpected(Snapshot snapshot, ShockTable table, EstimationWindow window) =>
        window.Factors.Where(j => !HistoryLength.HasProxy(table.Factors[j], table.Factors)).Select(table.OwnCount)
            .Append(snapshot.Settings.Checks.MinimumHistory).Min();

    private static void Jumps(Snapshot snapshot, ShockTable table, EstimationWindow window, FindingList findings)
    {
        var (sigmas, found) = (snapshot.Settings.Checks.JumpSigmas, new List<string>());
        for (var j = 0; j < table.Factors.Count; j++)
        {
            var first = Math.Max(window.FirstRow, table.FirstOwn(j)); // a proxy's move is the proxy's to tell
            if (first >= table.Dates.Length) continue;
            foreach (var (row, size) in JumpDetection.Of(table.Shocks(j)[first..], sigmas))
            {
                var multiple = double.IsInfinity(size) ? "where no other day moved" : string.Create(CultureInfo.InvariantCulture, $"by {size:0.0}");
                found.Add($"{table.Factors[j].Name} on {table.Dates[first + row]:yyyy-MM-dd} {multiple}");
            }
        }
        if (found.Count == 0) return;
        findings.Add(FindingCodes.PriceJump, File, string.Create(CultureInfo.InvariantCulture,
            $"{FindingList.Count(found.Count, "move is", "moves are")} larger than {sigmas} standard deviations of the factor's other days in the window ({FindingList.Names(found)}), and what is wrong among them distorts volatility and correlation"));
    }
}
