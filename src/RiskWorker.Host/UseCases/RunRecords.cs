using System.Reflection;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics;

namespace RiskWorker.Host.UseCases;

/// <summary>Puts what a run computed together with what went into it.</summary>
public static class RunRecords
{
    private static readonly string s_version = typeof(RunRecords).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()!.InformationalVersion;

    /// <summary>The record of <paramref name="results"/>; times and command are still to be set, and the store gives attempt and id.</summary>
    public static RunRecord Of(Snapshot snapshot, RunResults results, PreviousRun? previous)
    {
        var dated = results with { Limits = [.. results.Limits.Select(l => l with { StatusSince = Since(l, snapshot.AsOf, previous) })] };
        return new RunRecord
        {
            Run = "",
            Attempt = 0,
            AsOf = snapshot.AsOf,
            Status = StatusOf(dated),
            Evidence = EvidenceKind.Recorded,
            Started = default,
            Finished = default,
            Version = s_version,
            Epoch = NumericsEpoch.Current,
            Snapshot = snapshot.Hash.Root,
            SettingsHash = snapshot.Hash.Files.First(f => f.Path == "settings").Hash,
            Parts = snapshot.Hash.Files,
            Command = "",
            Settings = snapshot.Settings,
            Results = dated,
            Figures = FiguresHash.Of(dated),
            Previous = previous,
        };
    }

    /// <summary>An exception count without the days behind it.</summary>
    public static BacktestResult CountsAlone(BacktestResult count) => count with { Days = count.Days, Series = [] };

    /// <summary>Results as a run without documents keeps them: the days behind each exception count stand in the runs that are counted, and nobody reads its sensitivities; copies in each of 250 records would be most of the store.</summary>
    public static RunResults EvidenceAlone(RunResults results) => results with { Backtest = [.. results.Backtest.Select(CountsAlone)], Sensitivities = [] };

    private static RunStatus StatusOf(RunResults results)
    {
        if (results.Findings.Any(f => f.Severity == FindingSeverity.Blocking)) return RunStatus.Failed;
        return results.Findings.Count > 0 ? RunStatus.Degraded : RunStatus.Complete;
    }

    // A repeated run of the same date does not shorten the time that a status has lasted.
    private static DateOnly Since(LimitResult limit, DateOnly asOf, PreviousRun? previous)
    {
        var before = previous?.Limits.FirstOrDefault(p => p.Limit == limit.Limit.Name);
        return before is not null && before.Status == limit.Status ? before.StatusSince : asOf;
    }
}
