using System.Text.Json;
using RiskWorker.Host.UseCases;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>What verifying a run found.</summary>
public static class VerifyListing
{
    private static readonly JsonSerializerOptions s_json = new() { WriteIndented = true, PropertyNamingPolicy = JsonNamingPolicy.CamelCase };

    /// <summary>Prints which run, a table of checks, and the sentence that sums it up.</summary>
    public static void Write(VerifyReport report, IAnsiConsole console)
    {
        var what = report.Record is { } record ? $" of {Figures.Date(record.AsOf)}, {Lower(record.Evidence)}, numerics epoch {record.Epoch}" : "";
        console.WriteLine($"Run {report.Run}{what}");
        console.WriteLine();
        var table = new PlainTable().Labels("Check").Labels("Result").Words("What");
        foreach (var check in report.Checks)
        {
            for (var i = 0; i < check.Findings.Count; i++)
            {
                var style = check.Outcome == VerifyOutcome.Different ? new Style(Color.Red, decoration: Decoration.Bold) : (Style?)null;
                var (thing, result) = i == 0 ? (Lower(check.Thing), Result(check.Outcome)) : ("", "");
                table.Row((thing, null), (result, style), (check.Findings[i], null));
            }
        }
        table.Write(console);
        console.WriteLine(Verdict(report));
    }

    /// <summary>Prints one JSON object.</summary>
    public static void WriteJson(VerifyReport report, TextWriter output) => output.WriteLine(JsonSerializer.Serialize(
        new
        {
            run = report.Run,
            asOf = report.Record is { } record ? Figures.Date(record.AsOf) : null,
            verdict = Word(Overall(report)),
            epoch = report.Record?.Epoch,
            programEpoch = report.Epoch,
            checks = report.Checks.Select(c => new { check = Lower(c.Thing), result = Word(c.Outcome), findings = c.Findings }),
            differences = report.Differences,
        },
        s_json));

    private static string Verdict(VerifyReport report) => Overall(report) switch
    {
        VerifyOutcome.Different => "This run is NOT what was recorded.",
        VerifyOutcome.OtherEpoch => "What was recorded is whole; its figures are those of another numerics epoch.",
        _ => "This run is what was recorded, to the last bit.",
    };

    private static VerifyOutcome Overall(VerifyReport report) =>
        report.ExitCode == ExitCode.Difference ? VerifyOutcome.Different
        : report.Checks.Any(c => c.Outcome == VerifyOutcome.OtherEpoch) ? VerifyOutcome.OtherEpoch : VerifyOutcome.Equal;

    private static string Result(VerifyOutcome outcome) => outcome switch
    {
        VerifyOutcome.Equal => "equal",
        VerifyOutcome.Different => "DIFFERENT",
        VerifyOutcome.OtherEpoch => "other epoch",
        _ => "not checked",
    };

    private static string Word(VerifyOutcome outcome) => JsonNamingPolicy.CamelCase.ConvertName(outcome.ToString());

    private static string Lower<T>(T value) where T : struct, Enum => value.ToString().ToLowerInvariant();
}
