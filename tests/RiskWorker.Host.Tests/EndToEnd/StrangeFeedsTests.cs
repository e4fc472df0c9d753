using System.Text;
using System.Text.Json;
using UglyToad.PdfPig;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>Feeds that are unusual but right.</summary>
public sealed class StrangeFeedsTests : IDisposable
{
    private static readonly string[] s_files = ["books.csv", "factors.csv", "instruments.csv", "positions.csv", "observations.csv"];
    private readonly RunFolder _folder = new();

    public StrangeFeedsTests() => _folder.WriteTinyFeed();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Measure_line_ends_byte_order_marks_and_order_of_columns_and_rows_change_nothing()
    {
        var plain = await _folder.MeasureAsync(0, "--scenarios", "1000");
        foreach (var file in s_files)
        {
            var rows = _folder.ReadFeed(file).TrimEnd('\n').Split('\n').Select(row => string.Join(',', row.Split(',').Reverse())).ToList();
            _folder.WriteFeed(file, "\uFEFF" + string.Join("\r\n", rows.Skip(1).Reverse().Prepend(rows[0])));
        }
        var strange = await _folder.MeasureAsync(0, "--scenarios", "1000");
        foreach (var name in new[] { "snapshot", "figures" }) Assert.Equal(plain.GetProperty(name).GetString(), strange.GetProperty(name).GetString());
        Assert.Equal(2, strange.GetProperty("attempt").GetInt32());
    }

    [Fact]
    public async Task Measure_names_with_commas_quotes_and_formulas_come_through_whole()
    {
        string[] names = ["FIRM, all \"of\" it", "=1+1", "@SUM(A1)", "[red]R[/]", "Ünïcödé & <b>"];
        static string Cell(string name) => $"\"{name.Replace("\"", "\"\"", StringComparison.Ordinal)}\"";
        _folder.WriteFeed("books.csv", "book,parent,name,currency\n" + string.Concat(names.Select((name, i) => $"{Cell(name)},{(i == 0 ? "" : Cell(names[0]))},{Cell(name)},EUR\n")));
        _folder.WriteFeed("positions.csv", "as_of,book,instrument,quantity\n" + string.Concat(names.Select(name => $"2026-11-27,{Cell(name)},AAA share,10\n")));
        var results = await _folder.MeasureAsync(0, "--scenarios", "1000");
        Assert.Equal(names.Order(StringComparer.Ordinal), results.GetProperty("nodes").EnumerateArray().Select(n => n.GetProperty("book").GetString()!).Order(StringComparer.Ordinal));

        var rows = await File.ReadAllLinesAsync(Path.Combine(_folder.Runs.Single(), "results.csv"), TestContext.Current.CancellationToken);
        Assert.Contains(rows, row => row.Contains(",'=1+1,", StringComparison.Ordinal));
        Assert.Contains(rows, row => row.Contains(",'@SUM(A1),", StringComparison.Ordinal));
        Assert.Contains(rows, row => row.Contains(",\"FIRM, all \"\"of\"\" it\",", StringComparison.Ordinal));
        Assert.Contains("Ünïcödé & <b>", PdfWords(), StringComparison.Ordinal);
    }

    [Fact]
    public async Task Measure_tree_of_a_hundred_levels_adds_up()
    {
        _folder.WriteFeed("books.csv", "book,parent,currency\n" + string.Concat(Enumerable.Range(0, 100).Select(i => $"B{i},{(i == 0 ? "" : $"B{i - 1}")},EUR\n")));
        _folder.WriteFeed("positions.csv", "as_of,book,instrument,quantity\n" + string.Concat(Enumerable.Range(0, 100).Select(i => $"2026-11-27,B{i},AAA share,10\n")));
        var nodes = (await _folder.MeasureAsync(0, "--scenarios", "1000")).GetProperty("nodes").EnumerateArray().ToList();
        Assert.Equal(Enumerable.Range(0, 100).Select(i => $"B{i}"), nodes.Select(n => n.GetProperty("book").GetString()));
        var leaf = nodes[99].GetProperty("measures")[0].GetProperty("value").GetDouble();
        Assert.All(nodes.Select((n, i) => n.GetProperty("measures")[0].GetProperty("value").GetDouble() / (100 - i)), per => Assert.Equal(leaf, per, leaf * 1e-12));
        Assert.Contains("B99", PdfWords(), StringComparison.Ordinal);
        var listing = (await _folder.RunAsync("runs", "show", Path.GetFileName(_folder.Runs.Single()))).Output.Split('\n');
        Assert.Contains(listing, line => line.Contains("B99", StringComparison.Ordinal) && line.Contains("VaR 99% 1d", StringComparison.Ordinal));
    }

    /// <summary>Nothing at risk is a loss of nothing: 0, not what is printed for -0.</summary>
    [Theory]
    [InlineData("positions.csv")]
    [InlineData("observations.csv")]
    public async Task Measure_book_that_cannot_move_loses_nothing(string still)
    {
        if (still == "positions.csv") _folder.WriteFeed(still, "as_of,book,instrument,quantity\n2026-11-27,FIRM,AAA share,0\n");
        else _folder.WriteFeed(still, string.Join('\n', _folder.ReadFeed(still).TrimEnd('\n').Split('\n').Select((row, i) => i == 0 ? row : row[..(row.LastIndexOf(',') + 1)] + "100")));
        var results = await _folder.MeasureAsync(0, "--scenarios", "1000");
        foreach (var measure in results.GetProperty("nodes")[0].GetProperty("measures").EnumerateArray())
            Assert.Equal(("0", "0", "0"), (measure.GetProperty("value").GetRawText(), measure.GetProperty("low").GetRawText(), measure.GetProperty("high").GetRawText()));
        foreach (var moment in new[] { "mean", "deviation" }) Assert.Equal("0", results.GetProperty("nodes")[0].GetProperty("distributions")[0].GetProperty(moment).GetRawText());
        Assert.DoesNotContain("-0,", results.GetRawText(), StringComparison.Ordinal);
        Assert.DoesNotContain("-0}", results.GetRawText(), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("1e15")]
    [InlineData("-1e15")]
    [InlineData("1e-15")]
    public async Task Measure_quantity_of_any_size_scales_the_measures(string quantity)
    {
        // A short position's losses are the long one's gains, so the comparison is with one unit of the same sign.
        _folder.WriteFeed("positions.csv", $"as_of,book,instrument,quantity\n2026-11-27,FIRM,AAA share,{(quantity[0] == '-' ? "-1" : "1")}\n");
        var unit = Measures(await _folder.MeasureAsync(0, "--scenarios", "1000"));
        _folder.WriteFeed("positions.csv", $"as_of,book,instrument,quantity\n2026-11-27,FIRM,AAA share,{quantity}\n");
        var scaled = Measures(await _folder.MeasureAsync(0, "--scenarios", "1000"));
        var factor = Math.Abs(double.Parse(quantity, System.Globalization.CultureInfo.InvariantCulture));
        Assert.All(unit.Zip(scaled), pair => Assert.Equal(1, pair.Second / factor / pair.First, 1e-12));
    }

    private static double[] Measures(JsonElement results) =>
        [.. results.GetProperty("nodes")[0].GetProperty("measures").EnumerateArray().SelectMany(m => new[] { "value", "low", "high" }.Select(name => m.GetProperty(name).GetDouble()))];

    private string PdfWords()
    {
        using var pdf = PdfDocument.Open(Path.Combine(_folder.Runs.Last(), "limit-report.pdf"));
        var text = new StringBuilder();
        foreach (var page in pdf.GetPages()) text.AppendJoin(' ', page.GetWords().Select(w => w.Text)).Append(' ');
        return text.ToString();
    }
}
