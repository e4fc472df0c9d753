using System.Globalization;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of what the estimation rests on: how many shocks, and whether one of them stands out.</summary>
internal static class HistoryChecks
{
    private const string File = "observations.csv";

    public static void Run(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        Jumps(snapshot, histories, window, findings);
        var model = snapshot.Settings.Model;
        if (model.Covariance == CovarianceEstimator.Given && model.Drift != DriftKind.Historical) return; // nothing is estimated
        Lengths(snapshot, histories, window, findings);
        Days(snapshot, histories, window, findings);
    }

    private static void Lengths(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        var names = histories.Select(h => h.Factor.Name).ToHashSet(StringComparer.Ordinal);
        var (minimum, length) = (snapshot.Settings.Checks.MinimumHistory, snapshot.Settings.Model.Window);
        var (shorter, proxied, partial) = (new List<string>(), new List<string>(), new List<string>());
        foreach (var history in histories.Where(h => h.Last >= 0 && h.ShockCount < length))
        {
            var (factor, own) = (history.Factor, history.ShockCount);
            if (own >= minimum) partial.Add($"{factor.Name} {own}");
            else if (FactorChecks.HasUsableProxy(factor, names)) proxied.Add(Proxied(history, window));
            else shorter.Add($"{factor.Name} {own}");
        }
        if (shorter.Count > 0)
        {
            findings.Add(FindingCodes.HistoryShort, File,
                $"{FindingList.Count(shorter.Count, "factor has", "factors have")} fewer than {minimum} shocks and no proxy with a beta ({FindingList.Names(shorter)}), too few to estimate a variance from");
        }
        if (proxied.Count > 0)
        {
            findings.Add(FindingCodes.HistoryProxied, File,
                $"{FindingList.Count(proxied.Count, "factor has", "factors have")} fewer than {minimum} shocks and a proxy's moves stand in ({FindingList.Names(proxied)}), so what such a factor does on its own is not in the risk");
        }
        if (partial.Count > 0)
        {
            findings.Add(FindingCodes.HistoryPartial, File,
                $"{FindingList.Count(partial.Count, "factor has", "factors have")} fewer shocks than the window of {length} ({FindingList.Names(partial)}), so fewer days enter the covariance");
        }
    }

    /// <summary>How much of the window rests on the proxy: the complete days of the others on which the factor has no shock of its own.</summary>
    private static string Proxied(FactorHistory history, EstimationWindow window)
    {
        var own = 0;
        for (var row = window.FirstRow; row < history.Shocks.Length; row++)
        {
            if (!double.IsNaN(history.Shocks[row])) own++;
        }
        var filled = Math.Max(window.Kept - own, 0);
        var share = window.Kept == 0 ? 1 : (double)filled / window.Kept;
        return string.Create(CultureInfo.InvariantCulture, $"{history.Factor.Name} by {history.Factor.Beta} of {history.Factor.Proxy} on {filled} of {window.Kept} days, {share * 100:0}%");
    }

    private static void Days(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        var (minimum, length) = (snapshot.Settings.Checks.MinimumHistory, snapshot.Settings.Model.Window);
        if (window.Kept < minimum && histories.Any(h => h.ShockCount >= minimum))
        {
            findings.Add(FindingCodes.DaysFew, File,
                $"only {FindingList.Count(window.Kept, "day is", "days are")} complete over all factors, of at least {minimum} wanted, although {FindingList.Count(histories.Count(h => h.ShockCount >= minimum), "factor has", "factors have")} enough of their own");
        }
        if (window.Dropped == 0) return;
        findings.Add(FindingCodes.DaysDropped, File,
            $"{FindingList.Count(window.Dropped, "day is", "days are")} left out of the covariance because not every factor has a shock on them, so the {window.Kept} days used, of a window of {length}, are not consecutive");
    }

    private static void Jumps(Snapshot snapshot, IReadOnlyList<FactorHistory> histories, EstimationWindow window, FindingList findings)
    {
        var found = new List<string>();
        foreach (var history in histories)
        {
            foreach (var (row, sigmas) in JumpDetection.Of(history.Shocks.AsSpan(window.FirstRow..), snapshot.Settings.Checks.JumpSigmas))
            {
                var size = double.IsInfinity(sigmas) ? "where no other day moved" : string.Create(CultureInfo.InvariantCulture, $"by {sigmas:0.0}");
                found.Add($"{history.Factor.Name} on {snapshot.Observations.Dates[window.FirstRow + row]:yyyy-MM-dd} {size}");
            }
        }
        if (found.Count == 0) return;
        findings.Add(FindingCodes.PriceJump, File,
            string.Create(CultureInfo.InvariantCulture, $"{FindingList.Count(found.Count, "move is", "moves are")} larger than {snapshot.Settings.Checks.JumpSigmas} standard deviations of the factor's other days in the window ({FindingList.Names(found)}), and {(found.Count == 1 ? "it stays" : "they stay")} in the estimation"));
    }
}
