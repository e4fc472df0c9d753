using System.Globalization;

namespace RiskWorker.Host.Options;

/// <summary>What the command line sets in place of the settings file; null leaves the file's word.</summary>
/// <param name="Scenarios">Scenarios of the first look.</param>
/// <param name="Seed">Seed of every draw.</param>
/// <param name="Model">Name of the model to use as the one of record.</param>
public sealed record RunOverrides(int? Scenarios = null, ulong? Seed = null, string? Model = null)
{
    /// <summary>What is wrong with them, given the names of the models there are.</summary>
    public IEnumerable<SettingsFault> Faults(IEnumerable<string> models)
    {
        if (Scenarios is < SimulationSection.FewestScenarios or > SimulationSection.MostScenarios)
        {
            yield return new("--scenarios", Scenarios.Value.ToString(CultureInfo.InvariantCulture),
                string.Create(CultureInfo.InvariantCulture, $"a whole number from {SimulationSection.FewestScenarios:N0} to {SimulationSection.MostScenarios:N0}"));
        }
        if (Model is not null && !models.Contains(Model, StringComparer.Ordinal))
            yield return new("--model", $"'{Printable.Of(Model, 60)}'", "the name of a model of the settings: " + string.Join(", ", models));
    }
}
