using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary>The command line as a whole: parses, runs one verb, and turns whatever happens into an exit code.</summary>
public sealed class CommandTree
{
    private const string Job =
        "Turns last night's positions and closing prices into a limit report that can be signed: how much each book could lose, " +
        "how sure that figure is, which limits are breached, and what drives it.";

    private static readonly string[] s_exitCodes =
    [
        "Exit codes:",
        "  0  done",
        "  1  done, a limit is breached",
        "  2  stopped by a blocking finding, or a file of the feed was refused",
        "  3  the settings or the command line cannot be used",
        "  4  internal failure, or cancelled",
        "  5  a stored run, computed again, differs from its record",
        "  6  done, a limit is undecided at the cap of scenarios",
    ];

    private readonly Terminal _terminal;
    private readonly CommonOptions _options = new();
    private readonly RootCommand _root = new(Job);

    /// <summary>Puts the verbs together.</summary>
    public CommandTree(UseCaseSet useCases, Terminal terminal)
    {
        _terminal = terminal;
        _options.AddTo(_root);
        var examples = new Dictionary<Command, string[]> { [_root] = s_exitCodes };
        foreach (var verb in Verbs(useCases))
        {
            _root.Subcommands.Add(verb.Command);
            foreach (var command in verb.Command.Subcommands.Prepend(verb.Command)) examples[command] = ["Examples:", .. verb.Examples.Select(e => "  " + e)];
        }
        var help = _root.Options.OfType<HelpOption>().Single();
        help.Action = new ExampleHelp((HelpAction)help.Action!, examples);
    }

    /// <summary>Runs the verb that <paramref name="args"/> name.</summary>
    public async Task<ExitCode> RunAsync(IReadOnlyList<string> args, CancellationToken cancellationToken)
    {
        var parsed = _root.Parse(args, new() { ResponseFileTokenReplacer = null });
        if (parsed.Action is ParseErrorAction) return Refuse(parsed);
        try
        {
            InvocationConfiguration streams = new() { Output = _terminal.Output, Error = _terminal.Error, EnableDefaultExceptionHandler = false, ProcessTerminationTimeout = null };
            return (ExitCode)await parsed.InvokeAsync(streams, cancellationToken);
        }
        catch (Exception failure)
        {
            return Failures.Report(failure, _terminal.Error, _options.IsVerbose(parsed));
        }
    }

    private IEnumerable<IVerb> Verbs(UseCaseSet useCases) =>
    [
        new LoadVerb(useCases.Load, _options, _terminal),
        new MeasureVerb(useCases.Measure, _options, _terminal),
        new BacktestVerb(useCases, _options, _terminal),
        new RunsVerb(useCases, _options, _terminal),
        new VerifyVerb(useCases.Verify, _options, _terminal),
        new ServeVerb(useCases, _options, _terminal),
    ];

    /// <summary>What the parser did not understand, one line each, with the nearest option or verb.</summary>
    private ExitCode Refuse(ParseResult parsed)
    {
        var command = parsed.CommandResult.Command;
        var unknown = parsed.UnmatchedTokens.Where(t => t.StartsWith('-')).ToArray(); // the words behind an unknown option are its values
        if (unknown.Length == 0) unknown = [.. parsed.UnmatchedTokens];
        var known = command.Options.Concat(_root.Options).Select(o => o.Name).Concat(command.Subcommands.Select(c => c.Name)).ToArray();
        IEnumerable<string> lines = unknown.Length == 0 ? parsed.Errors.Select(e => e.Message) : unknown.Select(token => Unknown(token, known));
        foreach (var line in lines) _terminal.Error.WriteLine("riskworker: " + Printable.Of(line));
        _terminal.Error.WriteLine($"'{string.Join(' ', Names(command).Reverse())} --help' lists what there is.");
        return ExitCode.Usage;
    }

    private static string Unknown(string token, string[] known)
    {
        var meant = NearestKey.Of(token, known);
        return $"'{Printable.Of(token, 60)}' is not known here" + (meant is null ? "" : $"; did you mean '{meant}'?");
    }

    private static IEnumerable<string> Names(Command command)
    {
        for (Command? at = command; at is not null; at = at.Parents.OfType<Command>().FirstOrDefault()) yield return at is RootCommand ? "riskworker" : at.Name;
    }
}
