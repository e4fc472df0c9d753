using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Limits;

/// <summary>What makes a run this run: enough to find it, to trust it and to make it again.</summary>
internal static class Identity
{
    private const int ShortHash = 16;
    private const int MostBeside = 4;

    /// <summary>The block of page 1, hashes cut.</summary>
    public static Facts Short(RunReading run) => new(
    [
        new("As of", RichText.Strong(Numerals.Date(run.Record.AsOf))),
        new("Status", RichText.Strong(Phrases.Word(run.Record.Status))),
        .. Run(run.Record),
        .. Inputs(run.Record),
        new("Inputs", Cut(run.Record.Snapshot)),
        new("Settings", Cut(run.Record.SettingsHash)),
        new("Run it again", run.Record.Command),
    ]);

    /// <summary>The block of the method page, hashes in full.</summary>
    public static Facts Full(RunReading run) => new(
    [
        new("Snapshot", run.Record.Snapshot),
        new("Settings", run.Record.SettingsHash),
        .. run.Results.Calibration is { } calibration ? [new Fact("Plan", calibration.Plan)] : (IEnumerable<Fact>)[],
        new("Figures", run.Record.Figures),
        .. run.ChainHead is { } head ? [new Fact("Chain head", head)] : (IEnumerable<Fact>)[],
        new("Run it again", run.Record.Command),
    ]);

    /// <summary>How many scenarios, and what made them: a seed, or the past.</summary>
    public static string Scenarios(ModelSettings model, SimulationSummary simulation) => ModelWords.Moves(model).Kind == ModelKind.Historical
        ? $"{Numerals.Count(simulation.Scenarios)} past days, none drawn"
        : $"{Numerals.Count(simulation.Scenarios)}, seed {simulation.Seed}";

    private static IEnumerable<Fact> Run(RunRecord record)
    {
        var attempt = record.Attempt > 1 ? $", attempt {Numerals.Count(record.Attempt)}" : "";
        yield return new("Run", $"{record.Run}{attempt}, {(record.Evidence == EvidenceKind.Recorded ? "recorded" : "backfilled")}");
        yield return new("Made", Phrases.Utc(record.Finished));
    }

    private static IEnumerable<Fact> Inputs(RunRecord record)
    {
        yield return new("Model", ModelWords.Line(record.Settings.Model));
        if (record.Results.Models.Count > 0)
            yield return new("Beside it", string.Join(", ", record.Results.Models.Take(MostBeside).Select(model => model.Name)) + (record.Results.Models.Count > MostBeside ? $" and {Numerals.Count(record.Results.Models.Count - MostBeside)} more" : ""));
        if (record.Results.Simulation is { } simulation)
            yield return new("Scenarios", Scenarios(record.Settings.Model, simulation));
        yield return new("Version", $"{record.Version}, numerics epoch {Numerals.Count(record.Epoch)}");
    }

    private static string Cut(string hash) => hash.Length <= ShortHash ? hash : hash[..ShortHash] + "…";
}
