using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of the factors' descriptions, and of every file and setting that names a factor.</summary>
internal static class FactorChecks
{
    public static void Run(Snapshot snapshot, FindingList findings)
    {
        var names = snapshot.Factors.Select(f => f.Name).ToHashSet(StringComparer.Ordinal);
        Calendars(snapshot, findings);
        Proxies(snapshot, findings);
        Curves(snapshot, findings);
        Currencies(snapshot, findings);
        Unknown(snapshot.Adjustments.Select(a => a.Factor), names, FindingCodes.AdjustmentUnknown, "adjustments.csv", findings);
        if (snapshot.Settings.Model.Drift == DriftKind.Explicit)
            Unknown(snapshot.Settings.Model.Drifts.Keys, names, FindingCodes.DriftUnknown, "riskworker.json", findings);
        if (snapshot.Settings.Model.Covariance == CovarianceEstimator.Given) Covariance(snapshot, names, findings);
    }

    private static void Calendars(Snapshot snapshot, FindingList findings)
    {
        var known = snapshot.Holidays.Select(h => h.Calendar).ToHashSet(StringComparer.Ordinal);
        string[] unknown = [.. snapshot.Factors.Select(f => f.Calendar).OfType<string>().Where(c => !known.Contains(c)).Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal)];
        if (unknown.Length == 0) return;
        findings.Add(FindingCodes.CalendarUnknown, "factors.csv",
            $"{FindingList.Count(unknown.Length, "calendar is", "calendars are")} not in holidays.csv ({FindingList.Names(unknown)}), so every Monday to Friday counts as open and a holiday there looks like a missing price");
    }

    private static void Proxies(Snapshot snapshot, FindingList findings)
    {
        string[] unusable = [.. snapshot.Factors.Where(f => f.Proxy is not null && !HistoryLength.HasProxy(f, snapshot.Factors)).Select(f => $"{f.Name} by {f.Proxy}")];
        if (unusable.Length == 0) return;
        findings.Add(FindingCodes.ProxyUnusable, "factors.csv",
            $"{FindingList.Count(unusable.Length, "factor has a proxy that is", "factors have proxies that are")} unknown, the factor itself, or without a beta ({FindingList.Names(unusable)}), so nothing stands in for missing history");
    }

    private static void Curves(Snapshot snapshot, FindingList findings)
    {
        string[] unusable = [.. new CurveSet(snapshot.Factors).Faults.Select(f => $"{f.Curve}: {f.Clause}")];
        if (unusable.Length == 0) return;
        findings.Add(FindingCodes.CurveUnusable, "factors.csv",
            $"{FindingList.Count(unusable.Length, "curve cannot", "curves cannot")} be used ({FindingList.Names(unusable)}), so no instrument that names {(unusable.Length == 1 ? "it" : "them")} is in a figure");
    }

    private static void Currencies(Snapshot snapshot, FindingList findings)
    {
        // With several roots or none the reporting currency is open, and the tree's own finding comes first.
        if (BookTree.Build(snapshot.Books).Tree is not { } tree) return;
        var priced = new HashSet<string>(StringComparer.Ordinal) { tree.ReportingCurrency };
        string[] unused = [.. snapshot.Factors.Where(f => f.Class == FactorClass.Fx && (f.Currency is null || !priced.Add(f.Currency))).Select(f => $"{f.Name} for {f.Currency ?? "no currency"}")];
        if (unused.Length == 0) return;
        findings.Add(FindingCodes.FxFactorUnused, "factors.csv",
            $"{FindingList.Count(unused.Length, "fx factor names", "fx factors name")} no currency, the reporting currency, or one that is priced already ({FindingList.Names(unused)}), so no conversion reads it");
    }

    private static void Covariance(Snapshot snapshot, HashSet<string> names, FindingList findings)
    {
        Unknown(snapshot.Covariance.SelectMany(c => new[] { c.Factor, c.Other }), names, FindingCodes.CovarianceUnknown, "covariance.csv", findings);
        try
        {
            GivenCovariance.Of(snapshot.Covariance, snapshot.Factors);
        }
        catch (CalibrationException fault)
        {
            findings.Add(FindingCodes.CovarianceUnusable, "covariance.csv", $"the given covariance cannot be used at {fault.Subject} ({fault.Reason.TrimEnd('.')}), so no factor's risk is known");
        }
    }

    private static void Unknown(IEnumerable<string> used, HashSet<string> names, FindingCode code, string subject, FindingList findings)
    {
        string[] unknown = [.. used.Where(f => !names.Contains(f)).Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal)];
        if (unknown.Length == 0) return;
        findings.Add(code, subject, $"{FindingList.Count(unknown.Length, "factor named there is", "factors named there are")} not in factors.csv ({FindingList.Names(unknown)}), so what is said of them is ignored");
    }
}
