using System.Text;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.Delivery;
using RiskWorker.Host.Options;
using RiskWorker.Reporting.Pdf;
using RiskWorker.Reporting.Reports;
using RiskWorker.Storage.Export;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Writes backtest evidence. A folder appears whole, under its final name, or not at all; an earlier one of the same moment is replaced whole.</summary>
public static class EvidenceDocuments
{
    /// <summary>File name of the report.</summary>
    public const string ReportName = "evidence-report.pdf";

    /// <summary>File name of the list of files with their hashes.</summary>
    public const string ManifestName = "manifest.json";

    /// <summary>File name of its signature: detached CMS in DER.</summary>
    public const string SignatureName = "manifest.json.p7s";

    private static readonly string[] s_names = [ReportName, "backtest.json", "backtest-days.csv", "exceptions.csv", "backtest.xlsx", ManifestName, SignatureName];

    /// <summary>Where the files of evidence lie: OUT/backtest/TO/KIND-MADE. Evidence made at another time has a folder of its own, so what was handed out stays.</summary>
    public static string FolderOf(BacktestEvidence evidence, string outFolder)
    {
        var kind = evidence.Kind switch { BacktestKind.Recorded => "recorded", BacktestKind.Backfilled => "backfilled", _ => "walk-forward" };
        return Path.Combine(outFolder, "backtest", $"{evidence.To:yyyy-MM-dd}", $"{kind}-{evidence.Made.UtcDateTime:yyyyMMdd'T'HHmmss'Z'}");
    }

    /// <summary>The text of <c>backtest.json</c>.</summary>
    public static string JsonOf(BacktestEvidence evidence) => Encoding.UTF8.GetString(Bytes(stream => BacktestJson.Write(evidence, stream)));

    /// <summary>Writes report, backtest.json, CSV files, workbook and manifest into <see cref="FolderOf"/>, and the manifest's signature where it is asked for.</summary>
    /// <param name="evidence">What they are made of, and nothing else.</param>
    /// <param name="folder">The out folder, under which they get a folder of their own.</param>
    /// <param name="signing">With what the manifest is signed; null for no signature.</param>
    /// <returns>The files by name, the manifest last, after it its signature; hashes of all of them.</returns>
    /// <exception cref="SettingsException">The certificate cannot be used; then nothing is written.</exception>
    /// <exception cref="IOException">A folder of that name holds something else, which is not replaced.</exception>
    public static WrittenDocuments Write(BacktestEvidence evidence, string folder, SigningOptions? signing)
    {
        ArgumentNullException.ThrowIfNull(evidence);
        ArgumentException.ThrowIfNullOrEmpty(folder);
        using var certificate = signing is null ? null : SigningCertificate.Open(signing, evidence.Made);
        var json = JsonOf(evidence);
        var files = new List<(string Name, byte[] Content)>
        {
            (ReportName, PdfRenderer.Render(EvidenceReport.Build(evidence))),
            ("backtest.json", Encoding.UTF8.GetBytes(json)),
            ("backtest-days.csv", Bytes(stream => BacktestDaysCsv.Write(evidence, stream))),
            ("exceptions.csv", Bytes(stream => ExceptionsCsv.Write(evidence, stream))),
            ("backtest.xlsx", Bytes(stream => BacktestWorkbook.Write(evidence, stream))),
        };
        files.Sort((a, b) => string.CompareOrdinal(a.Name, b.Name));
        var manifest = Bytes(stream => ManifestJson.Write([.. files.Select(Hashed)], stream));
        files.Add((ManifestName, manifest));
        if (certificate is not null) files.Add((SignatureName, ManifestSignature.Of(manifest, certificate, evidence.Made)));

        var place = Path.GetFullPath(FolderOf(evidence, folder));
        Replace(place, files);
        return new(place, [.. files.Select(file => Path.Combine(place, file.Name))], [.. files.Select(Hashed)], json);
    }

    // Whoever looks sees the old folder, for a moment none, then the new one: never a mixture of both.
    private static void Replace(string folder, IReadOnlyList<(string Name, byte[] Content)> files)
    {
        var (beside, before) = (folder + ".partial", folder + ".before");
        RefuseOthers(folder);
        Remove(beside);
        Directory.CreateDirectory(beside);
        try
        {
            foreach (var (name, content) in files) File.WriteAllBytes(Path.Combine(beside, name), content);
            // A writer that stopped between the two moves left the folder under its other name.
            if (Directory.Exists(folder))
            {
                Remove(before);
                Directory.Move(folder, before);
            }
            try
            {
                Directory.Move(beside, folder);
            }
            catch when (Directory.Exists(before))
            {
                Directory.Move(before, folder);
                throw;
            }
            Remove(before);
        }
        catch
        {
            Remove(beside);
            throw;
        }
    }

    // Only what these documents are made of may be replaced by them.
    private static void RefuseOthers(string folder)
    {
        if (!Directory.Exists(folder)) return;
        var other = Directory.EnumerateFileSystemEntries(folder).FirstOrDefault(entry => !File.Exists(entry) || !s_names.Contains(Path.GetFileName(entry), StringComparer.Ordinal));
        if (other is not null) throw new IOException($"The folder '{folder}' holds '{Path.GetFileName(other)}', which is no document of backtest evidence; it is not replaced.");
    }

    private static void Remove(string folder)
    {
        if (Directory.Exists(folder)) Directory.Delete(folder, recursive: true);
    }

    private static DocumentHash Hashed((string Name, byte[] Content) file) => new(file.Name, SnapshotHash.OfBytes(file.Content));

    private static byte[] Bytes(Action<Stream> write)
    {
        using var stream = new MemoryStream();
        write(stream);
        return stream.ToArray();
    }
}
