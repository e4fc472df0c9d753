using System.CommandLine;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>verify</c>: computes a stored run again from its frozen inputs and compares every bit.</summary>
public sealed class VerifyVerb : IVerb
{
    private readonly UseCase<VerifyRequest, VerifyReport> _verify;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;
    private readonly Argument<string> _run = new("RUN") { Description = "Id of the run, or the beginning of it" };
    private readonly Option<int?> _threads = CommonOptions.Threads();
    private readonly Option<bool> _json = CommonOptions.Json();

    /// <summary>Makes the verb.</summary>
    public VerifyVerb(UseCase<VerifyRequest, VerifyReport> verify, CommonOptions options, Terminal terminal)
    {
        (_verify, _options, _terminal) = (verify, options, terminal);
        Command.Arguments.Add(_run);
        Command.Options.Add(_threads);
        Command.Options.Add(_json);
        Command.SetAction(RunAsync);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("verify", "Computes a stored run again from its frozen inputs, compares every bit, and checks chain, record and files");

    /// <inheritdoc/>
    public string[] Examples { get; } = ["riskworker verify RUN --out out", "riskworker verify RUN --out out --threads 1 --json"];

    private async Task<int> RunAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (_, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var request = new VerifyRequest(workspace, parsed.GetRequiredValue(_run), parsed.GetValue(_threads));
        var report = await _terminal.WithProgressAsync(progress => _verify(request, progress, cancellationToken));
        if (parsed.GetValue(_json)) VerifyListing.WriteJson(report, _terminal.Output);
        else VerifyListing.Write(report, _terminal.Tables());
        return (int)report.ExitCode;
    }
}
