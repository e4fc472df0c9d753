using System.CommandLine;
using System.CommandLine.Parsing;
using System.Globalization;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>measure</c>: one complete run, or a span of past dates.</summary>
public sealed class MeasureVerb : IVerb
{
    private readonly UseCase<MeasureRequest, MeasureReport> _measure;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;
    private readonly Option<DateOnly?> _asOf = CommonOptions.Date("--as-of", "As-of date [default: the newest with positions]");
    private readonly Option<DateOnly?> _from = CommonOptions.Date("--from", "First of a span of past dates to fill; they are marked as backfilled");
    private readonly Option<DateOnly?> _to = CommonOptions.Date("--to", "Last of that span");
    private readonly Option<int?> _scenarios = CommonOptions.Parsed("--scenarios", "N", "Scenarios of the first look [default: the settings', else 100000]", "a whole number", Whole);
    private readonly Option<ulong?> _seed = CommonOptions.Parsed("--seed", "N", "Seed of every draw [default: the settings', else 1]", $"a whole number from 0 to {ulong.MaxValue}", Unsigned);
    private readonly Option<int?> _threads = CommonOptions.Threads();
    private readonly Option<string?> _model = new("--model") { Description = "Model of record, by its name in the settings [default: the settings']", HelpName = "NAME" };
    private readonly Option<bool> _json = CommonOptions.Json();

    /// <summary>Makes the verb.</summary>
    public MeasureVerb(UseCase<MeasureRequest, MeasureReport> measure, CommonOptions options, Terminal terminal)
    {
        (_measure, _options, _terminal) = (measure, options, terminal);
        foreach (var option in new Option[] { _asOf, _from, _to, _scenarios, _seed, _threads, _model, _json }) Command.Options.Add(option);
        Command.Validators.Add(CheckDates);
        Command.SetAction(RunAsync);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("measure", "Loads the feed if it is new, measures every book on one date, holds the limits against it and writes the report");

    /// <inheritdoc/>
    public string[] Examples { get; } =
    [
        "riskworker measure --config demo",
        "riskworker measure --config demo --as-of 2026-11-27 --scenarios 1000000 --json",
        "riskworker measure --config demo --from 2026-01-02 --to 2026-11-26",
    ];

    private async Task<int> RunAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (settings, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var request = new MeasureRequest
        {
            Workspace = workspace,
            Configuration = settings.With(new RunOverrides(parsed.GetValue(_scenarios), parsed.GetValue(_seed), parsed.GetValue(_model))),
            Command = ["riskworker", "measure", .. _options.FolderWords(parsed)],
            AsOf = parsed.GetValue(_asOf),
            From = parsed.GetValue(_from),
            To = parsed.GetValue(_to),
            Threads = parsed.GetValue(_threads),
        };
        var report = await _terminal.WithProgressAsync(progress => _measure(request, progress, cancellationToken));
        if (parsed.GetValue(_json)) await _terminal.Output.WriteLineAsync(report.Json.TrimEnd());
        else MeasureListing.Write(report, _terminal.Tables());
        return (int)report.ExitCode;
    }

    private void CheckDates(CommandResult parsed)
    {
        var isAsOf = parsed.GetResult(_asOf) is not null;
        var (isFrom, isTo) = (parsed.GetResult(_from) is not null, parsed.GetResult(_to) is not null);
        if (isFrom != isTo) parsed.AddError("--from and --to go together: a span has a first and a last date");
        else if (isFrom && isAsOf) parsed.AddError("--as-of does not go with --from and --to: it is one date, they are a span");
        else if (isFrom && parsed.GetValue(_from) > parsed.GetValue(_to)) parsed.AddError("--from lies after --to");
    }

    private static int? Whole(string text) => int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var number) ? number : null;

    private static ulong? Unsigned(string text) => ulong.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var number) ? number : null;
}
