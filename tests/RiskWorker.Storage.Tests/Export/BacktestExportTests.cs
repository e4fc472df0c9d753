using System.Globalization;
using System.IO.Compression;
using System.Text;
using System.Text.Json;
using MiniExcelLibs;
using RiskWorker.Domain.Evidence;
using RiskWorker.Storage.Export;
using RiskWorker.TestKit;

namespace RiskWorker.Storage.Tests.Export;

public sealed class BacktestExportTests
{
    private static readonly BacktestEvidence s_evidence = new SampleEvidence { Books = 2, Days = 250 }.Build();

    [Fact]
    public void Json_has_the_published_shape_in_its_order()
    {
        using var json = Json(s_evidence);
        Assert.Equal(
            ["schema", "kind", "from", "to", "model", "series", "positions", "firm", "currency", "scenarios", "inputs", "command", "made", "version", "epoch", "exceptions", "models", "runs"],
            Names(json.RootElement));
        var series = json.RootElement.GetProperty("series")[0];
        Assert.Equal(["book", "confidence", "pnl", "days", "count", "expected", "zone", "multiplier", "tests", "name", "depth", "currency", "keepsDeskLimit", "probabilities"], Names(series));
        Assert.Equal(["date", "var", "es", "pnl", "p", "exception"], Names(series.GetProperty("days")[0]));
        Assert.Equal(["name", "statistic", "pValue", "method", "reject", "source", "note"], Names(series.GetProperty("tests")[0]));
    }

    [Fact]
    public void Json_has_the_values_of_the_evidence()
    {
        using var json = Json(s_evidence);
        var root = json.RootElement;
        Assert.Equal((1, "recorded", "2026-11-27", "house"), (root.GetProperty("schema").GetInt32(), root.GetProperty("kind").GetString(), root.GetProperty("to").GetString(), root.GetProperty("model").GetString()));
        Assert.Equal(JsonValueKind.Null, root.GetProperty("positions").ValueKind);
        Assert.Equal("sha256:" + s_evidence.Inputs, root.GetProperty("inputs").GetString());
        Assert.Equal("2026-11-30T06:12:03.000Z", root.GetProperty("made").GetString());
        Assert.Equal(s_evidence.Series.Count, root.GetProperty("series").GetArrayLength());
        foreach (var (element, series) in root.GetProperty("series").EnumerateArray().Zip(s_evidence.Series))
        {
            Assert.Equal((series.Book, series.Confidence.Level, series.Count), (element.GetProperty("book").GetString(), element.GetProperty("confidence").GetDecimal(), element.GetProperty("count").GetInt32()));
            Assert.Contains(element.GetProperty("pnl").GetString(), (string[])["actual", "hypothetical"]);
            Assert.Equal(250, element.GetProperty("days").GetArrayLength());
            Assert.Equal(series.Count, element.GetProperty("days").EnumerateArray().Count(day => day.GetProperty("exception").GetBoolean()));
            Assert.Equal(series.Probabilities, element.GetProperty("probabilities").EnumerateArray().Select(count => count.GetInt32()));
        }
        var missing = root.GetProperty("series")[0].GetProperty("days")[81];
        Assert.Equal((JsonValueKind.Null, JsonValueKind.Null, JsonValueKind.Null, true), (missing.GetProperty("var").ValueKind, missing.GetProperty("es").ValueKind, missing.GetProperty("p").ValueKind, missing.GetProperty("exception").GetBoolean()));
        Assert.Contains("simulated", root.GetProperty("series")[0].GetProperty("tests").EnumerateArray().Select(test => test.GetProperty("method").GetString()));
        BitEqual.Assert(s_evidence.Series[0].Days[3].Profit!.Value, root.GetProperty("series")[0].GetProperty("days")[3].GetProperty("pnl").GetDouble());
        Assert.Equal(s_evidence.Exceptions.Count, root.GetProperty("exceptions").GetArrayLength());
        Assert.Equal(s_evidence.Runs.Count, root.GetProperty("runs").GetArrayLength());
        Assert.Equal(s_evidence.Models.Count, root.GetProperty("models").GetArrayLength());
    }

    [Fact]
    public void Json_of_a_walk_forward_says_so_and_on_which_positions()
    {
        using var json = Json(new SampleEvidence { Kind = BacktestKind.WalkForward, Positions = BacktestPositions.Today, Books = 0, Days = 3 }.Build());
        Assert.Equal(("walk-forward", "today"), (json.RootElement.GetProperty("kind").GetString(), json.RootElement.GetProperty("positions").GetString()));
        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("series")[0].GetProperty("zone").ValueKind);
        Assert.Equal(JsonValueKind.Null, json.RootElement.GetProperty("series")[0].GetProperty("keepsDeskLimit").ValueKind);
    }

    [Fact]
    public void All_exports_are_the_same_bytes_every_time_in_any_culture()
    {
        Action<Stream>[] writers =
        [
            stream => BacktestJson.Write(s_evidence, stream), stream => BacktestDaysCsv.Write(s_evidence, stream), stream => ExceptionsCsv.Write(s_evidence, stream), stream => BacktestWorkbook.Write(s_evidence, stream),
        ];
        var first = writers.Select(Bytes).ToList();
        var culture = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = new CultureInfo("") { NumberFormat = { NumberDecimalSeparator = ",", NegativeSign = "~" } };
            Assert.Equal(first, writers.Select(Bytes));
        }
        finally
        {
            CultureInfo.CurrentCulture = culture;
        }
    }

    [Fact]
    public void Days_csv_has_a_row_for_every_day_and_numbers_that_come_back_to_the_bit()
    {
        var lines = Lines(stream => BacktestDaysCsv.Write(s_evidence, stream));
        Assert.Equal("book,confidence,pnl_kind,date,var,es,pnl,p,exception,currency", lines[0]);
        Assert.Equal(1 + s_evidence.Series.Sum(one => one.Days.Count), lines.Length);
        var cells = lines[1].Split(',');
        var day = s_evidence.Series[0].Days[0];
        Assert.Equal(["firm", "0.975", "actual", day.Date.ToString("O", CultureInfo.InvariantCulture)], cells[..4]);
        foreach (var (cell, value) in cells[4..8].Zip([day.Var, day.Es, day.Profit, day.P])) BitEqual.Assert(value!.Value, double.Parse(cell, CultureInfo.InvariantCulture));
        Assert.Equal(["false", "EUR"], cells[8..]);
        Assert.Equal(["", ""], lines[1 + 81].Split(',')[4..6]);
        Assert.Equal("true", lines[1 + 81].Split(',')[8]);
    }

    [Fact]
    public void Exceptions_csv_keeps_corrected_explanations_in_rows_of_their_own()
    {
        var lines = Lines(stream => ExceptionsCsv.Write(s_evidence, stream));
        Assert.Equal(1 + s_evidence.Exceptions.Sum(one => 1 + one.Corrected.Count), lines.Length);
        Assert.Equal(26, lines[0].Split(',').Length);
        Assert.All(lines, line => Assert.Equal(26, line.Split(',').Length));
        Assert.Equal(s_evidence.Exceptions.Count(one => one.Explanation is null), lines.Count(line => line.Contains(",open,,,,,", StringComparison.Ordinal)));
        Assert.Equal(s_evidence.Exceptions.Sum(one => one.Corrected.Count), lines.Count(line => line.Contains(",corrected,intraday,A hedge was closed at noon.,B. Moen,", StringComparison.Ordinal)));
    }

    [Theory]
    [InlineData("=1+1", "'=1+1")]
    [InlineData("+1", "'+1")]
    [InlineData("-1", "'-1")]
    [InlineData("@SUM(A1)", "'@SUM(A1)")]
    public void Text_that_a_spreadsheet_would_take_for_a_formula_is_neutralised_in_every_file(string text, string neutral)
    {
        var evidence = Renamed(text);
        var row = Lines(stream => BacktestDaysCsv.Write(evidence, stream))[1];
        Assert.StartsWith(neutral + ",", row, StringComparison.Ordinal);
        Assert.EndsWith("," + neutral, row, StringComparison.Ordinal);
        Assert.Equal(6, Lines(stream => ExceptionsCsv.Write(evidence, stream))[1].Split(',').Count(cell => cell == neutral));
        using var workbook = new MemoryStream(Bytes(stream => BacktestWorkbook.Write(evidence, stream)));
        foreach (var sheet in workbook.GetSheetNames())
        {
            var cells = Rows(workbook, sheet).SelectMany(cell => cell.Values).OfType<string>().ToList();
            Assert.DoesNotContain(cells, cell => cell.Length > 0 && "=+-@".Contains(cell[0], StringComparison.Ordinal));
            Assert.Contains(neutral, cells);
        }
        using var zip = new ZipArchive(workbook);
        Assert.All(zip.Entries.Where(entry => entry.FullName.Contains("worksheets/sheet", StringComparison.Ordinal)), entry => Assert.DoesNotContain("<x:f>", Text(entry), StringComparison.Ordinal));
    }

    [Fact]
    public void Workbook_has_a_sheet_a_table_and_reads_back_as_written()
    {
        using var workbook = new MemoryStream(Bytes(stream => BacktestWorkbook.Write(s_evidence, stream)));
        Assert.Equal(["summary", "days", "tests", "exceptions", "models", "runs"], workbook.GetSheetNames());
        var summary = Rows(workbook, "summary");
        Assert.Equal(s_evidence.Series.Count, summary.Count);
        Assert.Equal(["book", "name", "confidence", "pnl_kind", "days", "exceptions", "expected", "zone", "multiplier", "keeps_desk_limit", "currency"], summary[0].Keys);
        Assert.Equal(("firm", 0.975, 250.0, (double)s_evidence.Series[0].Count), ((string)summary[0]["book"], (double)summary[0]["confidence"], (double)summary[0]["days"], (double)summary[0]["exceptions"]));
        var days = Rows(workbook, "days");
        Assert.Equal(s_evidence.Series.Sum(one => one.Days.Count), days.Count);
        var day = s_evidence.Series[0].Days[7];
        Assert.Equal(day.Date.ToDateTime(default), days[7]["date"]);
        BitEqual.Assert(day.Profit!.Value, (double)days[7]["pnl"]);
        BitEqual.Assert(day.Var!.Value, (double)days[7]["var"]);
        Assert.Null(days[81]["var"]);
        Assert.Equal(true, days[81]["exception"]);
        Assert.Equal(s_evidence.Series.Sum(one => one.Tests.Count), Rows(workbook, "tests").Count);
        Assert.Equal(s_evidence.Exceptions.Sum(one => 1 + one.Corrected.Count), Rows(workbook, "exceptions").Count);
        Assert.Equal(s_evidence.Models.Count, Rows(workbook, "models").Count);
        Assert.Equal(s_evidence.Runs.Select(run => run.Hash), Rows(workbook, "runs").Select(run => (string)run["hash"]));
    }

    [Fact]
    public void Workbook_of_nothing_keeps_the_heads_of_its_sheets()
    {
        using var workbook = new MemoryStream(Bytes(stream => BacktestWorkbook.Write(s_evidence with { Series = [], Exceptions = [], Models = [], Runs = [] }, stream)));
        Assert.Equal(["summary", "days", "tests", "exceptions", "models", "runs"], workbook.GetSheetNames());
        Assert.Equal("as_of", MiniExcel.Query(workbook, false, "runs").Cast<IDictionary<string, object>>().First()["A"]);
    }

    [Fact]
    public void Workbook_holds_no_time_and_no_random_name()
    {
        using var zip = new ZipArchive(new MemoryStream(Bytes(stream => BacktestWorkbook.Write(s_evidence, stream))));
        Assert.All(zip.Entries, entry => Assert.Equal(new DateTime(1980, 1, 1), entry.LastWriteTime.DateTime));
        Assert.Contains("r:id=\"part", Text(zip.GetEntry("xl/workbook.xml")!), StringComparison.Ordinal);
    }

    [Fact]
    public void Manifest_lists_names_in_order_with_their_hashes()
    {
        var bytes = Bytes(stream => ManifestJson.Write([new("b.csv", "bb"), new("a.pdf", "aa"), new("B.json", "cc")], stream));
        using var json = JsonDocument.Parse(bytes);
        Assert.Equal([("B.json", "cc"), ("a.pdf", "aa"), ("b.csv", "bb")], json.RootElement.GetProperty("files").EnumerateArray().Select(file => (file.GetProperty("name").GetString(), file.GetProperty("sha256").GetString())));
        var twice = Assert.Throws<ArgumentException>(() => ManifestJson.Write([new("a", "1"), new("a", "2")], new MemoryStream()));
        Assert.Contains("The file 'a' stands twice in one manifest.", twice.Message, StringComparison.Ordinal);
    }

    private static BacktestEvidence Renamed(string text)
    {
        var series = s_evidence.Series[0] with { Book = text, Name = text, Currency = text, Tests = [s_evidence.Series[0].Tests[0] with { Name = text, Source = text, Note = text }] };
        var entry = s_evidence.Exceptions[0] with
        {
            Book = text,
            Currency = text,
            Books = [new(text, 1)],
            Factors = [new(text, 1)],
            Explanation = new(ExceptionCause.Model, text, text, s_evidence.Made),
            Corrected = [],
        };
        return s_evidence with { Series = [series], Exceptions = [entry], Models = [s_evidence.Models[0] with { Model = text, Book = text }], Runs = [new(s_evidence.From, text, text, default)] };
    }

    private static List<IDictionary<string, object>> Rows(Stream workbook, string sheet) => [.. MiniExcel.Query(workbook, true, sheet).Cast<IDictionary<string, object>>()];

    private static IEnumerable<string> Names(JsonElement element) => element.EnumerateObject().Select(property => property.Name);

    private static JsonDocument Json(BacktestEvidence evidence) => JsonDocument.Parse(Bytes(stream => BacktestJson.Write(evidence, stream)));

    private static string[] Lines(Action<Stream> write) => Encoding.UTF8.GetString(Bytes(write)).TrimEnd().Split("\r\n");

    private static string Text(ZipArchiveEntry entry)
    {
        using var reader = new StreamReader(entry.Open());
        return reader.ReadToEnd();
    }

    private static byte[] Bytes(Action<Stream> write)
    {
        using var stream = new MemoryStream();
        write(stream);
        return stream.ToArray();
    }
}
