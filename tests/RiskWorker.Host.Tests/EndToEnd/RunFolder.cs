using System.Text.Json;
using RiskWorker.Host.Tests.Verbs;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>A folder of settings and a folder of results, with command lines run on both in this process.</summary>
internal sealed class RunFolder : IDisposable
{
    private readonly TemporaryFolder _config = new();
    private readonly TemporaryFolder _out = new();

    public string Config => _config.Path;

    public string Out => _out.Path;

    public string Store => Path.Combine(Out, "riskworker.db");

    /// <summary>The folders of runs under OUT/AS-OF, unfinished ones included.</summary>
    public IEnumerable<string> Runs => Directory.GetDirectories(Out).SelectMany(Directory.GetDirectories).Order(StringComparer.Ordinal);

    public void Dispose()
    {
        _config.Dispose();
        _out.Dispose();
    }

    public void WriteTinyFeed() => TinyFeed.Write(_config);

    public void WriteFeed(string file, string text) => _config.Write(Path.Combine("feed", file), text);

    public void WriteSettings(string json) => _config.Write("riskworker.json", json);

    public string ReadFeed(string file) => File.ReadAllText(Path.Combine(Config, "feed", file));

    public void CopyConfig(string folder)
    {
        foreach (var file in Directory.GetFiles(folder, "*", SearchOption.AllDirectories)) _config.Write(Path.GetRelativePath(folder, file), File.ReadAllText(file));
    }

    /// <summary>Runs a verb with both folders.</summary>
    public async Task<Ending> RunAsync(params string[] args)
    {
        using var terminal = new TerminalRecorder();
        var code = await terminal.RunAsync(Composition.UseCases(TimeProvider.System), [.. args, "--config", Config, "--out", Out]);
        return new((int)code, terminal.Output, terminal.Error);
    }

    /// <summary>Measures, expects <paramref name="code"/>, and returns the <c>results.json</c> that was printed.</summary>
    public async Task<JsonElement> MeasureAsync(int code, params string[] options)
    {
        var ending = await RunAsync(["measure", "--json", .. options]);
        Assert.True(code == ending.Code, $"Exit code {ending.Code}: {ending.Error}");
        return JsonSerializer.Deserialize<JsonElement>(ending.Output);
    }
}

/// <summary>How a command line ended.</summary>
internal sealed record Ending(int Code, string Output, string Error);
