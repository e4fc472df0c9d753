using System.Text.Json;
using RiskWorker.Host.UseCases;
using Spectre.Console;

namespace RiskWorker.Host.Verbs;

/// <summary>What loading did, file by file.</summary>
public static class LoadListing
{
    private static readonly JsonSerializerOptions s_json = new() { WriteIndented = true };

    /// <summary>Prints a table of files, then the warnings.</summary>
    public static void Write(LoadReport report, IAnsiConsole console)
    {
        var files = new PlainTable().Words("File").Numbers("Rows").Labels("Store");
        foreach (var file in report.Files) files.Row(file.File, Figures.Count(file.Rows), file.IsNew ? "loaded" : "unchanged");
        files.Write(console);
        if (report.Warnings.Count == 0) return;
        var warnings = new PlainTable().Labels("Warning").Words("Subject").Words("What");
        foreach (var warning in report.Warnings) warnings.Row(warning.Code, warning.Subject, warning.Message);
        warnings.Write(console);
    }

    /// <summary>Prints one JSON object.</summary>
    public static void WriteJson(LoadReport report, TextWriter output) => output.WriteLine(JsonSerializer.Serialize(
        new
        {
            files = report.Files.Select(f => new { file = f.File, rows = f.Rows, isNew = f.IsNew }),
            warnings = report.Warnings.Select(w => new { code = w.Code, subject = w.Subject, message = w.Message }),
        },
        s_json));
}
