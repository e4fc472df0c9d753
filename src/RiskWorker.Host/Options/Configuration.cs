using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.Options;

/// <summary>The settings of a folder, checked and complete: what a key does not say has its default.</summary>
public sealed record Configuration
{
    /// <summary>What figures depend on, with the model of record.</summary>
    public RunSettings Run { get; init; } = new();

    /// <summary>Every model by name; never empty.</summary>
    public IReadOnlyDictionary<string, ModelSettings> Models { get; init; } =
        new SortedDictionary<string, ModelSettings>(StringComparer.Ordinal) { [new ModelSettings().Name] = new() };

    /// <summary>Path of the store, relative to OUT.</summary>
    public string StorePath { get; init; } = StoreSection.DefaultPath;

    /// <summary>Past business days that are filled before a run where the store lacks them.</summary>
    public int BackfillDays { get; init; }

    /// <summary>What the service runs by itself, by name.</summary>
    public IReadOnlyList<ScheduleOptions> Schedules { get; init; } = [];

    /// <summary>These settings with what the command line says in their place. A cap below the scenarios asked for is raised to them.</summary>
    /// <exception cref="SettingsException">A number is out of range, or the model is not among <see cref="Models"/>.</exception>
    public Configuration With(RunOverrides overrides)
    {
        var faults = overrides.Faults(Models.Keys).ToList();
        if (faults.Count > 0) throw new SettingsException("command line", faults);
        var simulation = Run.Simulation;
        var scenarios = overrides.Scenarios ?? simulation.Scenarios;
        return this with
        {
            Run = Run with
            {
                Model = overrides.Model is null ? Run.Model : Models[overrides.Model],
                Challengers = overrides.Model is null ? Run.Challengers : [.. Run.Challengers.Where(c => c.Name != overrides.Model)], // a challenger that is run for the record does not run beside itself
                Simulation = simulation with { Scenarios = scenarios, Seed = overrides.Seed ?? simulation.Seed, Cap = Math.Max(scenarios, simulation.Cap) },
            },
        };
    }
}
