using System.Diagnostics;
using System.Text;
using RiskWorker.Domain.Runs;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Storage.Export;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>The files of a run that were written.</summary>
/// <param name="Folder">Where.</param>
/// <param name="Paths">Their paths.</param>
/// <param name="Hashes">Their hashes.</param>
/// <param name="Json">The text of results.json.</param>
public sealed record WrittenDocuments(string Folder, IReadOnlyList<string> Paths, IReadOnlyList<DocumentHash> Hashes, string Json);

/// <summary>Renders a stored run. A folder appears whole, under its final name, or not at all.</summary>
public static class RunDocuments
{
    /// <summary>File name of the daily limit report.</summary>
    public const string LimitReportName = "limit-report.pdf";

    /// <summary>The daily limit report of a run.</summary>
    public static byte[] LimitReportOf(StoredRun run) => PdfRenderer.Render(LimitReport.Build(run.Record, run.Head));

    /// <summary>The text of a run's <c>results.json</c>.</summary>
    public static string JsonOf(RunRecord record)
    {
        using var stream = new MemoryStream();
        ResultsJson.Write(record, stream);
        return Encoding.UTF8.GetString(stream.GetBuffer(), 0, (int)stream.Length);
    }

    /// <summary>Where the files of a run lie: OUT/AS-OF/RUN-ID.</summary>
    public static string FolderOf(RunRecord record, string outFolder) => Path.Combine(outFolder, $"{record.AsOf:yyyy-MM-dd}", record.Run);

    /// <summary>Writes OUT/AS-OF/RUN-ID with the report, results.json, results.csv and sensitivities.csv.</summary>
    public static WrittenDocuments Write(StoredRun run, string outFolder)
    {
        var watch = Stopwatch.StartNew();
        var report = LimitReportOf(run);
        var record = run.Record with { Timings = run.Record.Timings with { Report = watch.Elapsed.TotalSeconds } };
        var json = JsonOf(record);
        using MemoryStream table = new(), sensitivities = new();
        ResultsCsv.Write(record, table);
        SensitivitiesCsv.Write(record, sensitivities);
        (string Name, byte[] Content)[] files =
        [
            (LimitReportName, report),
            ("results.json", Encoding.UTF8.GetBytes(json)),
            ("results.csv", table.ToArray()),
            ("sensitivities.csv", sensitivities.ToArray()),
        ];

        var folder = FolderOf(record, outFolder);
        var beside = folder + ".partial";
        if (Directory.Exists(beside)) Directory.Delete(beside, recursive: true);
        Directory.CreateDirectory(beside);
        try
        {
            foreach (var (name, content) in files) File.WriteAllBytes(Path.Combine(beside, name), content);
            Directory.Move(beside, folder);
        }
        catch
        {
            Directory.Delete(beside, recursive: true);
            throw;
        }
        return new(folder, [.. files.Select(f => Path.Combine(folder, f.Name))], [.. files.Select(f => new DocumentHash(f.Name, SnapshotHash.OfBytes(f.Content)))], json);
    }
}
