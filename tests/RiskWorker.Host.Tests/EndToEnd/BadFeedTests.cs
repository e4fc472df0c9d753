using System.Text.Json;
using UglyToad.PdfPig;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>A feed that cannot be used ends in exit code 2, says where and why, and leaves store and reports as they were.</summary>
public sealed class BadFeedTests : IDisposable
{
    private const string Options = "instrument,kind,currency,factor,strike,expiry,right,style,vol\nAAA share,spot,EUR,AAA,,,,,\n";
    private readonly RunFolder _folder = new();

    public BadFeedTests() => _folder.WriteTinyFeed();

    public void Dispose() => _folder.Dispose();

    [Theory]
    [InlineData("positions.csv", "", "line 1: found nothing")]
    [InlineData("positions.csv", "as_of,book,instrument,quantity\n", "found 'no row below the header'")]
    [InlineData("positions.csv", "as_of,desk,instrument,quantity\n2026-11-27,FIRM,AAA share,1000\n", "line 1, column book: found nothing")]
    [InlineData("positions.csv", "as_of,book,instrument,quantity\n2026-11-27,FIRM,AAA share,many\n", "line 2, column quantity: found 'many'")]
    [InlineData("positions.csv", "as_of,book,instrument,quantity\n2026-02-30,FIRM,AAA share,1000\n", "line 2, column as_of: found '2026-02-30'")]
    [InlineData("observations.csv", "date,factor,value\n2026-11-27,AAA,5\n2026-11-27,AAA,6\n", "line 3, column factor: found 'AAA'")]
    [InlineData("books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nFIRM,,The firm,EUR\n", "line 3, column book: found 'FIRM'")]
    [InlineData("instruments.csv", Options + "AAA swan,swan,EUR,AAA,,,,,\n", "line 3, column kind: found 'swan'")]
    [InlineData("instruments.csv", Options + "AAA call,option,EUR,AAA,-100,2027-06-30,call,european,0.2\n", "line 3, column strike: found '-100'")]
    [InlineData("instruments.csv", Options + "AAA call,option,EUR,AAA,100,2027-06-30,call,european,0\n", "line 3, column vol: found '0'")]
    [InlineData("limits.csv", "limit,book,measure,confidence,horizon_days,amount\nl,FIRM,var,1.5,1,1000\n", "line 2, column confidence: found '1.5'")]
    public async Task Measure_faulty_file_is_refused_and_nothing_changes(string file, string content, string place)
    {
        await _folder.MeasureAsync(0, "--scenarios", "1000");
        var (runs, store) = (_folder.Runs.ToArray(), await StoreAsync());
        _folder.WriteFeed(file, content);

        var ending = await _folder.RunAsync("measure");

        AssertRefused(ending, $"{file}");
        Assert.Contains(place, ending.Error, StringComparison.Ordinal);
        Assert.Equal(runs, _folder.Runs);
        Assert.Equal(store, await StoreAsync());
    }

    [Fact]
    public async Task Measure_missing_file_is_named_and_nothing_changes()
    {
        await _folder.MeasureAsync(0, "--scenarios", "1000");
        var (runs, store) = (_folder.Runs.ToArray(), await StoreAsync());
        File.Delete(Path.Combine(_folder.Config, "feed", "factors.csv"));

        AssertRefused(await _folder.RunAsync("measure"), "factors.csv: found 'no such file'");

        Assert.Equal(runs, _folder.Runs);
        Assert.Equal(store, await StoreAsync());
    }

    [Fact]
    public async Task Measure_folder_without_feed_is_refused()
    {
        Directory.Delete(Path.Combine(_folder.Config, "feed"), recursive: true);
        AssertRefused(await _folder.RunAsync("measure"), "no such folder");
        Assert.Empty(_folder.Runs);
    }

    [Fact]
    public async Task Measure_faults_of_several_files_come_in_one_answer()
    {
        _folder.WriteFeed("positions.csv", "as_of,book,instrument,quantity\n2026-11-27,FIRM,AAA share,x\n2026-11-27,FIRM,AAA share,y\n");
        _folder.WriteFeed("books.csv", "book,parent,name,currency\n,,The firm,EUR\n");
        var ending = await _folder.RunAsync("measure");
        AssertRefused(ending, "positions.csv, line 2, column quantity: found 'x'");
        Assert.Contains("positions.csv, line 3, column quantity: found 'y'", ending.Error, StringComparison.Ordinal);
        Assert.Contains("books.csv, line 2, column book: found nothing", ending.Error, StringComparison.Ordinal);
    }

    /// <summary>What only shows once the files are held together stops the run with a report that says why and has no figure.</summary>
    [Theory]
    [InlineData("books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nOTHER,,Another,EUR\n", "book-tree")]
    [InlineData("books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nA,B,,EUR\nB,A,,EUR\n", "book-tree")]
    [InlineData("observations.csv", "", "factor-missing")]
    [InlineData("observations.csv", "2026-11-27,AAA,0\n", "price-not-positive")]
    public async Task Measure_blocking_finding_leaves_a_failed_report_without_figures(string file, string content, string code)
    {
        if (file == "observations.csv")
        {
            var rows = _folder.ReadFeed(file).TrimEnd('\n');
            content = rows[..(rows.LastIndexOf('\n') + 1)] + content;
        }
        _folder.WriteFeed(file, content);

        await AssertFailedAsync(await _folder.MeasureAsync(2), code);
    }

    [Fact]
    public async Task Measure_date_without_positions_leaves_a_failed_report_under_that_date()
    {
        await _folder.MeasureAsync(0, "--scenarios", "1000");
        var results = await _folder.MeasureAsync(2, "--as-of", "2026-11-26");
        Assert.Equal("2026-11-26", results.GetProperty("asOf").GetString());
        await AssertFailedAsync(results, "positions-none");
    }

    private async Task AssertFailedAsync(JsonElement results, string code)
    {
        Assert.Equal("failed", results.GetProperty("status").GetString());
        Assert.Contains(results.GetProperty("findings").EnumerateArray(), f => f.GetProperty("code").GetString() == code && f.GetProperty("severity").GetString() == "blocking");
        foreach (var list in new[] { "nodes", "limits", "backtest" }) Assert.Empty(results.GetProperty(list).EnumerateArray());

        var folder = Path.Combine(_folder.Out, results.GetProperty("asOf").GetString()!, results.GetProperty("run").GetString()!);
        Assert.Equal(["limit-report.pdf", "results.csv", "results.json", "sensitivities.csv"], Directory.GetFiles(folder).Select(Path.GetFileName).Order(StringComparer.Ordinal));
        Assert.Single(await File.ReadAllLinesAsync(Path.Combine(folder, "results.csv"), TestContext.Current.CancellationToken));
        using var pdf = PdfDocument.Open(Path.Combine(folder, "limit-report.pdf"));
        var words = string.Join(' ', pdf.GetPages().SelectMany(p => p.GetWords()).Select(w => w.Text));
        Assert.Contains(code, words, StringComparison.Ordinal);
        Assert.DoesNotContain("VaR 99", words, StringComparison.Ordinal);
    }

    private static void AssertRefused(Ending ending, string text)
    {
        Assert.Equal(2, ending.Code);
        Assert.Contains(text, ending.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", ending.Error, StringComparison.Ordinal);
        Assert.Empty(ending.Output);
    }

    private Task<byte[]> StoreAsync() => File.ReadAllBytesAsync(_folder.Store, TestContext.Current.CancellationToken);
}
