using System.Text.Json.Nodes;
using RiskWorker.Host.Tests.Architecture;

namespace RiskWorker.Host.Tests.FiveSettings;

/// <summary>
/// The figures of the demo are pinned: a change that moves one bit of them raises the numerics epoch and has a dated decision in
/// DEVELOPERS.md. Without past days to fill, so that a run takes seconds.
/// </summary>
public sealed class DemoFiguresTests : IDisposable
{
    private const string Pinned = "sha256:3dd447040263eb4615e522f8422f23e68566745c5093c0097f48065437a37726";

    private readonly TemporaryFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Theory]
    [InlineData(null)]
    [InlineData("1")]
    [InlineData("3")]
    public async Task Figures_of_the_demo_are_the_pinned_ones_on_any_number_of_threads(string? threads)
    {
        CopyDemo();
        string[] arguments = ["measure", "--config", _folder.Path, "--out", Path.Combine(_folder.Path, "out"), "--seed", "1", "--json", .. threads is null ? [] : new[] { "--threads", threads }];
        var child = await Child.RunAsync(Child.Executable(AppContext.BaseDirectory, "riskworker"), arguments, HardwareSetting.All[0], TestContext.Current.CancellationToken);

        using var results = FiguresTests.Measured(child);
        Assert.Equal(Pinned, FiguresTests.FiguresOf(results));
    }

    private void CopyDemo()
    {
        var demo = Path.Combine(Repository.Root, "config-demo");
        var settings = JsonNode.Parse(File.ReadAllText(Path.Combine(demo, "riskworker.json")))!;
        settings["backfill"] = 0;
        _folder.Write("riskworker.json", settings.ToJsonString());
        foreach (var file in Directory.GetFiles(Path.Combine(demo, "feed"))) _folder.Write("feed/" + Path.GetFileName(file), File.ReadAllText(file));
    }
}
