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

/// <summary>Writes backtest evidence. A folder appears whole, under its final name, or not at all; an earlier one of that name is replaced whole.</summary>
public static class EvidenceDocuments
{
    /// <summary>File name of the report.</summary>
    public const string ReportName = "evidence-report.pdf";

    /// <summary>File name of the list of files with their hashes.</summary>
    public const string ManifestName = "manifest.json";

    /// <summary>File name of its signature: detached CMS in DER.</summary>
    public const string SignatureName = "manifest.json.p7s";

    /// <summary>The text of <c>backtest.json</c>.</summary>
    public static string JsonOf(BacktestEvidence evidence) => Encoding.UTF8.GetString(Bytes(stream => BacktestJson.Write(evidence, stream)));

    /// <summary>Writes report, backtest.json, CSV files, workbook and manifest into <paramref name="folder"/>, and the manifest's signature where it is asked for.</summary>
    /// <param name="evidence">What they are made of, and nothing else.</param>
    /// <param name="folder">Where; made where it is not there.</param>
    /// <param name="signing">With what the manifest is signed; null for no signature.</param>
    /// <returns>The files by name, the manifest last, after it its signature; hashes of all of them.</returns>
    /// <exception cref="SettingsException">The certificate cannot be used; then nothing is written.</exception>
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

        var place = Path.TrimEndingDirectorySeparator(Path.GetFullPath(folder));
        Replace(place, files);
        return new(place, [.. files.Select(file => Path.Combine(place, file.Name))], [.. files.Select(Hashed)], json);
    }

    // Whoever looks sees the old folder, for a moment none, then the new one: never a mixture of both.
    private static void Replace(string folder, IReadOnlyList<(string Name, byte[] Content)> files)
    {
        var (beside, before) = (folder + ".partial", folder + ".before");
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
