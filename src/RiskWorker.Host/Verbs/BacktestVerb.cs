using System.CommandLine;
using System.CommandLine.Parsing;
using System.Globalization;
using RiskWorker.Domain.Evidence;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>backtest</c>: what the model said, held against what came; and <c>backtest explain</c>.</summary>
public sealed class BacktestVerb : IVerb
{
    private static readonly Dictionary<string, BacktestKind> s_kinds = new(StringComparer.Ordinal)
    {
        ["recorded"] = BacktestKind.Recorded,
        ["backfilled"] = BacktestKind.Backfilled,
        ["walk-forward"] = BacktestKind.WalkForward,
    };

    private static readonly Dictionary<string, BacktestPositions> s_positions = new(StringComparer.Ordinal) { ["stored"] = BacktestPositions.Stored, ["today"] = BacktestPositions.Today };

    private readonly UseCase<BacktestRequest, BacktestReport> _backtest;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;
    private readonly Option<DateOnly?> _from = CommonOptions.Date("--from", "First day of profit [default: the last 500 days]");
    private readonly Option<DateOnly?> _to = CommonOptions.Date("--to", "Last day of profit [default: the newest]");
    private readonly Option<string?> _book = new("--book") { Description = "One book alone [default: all]", HelpName = "NAME" };
    private readonly Option<string?> _model = new("--model") { Description = "Model, by its name in the settings [default: the one of record]", HelpName = "NAME" };
    private readonly Option<BacktestKind?> _kind = CommonOptions.Word("--kind", "recorded (figures reported before the profit was known), backfilled, or walk-forward (the model estimated anew on each past day) [default: recorded]", s_kinds);
    private readonly Option<BacktestPositions?> _positions = CommonOptions.Word("--positions", "Positions of a walk-forward: stored (each day's own) or today (the newest, held fixed) [default: stored]", s_positions);
    private readonly Option<int?> _scenarios = CommonOptions.Parsed("--scenarios", "N", "Scenarios of each day of a walk-forward [default: the settings', else 100000]", "a whole number",
        text => int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var number) ? number : (int?)null);

    private readonly Option<int?> _threads = CommonOptions.Threads();
    private readonly Option<bool> _json = CommonOptions.Json();

    /// <summary>Makes the verb.</summary>
    public BacktestVerb(UseCaseSet useCases, CommonOptions options, Terminal terminal)
    {
        (_backtest, _options, _terminal) = (useCases.Backtest, options, terminal);
        foreach (var option in new Option[] { _from, _to, _book, _model, _kind, _positions, _scenarios, _threads, _json }) Command.Options.Add(option);
        Command.Validators.Add(Check);
        Command.SetAction(RunAsync);
        Command.Subcommands.Add(new ExplainVerb(useCases.Explain, options, terminal).Command);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("backtest", "Holds the model's figures against the profits that came, tests them and writes the evidence report");

    /// <inheritdoc/>
    public string[] Examples { get; } =
    [
        "riskworker backtest --config demo --kind backfilled",
        "riskworker backtest --config demo --kind walk-forward --positions today --from 2024-01-02 --scenarios 50000",
        "riskworker backtest explain 2026-03-09 --config demo --book SHARES --cause market --text \"The index fell by nine percent.\" --author \"J. Hale\"",
    ];

    private async Task<int> RunAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (settings, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var request = new BacktestRequest
        {
            Workspace = workspace,
            Configuration = settings.With(new RunOverrides(parsed.GetValue(_scenarios), null, parsed.GetValue(_model))),
            Command = ["riskworker", "backtest", .. _options.FolderWords(parsed), .. Words(parsed)],
            Kind = parsed.GetValue(_kind) ?? BacktestKind.Recorded,
            Positions = parsed.GetValue(_positions) ?? BacktestPositions.Stored,
            From = parsed.GetValue(_from),
            To = parsed.GetValue(_to),
            Book = parsed.GetValue(_book),
            Threads = parsed.GetValue(_threads),
        };
        var report = await _terminal.WithProgressAsync(progress => _backtest(request, progress, cancellationToken));
        if (parsed.GetValue(_json)) await _terminal.Output.WriteLineAsync(report.Json.TrimEnd());
        else BacktestListing.Write(report, _terminal.Tables());
        return (int)ExitCode.Done;
    }

    // What was asked for, so that the report's command makes the same again.
    private IEnumerable<string> Words(ParseResult parsed)
    {
        foreach (var (option, value) in new (Option, string?)[]
        {
            (_kind, Word(s_kinds, parsed.GetValue(_kind))), (_positions, Word(s_positions, parsed.GetValue(_positions))), (_from, Text(parsed.GetValue(_from))), (_to, Text(parsed.GetValue(_to))),
            (_book, parsed.GetValue(_book)), (_model, parsed.GetValue(_model)), (_scenarios, parsed.GetValue(_scenarios)?.ToString(CultureInfo.InvariantCulture)),
        })
        {
            if (value is null) continue;
            yield return option.Name;
            yield return value;
        }
    }

    private void Check(CommandResult parsed)
    {
        if (Readable(parsed, _from) is { } from && Readable(parsed, _to) is { } to && from > to) parsed.AddError("--from lies after --to");
        if (Readable(parsed, _kind) == BacktestKind.WalkForward) return;
        if (parsed.GetResult(_positions) is not null) parsed.AddError("--positions goes with --kind walk-forward: runs have positions of their own");
        if (parsed.GetResult(_scenarios) is not null) parsed.AddError("--scenarios goes with --kind walk-forward: runs have scenarios of their own");
    }

    // A value that cannot be read has its own message; asking for it throws.
    private static T? Readable<T>(CommandResult parsed, Option<T?> option) where T : struct
    {
        try
        {
            return parsed.GetValue(option);
        }
        catch (InvalidOperationException)
        {
            return null;
        }
    }

    private static string? Text(DateOnly? date) => date?.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static string? Word<T>(Dictionary<string, T> words, T? value) where T : struct => value is { } one ? words.First(w => w.Value.Equals(one)).Key : null;
}
