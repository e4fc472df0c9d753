using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Checks;

/// <summary>What can be found in a snapshot before anything is valued.</summary>
public static class FeedChecks
{
    /// <summary>All findings, blocking ones first; every check runs, so that one answer holds all faults.</summary>
    /// <remarks>
    /// Lines that cannot be priced, the currency of an instrument included, are the valuation's to tell: it knows their size.
    /// Without a blocking finding the snapshot can be calibrated.
    /// </remarks>
    public static IReadOnlyList<Finding> Run(Snapshot snapshot)
    {
        var findings = new FindingList(snapshot.Settings.Checks);
        BookChecks.Run(snapshot, findings);
        FactorChecks.Run(snapshot, findings);
        var table = ShockTable.From(snapshot);
        var window = new EstimationWindow(snapshot, table);
        PriceChecks.Run(snapshot, table, window, findings);
        DayChecks.Run(snapshot, table, window, findings);
        HistoryChecks.Run(snapshot, table, window, findings);
        return findings.Ordered();
    }
}
