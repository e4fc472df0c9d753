using System.CommandLine;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>runs</c>: lists stored runs, and shows one.</summary>
public sealed class RunsVerb : IVerb
{
    private readonly UseCaseSet _useCases;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;
    private readonly Option<bool> _listJson = CommonOptions.Json();
    private readonly Option<bool> _showJson = CommonOptions.Json();
    private readonly Argument<string> _id = new("ID") { Description = "Id of the run" };
    private readonly Option<string?> _pdf = new("--pdf") { Description = "Render its report again, byte-equal, into FILE", HelpName = "FILE" };

    /// <summary>Makes the verb.</summary>
    public RunsVerb(UseCaseSet useCases, CommonOptions options, Terminal terminal)
    {
        (_useCases, _options, _terminal) = (useCases, options, terminal);
        Command.Options.Add(_listJson);
        Command.SetAction(ListAsync);
        var show = new Command("show", "Shows one stored run") { _id, _pdf, _showJson };
        show.SetAction(ShowAsync);
        Command.Subcommands.Add(show);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("runs", "Lists stored runs, newest first");

    /// <inheritdoc/>
    public string[] Examples { get; } = ["riskworker runs --out out", "riskworker runs show ID --out out --pdf report.pdf"];

    private async Task<int> ListAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (_, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var runs = await _terminal.WithProgressAsync(progress => _useCases.ListRuns(new(workspace), progress, cancellationToken));
        if (parsed.GetValue(_listJson)) RunsListing.WriteJson(runs, _terminal.Output);
        else RunsListing.Write(runs, _terminal.Tables());
        return (int)ExitCode.Done;
    }

    private async Task<int> ShowAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (_, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var pdf = parsed.GetValue(_pdf) is { Length: > 0 } file ? Path.GetFullPath(file) : null;
        var request = new ShowRunRequest(workspace, parsed.GetRequiredValue(_id), pdf);
        var report = await _terminal.WithProgressAsync(progress => _useCases.ShowRun(request, progress, cancellationToken));
        if (parsed.GetValue(_showJson)) await _terminal.Output.WriteLineAsync(report.Json.TrimEnd());
        else MeasureListing.Write(report.Record, pdf is null ? [] : [pdf], _terminal.Tables());
        return (int)ExitCode.Done;
    }
}
