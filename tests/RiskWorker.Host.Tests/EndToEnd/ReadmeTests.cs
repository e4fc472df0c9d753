using System.Text.Json;
using System.Text.RegularExpressions;
using RiskWorker.Host.Tests.Architecture;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>The README's two commands do what it says.</summary>
public sealed partial class ReadmeTests : IDisposable
{
    private readonly TemporaryFolder _out = new();

    private static string[] Commands { get; } = [.. ShellBlock().Matches(File.ReadAllText(Path.Combine(Repository.Root, "README.md"))).Select(m => m.Groups[1].Value.Trim())];

    public void Dispose() => _out.Dispose();

    /// <summary>
    /// The command as it stands, with two more options. Results go to a folder of the test's own. It does not build: what it runs is
    /// built with this test, and a build in the middle of a test run would write over what other tests are running.
    /// </summary>
    [Fact]
    public async Task First_command_measures_the_demo_and_ends_in_one_breach()
    {
        var words = Commands[0].Split(' ');
        Assert.Equal(["dotnet", "run"], words[..2]);
        using var process = RiskworkerProcess.Start("dotnet", ["run", "--no-build", .. words[2..], "--out", _out.Path], Repository.Root);
        var ending = await RiskworkerProcess.EndAsync(process);

        Assert.True(ending.Code == 1, $"Exit code {ending.Code}: {ending.Error}");
        Assert.Contains("250 past dates filled, marked as backfilled.", ending.Output, StringComparison.Ordinal);
        Assert.Contains("1 of 16 limits is breached.", ending.Output, StringComparison.Ordinal);
        var file = Directory.GetFiles(_out.Path, "results.json", SearchOption.AllDirectories).Single();
        using var results = JsonDocument.Parse(await File.ReadAllBytesAsync(file, TestContext.Current.CancellationToken));
        Assert.NotEmpty(results.RootElement.GetProperty("backtest").EnumerateArray());
        Assert.All(results.RootElement.GetProperty("backtest").EnumerateArray(), AssertCount);
    }

    [Fact]
    public void Second_command_is_the_gate_s_to_the_letter()
    {
        Assert.Contains(File.ReadAllLines(Path.Combine(Repository.Root, ".ci", "run")), line => line.Trim() == Commands[1] || line.StartsWith(Commands[1] + " ", StringComparison.Ordinal));
        Assert.All(Commands[..2], command => Assert.Contains("-c Release", command, StringComparison.Ordinal));
    }

    /// <summary>Counts again from the series that stands beside the count; the boundaries are those of the Basel framework (MAR99) for 250 days at 99%.</summary>
    private static void AssertCount(JsonElement count)
    {
        var series = count.GetProperty("series").EnumerateArray().ToList();
        int Beyond(string profit) => series.Count(day => day.GetProperty("var").ValueKind == JsonValueKind.Null || day.GetProperty(profit).ValueKind == JsonValueKind.Null
            || -day.GetProperty(profit).GetDouble() > day.GetProperty("var").GetDouble());
        var exceptions = Math.Max(Beyond("actual"), Beyond("hypothetical"));
        Assert.Equal((250, 250), (series.Count, count.GetProperty("days").GetInt32()));
        Assert.Equal(exceptions, count.GetProperty("exceptions").GetInt32());
        Assert.Equal(exceptions < 5 ? "green" : exceptions < 10 ? "yellow" : "red", count.GetProperty("zone").GetString());
    }

    [GeneratedRegex("^```sh\n(.*?)^```", RegexOptions.Multiline | RegexOptions.Singleline)]
    private static partial Regex ShellBlock();
}
