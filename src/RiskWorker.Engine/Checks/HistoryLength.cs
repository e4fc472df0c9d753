using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Checks;

/// <summary>Whether a factor's own shocks are enough.</summary>
internal static class HistoryLength
{
    /// <summary>Whether a proxy can stand in for <paramref name="factor"/>: another one of <paramref name="factors"/>, and a beta.</summary>
    public static bool HasProxy(Factor factor, IReadOnlyList<Factor> factors) =>
        factor is { Proxy: { } proxy, Beta: not null } && proxy != factor.Name && factors.Any(f => f.Name == proxy);

    /// <summary>Whether the factor has fewer shocks of its own than the minimum.</summary>
    public static bool IsShort(Snapshot snapshot, ShockTable table, int factor) =>
        table.OwnCount(factor) < snapshot.Settings.Checks.MinimumHistory;

    /// <summary>Whether it is so short, with nothing to stand in, that the run stops.</summary>
    public static bool IsBlocking(Snapshot snapshot, ShockTable table, int factor)
    {
        if (table.LastObserved(factor) < 0) return true;
        return IsShort(snapshot, table, factor)
            && !HasProxy(table.Factors[factor], table.Factors)
            && FindingCodes.HistoryShort.SeverityUnder(snapshot.Settings.Checks) == FindingSeverity.Blocking;
    }
}
