using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Checks;

/// <summary>What can be found in a snapshot before anything is valued.</summary>
public static class FeedChecks
{
    /// <summary>All findings, blocking ones first; every check runs, so that one answer holds all faults.</summary>
    /// <remarks>Lines that cannot be priced, the currency of an instrument included, are the valuation's to tell: it knows their size.</remarks>
    public static IReadOnlyList<Finding> Run(Snapshot snapshot)
    {
        var findings = new FindingList(snapshot.Settings.Checks);
        BookChecks.Run(snapshot, findings);
        FactorChecks.Run(snapshot, findings);
        var histories = FactorHistory.All(snapshot);
        var window = EstimationWindow.Of(snapshot, histories);
        PriceChecks.Run(snapshot, histories, window, findings);
        HistoryChecks.Run(snapshot, histories, window, findings);
        return findings.Ordered();
    }
}
