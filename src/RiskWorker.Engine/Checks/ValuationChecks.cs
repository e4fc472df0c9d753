using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Checks;

/// <summary>What can be found once the positions are valued.</summary>
public static class ValuationChecks
{
    /// <summary>All findings; lines that no figure holds come with their notional.</summary>
    /// <param name="snapshot">Where the positions are from.</param>
    /// <param name="tree">Its books.</param>
    /// <param name="today">Its positions, valued.</param>
    /// <param name="previous">Those of the previous date at its own prices; null where there are none.</param>
    public static IReadOnlyList<Finding> Run(Snapshot snapshot, BookTree tree, LineValue[] today, LineValue[]? previous)
    {
        var findings = new FindingList(snapshot.Settings.Checks);
        UnpricedChecks.Run(snapshot, tree, today, findings);
        AddCrossedBarriers(today, findings);
        BookValueChecks.Run(snapshot, tree, today, previous, findings);
        return findings.Ordered();
    }

    private static void AddCrossedBarriers(LineValue[] lines, FindingList findings)
    {
        string[] crossed = [.. lines.Where(l => l.Bound?.CrossedBarrier is not null).Select(l => $"{l.Position.Instrument}: {l.Bound!.CrossedBarrier}").Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal)];
        if (crossed.Length > 0) findings.Add(FindingCodes.BarrierCrossed, "instruments.csv", $"{FindingList.Count(crossed.Length, "barrier", "barriers")} crossed before this date: {FindingList.Names(crossed)}");
    }
}
