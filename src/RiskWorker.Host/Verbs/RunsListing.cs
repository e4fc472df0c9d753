using System.Text.Json;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.UseCases;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>The list of stored runs.</summary>
public static class RunsListing
{
    /// <summary>Prints a table, or the sentence that there are none.</summary>
    public static void Write(IReadOnlyList<RunSummary> runs, IAnsiConsole console)
    {
        if (runs.Count == 0)
        {
            console.WriteLine("No run is stored.");
            return;
        }
        var table = new PlainTable().Labels("As of").Labels("Run").Labels("Status").Labels("Evidence").Words("Model").Numbers("Scenarios").Numbers("Breached");
        foreach (var run in runs)
        {
            table.Row(Figures.Date(run.AsOf), run.Run, Name(run.Status), Name(run.Evidence), run.Model,
                run.Scenarios is { } scenarios ? Figures.Count(scenarios) : "-", run.Status == RunStatus.Failed ? "-" : Figures.Count(run.Breached));
        }
        table.Write(console);
    }

    /// <summary>Prints a JSON array.</summary>
    public static void WriteJson(IReadOnlyList<RunSummary> runs, TextWriter output)
    {
        var rows = runs.Select(run => new
        {
            run = run.Run,
            asOf = Figures.Date(run.AsOf),
            status = Name(run.Status),
            evidence = Name(run.Evidence),
            model = run.Model,
            scenarios = run.Scenarios,
            seed = run.Seed,
            finished = run.Finished.UtcDateTime,
            breached = run.Breached,
        });
        output.WriteLine(JsonSerializer.Serialize(rows, s_json));
    }

    private static readonly JsonSerializerOptions s_json = new() { WriteIndented = true };

    private static string Name<T>(T value) where T : struct, Enum => value.ToString().ToLowerInvariant();
}
