using System.CommandLine;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>load</c>: reads the feed into the store.</summary>
public sealed class LoadVerb : IVerb
{
    private readonly UseCase<LoadRequest, LoadReport> _load;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;
    private readonly Option<bool> _json = CommonOptions.Json();

    /// <summary>Makes the verb.</summary>
    public LoadVerb(UseCase<LoadRequest, LoadReport> load, CommonOptions options, Terminal terminal)
    {
        (_load, _options, _terminal) = (load, options, terminal);
        Command.Options.Add(_json);
        Command.SetAction(RunAsync);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("load", "Reads the files of CONFIG/feed into the store: each whole or not at all");

    /// <inheritdoc/>
    public string[] Examples { get; } = ["riskworker load --config demo --out out"];

    private async Task<int> RunAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (_, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var report = await _terminal.WithProgressAsync(progress => _load(new(workspace), progress, cancellationToken));
        if (parsed.GetValue(_json)) LoadListing.WriteJson(report, _terminal.Output);
        else LoadListing.Write(report, _terminal.Tables());
        return (int)ExitCode.Done;
    }
}
