using System.Text.Json.Nodes;
using RiskWorker.Host.Tests.Architecture;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>The demo measured twice on a copy of its folder, with 20 days of backfill instead of 250; the README's test takes all of them.</summary>
public sealed class DemoRun : IAsyncLifetime
{
    private readonly RunFolder _folder = new();

    internal RunFolder Folder => _folder;

    internal Ending First { get; private set; } = null!;

    internal Ending Second { get; private set; } = null!;

    internal string FirstFolder { get; private set; } = null!;

    internal string SecondFolder { get; private set; } = null!;

    /// <summary>Files of CONFIG with their content, before and after.</summary>
    internal (IReadOnlyDictionary<string, string> Before, IReadOnlyDictionary<string, string> After) ConfigFiles { get; private set; }

    public async ValueTask InitializeAsync()
    {
        _folder.CopyConfig(Path.Combine(Repository.Root, "config-demo"));
        var settings = JsonNode.Parse(await File.ReadAllTextAsync(Path.Combine(_folder.Config, "riskworker.json")))!;
        settings["backfill"] = 20;
        _folder.WriteSettings(settings.ToJsonString());
        var before = Files(_folder.Config);

        First = await _folder.RunAsync("measure");
        FirstFolder = _folder.Runs.Single();
        Second = await _folder.RunAsync("measure");
        SecondFolder = _folder.Runs.Single(f => f != FirstFolder);
        ConfigFiles = (before, Files(_folder.Config));
    }

    public ValueTask DisposeAsync()
    {
        _folder.Dispose();
        return ValueTask.CompletedTask;
    }

    private static Dictionary<string, string> Files(string folder) =>
        Directory.GetFileSystemEntries(folder, "*", SearchOption.AllDirectories).ToDictionary(f => f, f => Directory.Exists(f) ? "" : File.ReadAllText(f), StringComparer.Ordinal);
}
