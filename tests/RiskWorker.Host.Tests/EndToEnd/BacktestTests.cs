using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using Microsoft.Data.Sqlite;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>Evidence from CSV to documents: a small feed, filled past days, a walk-forward that is stopped and goes on, and explanations.</summary>
public sealed class BacktestTests : IDisposable
{
    private const int Priced = 160, Held = 40;
    private static readonly DateOnly[] s_days = [.. Enumerable.Range(0, 400).Select(back => TinyFeed.AsOf.AddDays(-back)).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).Take(Priced).Reverse()];

    private readonly RunFolder _folder = new();

    public BacktestTests()
    {
        _folder.WriteTinyFeed();
        _folder.WriteSettings("""{ "models": { "plain": { "window": 100 } }, "simulation": { "scenarios": 2000, "looks": 1, "cap": 2000 }, "backfill": 30 }""");
        var (prices, positions, profit) = (new StringBuilder("date,factor,value\n"), new StringBuilder("as_of,book,instrument,quantity\n"), new StringBuilder("date,book,actual\n"));
        var (price, before) = (100.0, 100.0);
        for (var i = 0; i < Priced; i++)
        {
            // One fall of 20% among moves of one to three per cent.
            price *= i == Priced - 5 ? 0.8 : 1 + ((i % 2 == 0 ? 0.01 : -0.01) * (1 + (i % 3)));
            prices.Append(CultureInfo.InvariantCulture, $"{s_days[i]:yyyy-MM-dd},AAA,{price:0.0000}\n");
            if (i >= Priced - Held) positions.Append(CultureInfo.InvariantCulture, $"{s_days[i]:yyyy-MM-dd},FIRM,AAA share,1000\n");
            if (i > Priced - Held && i != Priced - 8) profit.Append(CultureInfo.InvariantCulture, $"{s_days[i]:yyyy-MM-dd},FIRM,{1000 * (price - before):0.00}\n"); // one day is missing
            before = price;
        }
        _folder.WriteFeed("observations.csv", prices.ToString());
        _folder.WriteFeed("positions.csv", positions.ToString());
        _folder.WriteFeed("pnl.csv", profit.ToString());
    }

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Backfilled_evidence_agrees_with_the_daily_report_to_the_day()
    {
        var results = await _folder.MeasureAsync(0);
        var evidence = await EvidenceAsync("--kind", "backfilled");

        var daily = results.GetProperty("backtest")[0];
        foreach (var series in evidence.GetProperty("series").EnumerateArray())
        {
            Assert.Equal(daily.GetProperty(series.GetProperty("pnl").GetString()!).GetInt32(), series.GetProperty("count").GetInt32());
            var days = series.GetProperty("days").EnumerateArray().ToList();
            var reported = daily.GetProperty("series").EnumerateArray().ToList();
            Assert.Equal(reported.Select(d => d.GetProperty("date").GetString()), days.Select(d => d.GetProperty("date").GetString()));
            Assert.Equal(reported.Select(d => d.GetProperty("var").GetRawText()), days.Select(d => d.GetProperty("var").GetRawText()));
        }
        // The fall of 20% by both, and the day without profit by the actual one.
        Assert.Equal([2, 1], evidence.GetProperty("series").EnumerateArray().Select(s => s.GetProperty("count").GetInt32()));
        Assert.Equal(30, evidence.GetProperty("runs").GetArrayLength());
    }

    [Fact]
    public async Task Walk_forward_goes_on_where_it_stopped_with_the_same_bits()
    {
        string[] walk = ["--kind", "walk-forward", "--from", Day(Priced - 20)];
        var whole = await EvidenceAsync(walk);
        using (var store = new SqliteConnection($"Data Source={_folder.Store}"))
        {
            // What a walk that was stopped would have left: some of the days.
            store.Open();
            using var half = store.CreateCommand();
            half.CommandText = "DELETE FROM walk_forward_day WHERE key > '8'";
            Assert.InRange(half.ExecuteNonQuery(), 1, 19);
        }
        var (read, again) = (await EvidenceAsync(walk), await EvidenceAsync([.. walk, "--threads", "1"]));
        Assert.Equal(whole.GetProperty("series").GetRawText(), read.GetProperty("series").GetRawText());
        Assert.Equal(whole.GetProperty("series").GetRawText(), again.GetProperty("series").GetRawText());
        var hypothetical = whole.GetProperty("series").EnumerateArray().First(s => s.GetProperty("pnl").GetString() == "hypothetical" && s.GetProperty("confidence").GetDouble() == 0.99);
        Assert.Equal(20, hypothetical.GetProperty("days").GetArrayLength());
        Assert.Equal(1, hypothetical.GetProperty("count").GetInt32());
        Assert.Equal(15, hypothetical.GetProperty("tests").GetArrayLength());
        Assert.All(hypothetical.GetProperty("days").EnumerateArray(), d => Assert.InRange(d.GetProperty("p").GetDouble(), 0, 1));
    }

    [Fact]
    public async Task Todays_positions_have_no_actual_profit()
    {
        var evidence = await EvidenceAsync("--kind", "walk-forward", "--positions", "today", "--from", Day(Priced - 10));
        Assert.Equal("today", evidence.GetProperty("positions").GetString());
        Assert.All(evidence.GetProperty("series").EnumerateArray(), s => Assert.Equal("hypothetical", s.GetProperty("pnl").GetString()));
    }

    [Fact]
    public async Task Explanations_are_kept_corrected_and_shown()
    {
        var fall = Day(Priced - 5);
        Assert.Equal(0, (await _folder.RunAsync("measure")).Code);
        Assert.Contains("is explained", (await ExplainAsync(fall, "market", "The price fell by a fifth.")).Output, StringComparison.Ordinal);
        Assert.Contains("is corrected; the 1 earlier stay", (await ExplainAsync(fall, "system", "The price was wrong.")).Output, StringComparison.Ordinal);
        var exceptions = (await EvidenceAsync("--kind", "backfilled")).GetProperty("exceptions").EnumerateArray().ToList();
        Assert.Equal(Day(Priced - 8), exceptions[0].GetProperty("date").GetString()); // unexplained first
        var explained = exceptions.Where(e => e.GetProperty("date").GetString() == fall).ToList();
        Assert.Equal(2, explained.Count);
        Assert.All(explained, e => Assert.Contains("The price was wrong.", e.GetRawText(), StringComparison.Ordinal));
        Assert.All(explained, e => Assert.Contains("The price fell by a fifth.", e.GetRawText(), StringComparison.Ordinal));
        Assert.All(explained, e => Assert.Contains("AAA", e.GetProperty("factors").GetRawText(), StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("There is no recorded run of model 'plain'", "--kind", "recorded")]
    [InlineData("fills past dates, which `--kind backfilled` takes", "--kind", "recorded")]
    [InlineData("There is no book 'NOPE'; there are FIRM.", "--kind", "walk-forward", "--book", "NOPE")]
    [InlineData("--positions goes with --kind walk-forward", "--positions", "today")]
    [InlineData("--kind: found 'daily', expected one of recorded, backfilled, walk-forward", "--kind", "daily")]
    [InlineData("--from lies after --to", "--from", "2026-11-20", "--to", "2026-11-10")]
    public async Task What_cannot_be_done_is_said(string expected, params string[] options)
    {
        var refused = await _folder.RunAsync(["backtest", .. options]);
        Assert.Equal(3, refused.Code);
        Assert.Contains(expected, refused.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Manifest_hashes_every_file_beside_it()
    {
        _ = await EvidenceAsync("--kind", "walk-forward", "--from", Day(Priced - 10));
        var manifest = Assert.Single(Directory.GetFiles(_folder.Out, "manifest.json", SearchOption.AllDirectories));
        var files = JsonDocument.Parse(await File.ReadAllTextAsync(manifest, TestContext.Current.CancellationToken)).RootElement.GetProperty("files").EnumerateArray().ToList();
        Assert.Equal(Directory.GetFiles(Path.GetDirectoryName(manifest)!).Length - 1, files.Count);
        foreach (var file in files)
        {
            var bytes = await File.ReadAllBytesAsync(Path.Combine(Path.GetDirectoryName(manifest)!, file.GetProperty("name").GetString()!), TestContext.Current.CancellationToken);
            Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(bytes)), file.GetProperty("sha256").GetString());
        }
    }

    private static string Day(int i) => s_days[i].ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private Task<Ending> ExplainAsync(string date, string cause, string text) =>
        _folder.RunAsync("backtest", "explain", date, "--book", "FIRM", "--cause", cause, "--text", text, "--author", "A. Tester");

    private async Task<JsonElement> EvidenceAsync(params string[] options)
    {
        var run = await _folder.RunAsync(["backtest", .. options, "--json"]);
        Assert.True(run.Code == 0, run.Error);
        return JsonDocument.Parse(run.Output).RootElement;
    }
}
