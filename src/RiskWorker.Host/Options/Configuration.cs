using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>The settings of a folder, checked and complete: what a key does not say has its default.</summary>
public sealed record Configuration
{
    /// <summary>What figures depend on, with the model of record, as it is written.</summary>
    public RunSettings Written { get; init; } = new();

    /// <summary>The same with what the rule sets fill in.</summary>
    public RunSettings Run => RuleSets.Apply(Written);

    /// <summary>Every model by name; never empty.</summary>
    public IReadOnlyDictionary<string, ModelSettings> Models { get; init; } =
        new SortedDictionary<string, ModelSettings>(StringComparer.Ordinal) { [new ModelSettings().Name] = new() };

    /// <summary>Path of the store, relative to OUT.</summary>
    public string StorePath { get; init; } = StoreSection.DefaultPath;

    /// <summary>Past business days that are filled before a run where the store lacks them.</summary>
    public int BackfillDays { get; init; }

    /// <summary>What the service runs by itself, by name.</summary>
    public IReadOnlyList<ScheduleOptions> Schedules { get; init; } = [];

    /// <summary>With what evidence is signed, its path as written: relative to the folder of the settings; null where it is not.</summary>
    public SigningOptions? Signing { get; init; }

    /// <summary>These settings with what the command line says in their place. A cap below the scenarios asked for is raised to them.</summary>
    /// <exception cref="SettingsException">A number is out of range, or the model is not among <see cref="Models"/>.</exception>
    public Configuration With(RunOverrides overrides)
    {
        var faults = overrides.Faults(Models.Keys).ToList();
        if (faults.Count > 0) throw new SettingsException("command line", faults);
        var simulation = Written.Simulation;
        var scenarios = overrides.Scenarios ?? simulation.Scenarios;
        return this with
        {
            Written = Written with
            {
                Model = overrides.Model is null ? Written.Model : Models[overrides.Model],
                // A challenger that is run for the record does not run beside itself.
                Challengers = overrides.Model is null ? Written.Challengers : [.. Written.Challengers.Where(c => c.Name != overrides.Model)],
                Simulation = simulation with { Scenarios = scenarios, Seed = overrides.Seed ?? simulation.Seed, Cap = Math.Max(scenarios, simulation.Cap) },
            },
        };
    }
}
