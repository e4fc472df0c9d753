using System.Globalization;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>The whole chain against other programs that share neither code nor draws with it.</summary>
public sealed class OtherProgramTests
{
    /// <summary>
    /// Four real indices (source: Data/README.md of the storage tests) with the default model; the figures are NumPy's at 4,000,000 draws.
    /// </summary>
    [Fact]
    public async Task Measure_real_prices_agrees_with_numpy()
    {
        const int scenarios = 400_000;
        using var folder = await FolderAsync("real");
        var results = await folder.MeasureAsync(1, "--scenarios", scenarios.ToString(CultureInfo.InvariantCulture));
        Assert.Equal(scenarios, results.GetProperty("scenarios").GetInt32());
        foreach (var (book, var, es) in new[] { ("ALL", 316_286, 317_869), ("NORTH", 154_874, 155_560), ("SOUTH", 167_323, 168_126) })
        {
            SampledFigure.Of(results, book, "var").AssertAgrees(var, scenarios / 4e6, $"VaR of {book}");
            SampledFigure.Of(results, book, "es").AssertAgrees(es, scenarios / 4e6, $"ES of {book}");
        }
    }

    /// <summary>Sixty options and twelve shares in four books; the figures are another script's at as many scenarios (Data/README.md).</summary>
    [Fact]
    public async Task Measure_options_agree_with_full_revaluation_in_numpy()
    {
        using var folder = await FolderAsync("peer");
        var results = await folder.MeasureAsync(0, "--scenarios", "1000000");
        Assert.Equal(1_000_000, results.GetProperty("scenarios").GetInt32());
        var figures = await File.ReadAllLinesAsync(DataFile("peer-figures.csv"), TestContext.Current.CancellationToken);
        Assert.Equal(1 + (2 * 5), figures.Length);
        foreach (var cells in figures.Skip(1).Select(line => line.Split(',')))
            SampledFigure.Of(results, cells[0], cells[1]).AssertAgrees(double.Parse(cells[3], CultureInfo.InvariantCulture), 1, $"{cells[1]} of {cells[0]}");
    }

    private static async Task<RunFolder> FolderAsync(string data)
    {
        var folder = new RunFolder();
        foreach (var file in Directory.GetFiles(DataFile(data))) folder.WriteFeed(Path.GetFileName(file), await File.ReadAllTextAsync(file, TestContext.Current.CancellationToken));
        return folder;
    }

    private static string DataFile(string name) => Path.Combine(AppContext.BaseDirectory, "Data", name);
}
