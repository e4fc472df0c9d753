using System.IO.Compression;
using System.Text;
using System.Text.RegularExpressions;
using MiniExcelLibs;
using MiniExcelLibs.OpenXml;
using RiskWorker.Domain.Evidence;

namespace RiskWorker.Storage.Export;

/// <summary>
/// Writes <c>backtest.xlsx</c>: a sheet a table (summary, days, tests, exceptions, models, runs), one that is empty with its head alone.
/// Days beyond what a sheet can hold go on in further ones. The same evidence gives the same bytes on the same runtime: the library's random
/// relationship names and the archive's times are replaced; compression is the runtime's own.
/// </summary>
public static partial class BacktestWorkbook
{
    // A sheet has 1,048,576 rows; one is the head.
    private const int RowsInSheet = 1_000_000;

    // The first moment that the archive's format can hold.
    private static readonly DateTimeOffset s_noTime = new(1980, 1, 1, 0, 0, 0, TimeSpan.Zero);

    /// <summary>Writes <paramref name="evidence"/> to <paramref name="stream"/>.</summary>
    public static void Write(BacktestEvidence evidence, Stream stream)
    {
        ArgumentNullException.ThrowIfNull(evidence);
        ArgumentNullException.ThrowIfNull(stream);
        using var written = new MemoryStream();
        MiniExcel.SaveAs(written, Sheets(evidence), configuration: new OpenXmlConfiguration { AutoFilter = false, TableStyles = TableStyles.None });
        written.Position = 0;
        Pack(written, stream);
    }

    private static Dictionary<string, object> Sheets(BacktestEvidence evidence)
    {
        var sheets = new Dictionary<string, object>(StringComparer.Ordinal) { ["summary"] = BacktestSheets.Summary(evidence) };
        var days = evidence.Series.Sum(one => (long)one.Days.Count);
        for (var (sheet, first) = (1, 0L); sheet == 1 || first < days; sheet++, first += RowsInSheet)
            sheets[sheet == 1 ? "days" : $"days {sheet}"] = BacktestSheets.Days(evidence).Skip((int)first).Take(RowsInSheet);
        sheets["tests"] = BacktestSheets.Tests(evidence);
        sheets["exceptions"] = BacktestSheets.Exceptions(evidence);
        sheets["models"] = BacktestSheets.Models(evidence);
        sheets["runs"] = BacktestSheets.Runs(evidence);
        return sheets;
    }

    private static void Pack(Stream from, Stream to)
    {
        using var read = new ZipArchive(from, ZipArchiveMode.Read, leaveOpen: true);
        using var write = new ZipArchive(to, ZipArchiveMode.Create, leaveOpen: true);
        var names = new Dictionary<string, string>(StringComparer.Ordinal);
        foreach (var entry in read.Entries.OrderBy(entry => entry.FullName, StringComparer.Ordinal))
        {
            var copy = write.CreateEntry(entry.FullName, CompressionLevel.Optimal);
            copy.LastWriteTime = s_noTime;
            using var source = entry.Open();
            using var target = copy.Open();
            if (!Relates(entry.FullName))
            {
                source.CopyTo(target);
                continue;
            }
            using var text = new StreamReader(source, Encoding.UTF8);
            target.Write(Encoding.UTF8.GetBytes(RandomName().Replace(text.ReadToEnd(), match => Named(names, match.Value))));
        }
    }

    private static bool Relates(string entry) => entry is "xl/workbook.xml" or "xl/_rels/workbook.xml.rels" or "_rels/.rels";

    private static string Named(Dictionary<string, string> names, string random)
    {
        if (!names.TryGetValue(random, out var name)) names[random] = name = $"part{names.Count + 1}";
        return name;
    }

    [GeneratedRegex("(?<=[iI]d=\")R[0-9a-f]{16,32}(?=\")")]
    private static partial Regex RandomName();
}
