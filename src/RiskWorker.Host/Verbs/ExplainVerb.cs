using System.CommandLine;
using System.Globalization;
using RiskWorker.Domain.Evidence;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>backtest explain</c>: writes down what an exception is put down to.</summary>
public sealed class ExplainVerb : IVerb
{
    private static readonly Dictionary<string, ExceptionCause> s_causes = new(StringComparer.Ordinal)
    {
        ["system"] = ExceptionCause.System,
        ["model"] = ExceptionCause.Model,
        ["market"] = ExceptionCause.Market,
        ["intraday"] = ExceptionCause.Intraday,
    };

    private readonly UseCase<ExplainRequest, int> _explain;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;
    private readonly Argument<DateOnly> _date = new("DATE")
    {
        Description = "Date of the profit",
        CustomParser = result =>
        {
            if (DateOnly.TryParseExact(result.Tokens[0].Value, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var date)) return date;
            result.AddError($"'{result.Tokens[0].Value}' is no date as yyyy-MM-dd");
            return default;
        },
    };

    private readonly Option<string> _book = new("--book") { Description = "The book", HelpName = "NAME", Required = true };
    private readonly Option<ExceptionCause?> _cause = CommonOptions.Word("--cause", "system (an error of a system or of data), model, market or intraday", s_causes);
    private readonly Option<string> _text = new("--text") { Description = "The explanation", HelpName = "TEXT", Required = true };
    private readonly Option<string?> _author = new("--author") { Description = "Who writes it [default: the user's name]", HelpName = "NAME" };

    /// <summary>Makes the verb.</summary>
    public ExplainVerb(UseCase<ExplainRequest, int> explain, CommonOptions options, Terminal terminal)
    {
        (_explain, _options, _terminal) = (explain, options, terminal);
        _cause.Required = true;
        Command.Arguments.Add(_date);
        foreach (var option in new Option[] { _book, _cause, _text, _author }) Command.Options.Add(option);
        Command.SetAction(RunAsync);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("explain", "Writes down what an exception is put down to; a later explanation corrects an earlier one, which stays");

    /// <inheritdoc/>
    public string[] Examples { get; } = ["riskworker backtest explain 2026-03-09 --book SHARES --cause market --text \"The index fell by nine percent.\""];

    private async Task<int> RunAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (_, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var request = new ExplainRequest(workspace, parsed.GetValue(_date), parsed.GetValue(_book)!, parsed.GetValue(_cause)!.Value, parsed.GetValue(_text)!, parsed.GetValue(_author) ?? Environment.UserName);
        var count = await _terminal.WithProgressAsync(progress => _explain(request, progress, cancellationToken));
        await _terminal.Output.WriteLineAsync(count == 1
            ? $"The exception of {request.Book} on {request.Date:yyyy-MM-dd} is explained."
            : $"The explanation of {request.Book} on {request.Date:yyyy-MM-dd} is corrected; the {count - 1} earlier stay on record.");
        return (int)ExitCode.Done;
    }
}
