using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>Reads <c>simulation</c>: scenarios, seed, looks and their cap.</summary>
public static class SimulationSection
{
    /// <summary>Fewest scenarios of a run: below, a 99% quantile rests on a handful of losses.</summary>
    public const int FewestScenarios = 1_000;

    /// <summary>Most scenarios of a run.</summary>
    public const int MostScenarios = 100_000_000;

    private const int MostLooks = 20;

    private static readonly Dictionary<string, RevaluationKind> s_revaluations = new(StringComparer.Ordinal) { ["surface"] = RevaluationKind.Surface, ["full"] = RevaluationKind.Full };

    /// <summary>Reads the section; absent means the defaults. A cap that is not given is never below the scenarios.</summary>
    public static SimulationSettings Read(SettingsValue? value)
    {
        var defaults = new SimulationSettings();
        if (value?.Section("scenarios", "seed", "looks", "cap", "precision", "revaluation", "surfaceError", "exactTail") is not { } section) return defaults;
        var scenarios = section["scenarios"]?.Whole(FewestScenarios, MostScenarios) ?? defaults.Scenarios;
        return defaults with
        {
            Scenarios = scenarios,
            Seed = section["seed"]?.Unsigned() ?? defaults.Seed,
            Looks = section["looks"]?.Whole(1, MostLooks) ?? defaults.Looks,
            Cap = section["cap"]?.Whole(scenarios, MostScenarios) ?? Math.Max(defaults.Cap, scenarios),
            Revaluation = section["revaluation"]?.Choice(s_revaluations) ?? defaults.Revaluation,
            SurfaceError = section["surfaceError"]?.Number(e => e is > 0 and <= 0.01, "a number above 0, at most 0.01") ?? defaults.SurfaceError,
            ExactTail = section["exactTail"]?.Flag() ?? defaults.ExactTail,
            Precision = section["precision"] is { IsNull: false } precision ? precision.Number(p => p is > 0 and < 1, "null or a number strictly between 0 and 1") : null,
        };
    }
}
