using System.Text.Json;
using System.Text.Json.Nodes;
using UglyToad.PdfPig;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>The demo from feed to documents.</summary>
public sealed class DemoTests(DemoRun demo) : IClassFixture<DemoRun>
{
    [Fact]
    public void Measure_demo_breaches_one_limit_and_warns_of_one()
    {
        Assert.Equal((1, 1), (demo.First.Code, demo.Second.Code));
        Assert.Contains("1 of 16 limits is breached.", demo.First.Output, StringComparison.Ordinal);
        var statuses = Results(demo.FirstFolder)["limits"]!.AsArray().ToLookup(l => (string)l!["status"]!, l => (string)l!["limit"]!);
        Assert.Equal(["metal-var"], statuses["breached"]);
        Assert.Equal(["option-es"], statuses["warning"]);
        Assert.Equal(14, statuses["within"].Count());
    }

    [Fact]
    public void Measure_fills_past_days_once()
    {
        Assert.Contains("20 past dates filled, marked as backfilled.", demo.First.Output, StringComparison.Ordinal);
        Assert.DoesNotContain("filled", demo.Second.Output, StringComparison.Ordinal);
        Assert.All(Results(demo.FirstFolder)["backtest"]!.AsArray(), b => Assert.Equal((20, 20), ((int)b!["days"]!, (int)b["backfilled"]!)));
    }

    [Fact]
    public void Measure_writes_nothing_under_config() => Assert.Equal(demo.ConfigFiles.Before, demo.ConfigFiles.After);

    [Fact]
    public void Pdf_says_what_is_breached()
    {
        var text = PdfWords(demo.FirstFolder);
        Assert.Contains("One of sixteen limits is breached", text, StringComparison.Ordinal);
        Assert.Contains("metal-var", text, StringComparison.Ordinal);
        Assert.Contains((string)Results(demo.FirstFolder)["run"]!, text, StringComparison.Ordinal);
    }

    [Fact]
    public void Second_run_differs_in_id_attempt_times_and_chain_head_alone()
    {
        var (first, second) = (Results(demo.FirstFolder), Results(demo.SecondFolder));
        Assert.Equal((1, 2), ((int)first["attempt"]!, (int)second["attempt"]!));
        foreach (var name in new[] { "run", "attempt", "started", "finished", "timings" })
        {
            Assert.True(first.Remove(name) && second.Remove(name));
        }
        Assert.Equal(first.ToJsonString(), second.ToJsonString());
    }

    /// <summary>The machine's culture and time zone are those of the process; the bytes are the record's.</summary>
    [Theory]
    [InlineData("de_DE.UTF-8", "Asia/Kathmandu")]
    [InlineData("tr_TR.UTF-8", "America/St_Johns")]
    public async Task Show_renders_the_stored_document_again_to_the_byte(string culture, string timeZone)
    {
        var file = Path.Combine(demo.Folder.Out, $"again-{culture}.pdf");
        var run = Path.GetFileName(demo.FirstFolder);
        var ending = await RiskworkerProcess.RunAsync(["runs", "show", run, "--pdf", file, "--config", demo.Folder.Config, "--out", demo.Folder.Out],
            ("LANG", culture), ("LC_ALL", culture), ("TZ", timeZone));
        Assert.True(ending.Code == 0, ending.Error);
        Assert.Equal(await BytesAsync(Path.Combine(demo.FirstFolder, "limit-report.pdf")), await BytesAsync(file));
    }

    [Fact]
    public async Task Show_json_is_the_stored_file_but_for_the_time_that_its_report_took()
    {
        var ending = await demo.Folder.RunAsync("runs", "show", Path.GetFileName(demo.FirstFolder), "--json");
        var (shown, written) = (JsonNode.Parse(ending.Output)!, Results(demo.FirstFolder));
        shown["timings"]!["report"] = written["timings"]!["report"]!.DeepClone();
        Assert.Equal(written.ToJsonString(), shown.ToJsonString());
    }

    [Fact]
    public void Results_have_the_design_s_shape()
    {
        using var results = JsonDocument.Parse(File.ReadAllText(Path.Combine(demo.FirstFolder, "results.json")));
        ResultsShape.AssertOf(results.RootElement);
    }

    [Fact]
    public void Figures_hash_follows_from_the_file_s_own_numbers()
    {
        using var results = JsonDocument.Parse(File.ReadAllText(Path.Combine(demo.FirstFolder, "results.json")));
        Assert.Equal(results.RootElement.GetProperty("figures").GetString(), FiguresOfFile.Hash(results.RootElement));
    }

    [Fact]
    public void Csv_holds_the_figures_of_the_json()
    {
        var results = Results(demo.FirstFolder);
        var expected = new List<string>();
        foreach (var node in results["nodes"]!.AsArray())
        {
            var measures = node!["measures"]!.AsArray().Concat(node["measuresRoot"]?.AsArray() ?? []);
            expected.AddRange(measures.Select(m => Line("node", node["book"]!, m!)));
        }
        expected.AddRange(results["limits"]!.AsArray().Select(l => Line("limit", l!["book"]!, l)));
        foreach (var model in results["models"]!.AsArray())
            expected.AddRange(model!["nodes"]!.AsArray().SelectMany(n => n!["measures"]!.AsArray().Select(m => Line("model", n["book"]!, m!))));

        var rows = File.ReadAllLines(Path.Combine(demo.FirstFolder, "results.csv")).Select(row => row.Split(',')).ToList(); // no cell of the demo is quoted
        Assert.All(rows, row => Assert.Equal(rows[0].Length, row.Length));
        var columns = new[] { "row", "book", "measure", "confidence", "horizon_days", "value", "low", "high" }.Select(c => Array.IndexOf(rows[0], c)).ToArray();
        Assert.Equal(expected, rows.Skip(1).Select(row => string.Join(',', columns.Select(c => row[c]))));
    }

    private static string Line(string row, JsonNode book, JsonNode m) =>
        string.Join(',', row, (string)book!, (string)m["measure"]!, m["confidence"]!.ToJsonString(), m["horizonDays"]!.ToJsonString(), m["value"]!.ToJsonString(), m["low"]!.ToJsonString(), m["high"]!.ToJsonString());

    private static JsonObject Results(string folder) => JsonNode.Parse(File.ReadAllText(Path.Combine(folder, "results.json")))!.AsObject();

    private static string PdfWords(string folder)
    {
        using var pdf = PdfDocument.Open(Path.Combine(folder, "limit-report.pdf"));
        return string.Join(' ', pdf.GetPages().SelectMany(p => p.GetWords()).Select(w => w.Text));
    }

    private static Task<byte[]> BytesAsync(string file) => File.ReadAllBytesAsync(file, TestContext.Current.CancellationToken);
}
