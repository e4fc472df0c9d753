using System.CommandLine;
using System.Globalization;
using RiskWorker.Host.Jobs;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Verbs;

/// <summary><c>serve</c>: the service that runs by its schedules until it is told to stop.</summary>
public sealed class ServeVerb : IVerb
{
    private const int DefaultStopSeconds = 60;
    private const int MostStopSeconds = 86_400;

    private readonly UseCaseSet _useCases;
    private readonly CommonOptions _options;
    private readonly Terminal _terminal;

    private readonly Option<int?> _stop = CommonOptions.Parsed<int>("--stop-timeout", "SECONDS",
        $"How long a stop waits for the run that is on before it is cut short and recorded as interrupted [default: {DefaultStopSeconds}]",
        $"a whole number from 0 to {MostStopSeconds}",
        text => int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var seconds) && seconds <= MostStopSeconds ? seconds : null);

    /// <summary>Makes the verb.</summary>
    public ServeVerb(UseCaseSet useCases, CommonOptions options, Terminal terminal)
    {
        (_useCases, _options, _terminal) = (useCases, options, terminal);
        Command.Options.Add(_stop);
        Command.SetAction(RunAsync);
    }

    /// <inheritdoc/>
    public Command Command { get; } = new("serve", "Runs by the schedules of riskworker.json until it is told to stop (Ctrl-C or the termination signal)");

    /// <inheritdoc/>
    public string[] Examples { get; } = ["riskworker serve --config demo --out out"];

    private async Task<int> RunAsync(ParseResult parsed, CancellationToken cancellationToken)
    {
        var (configuration, workspace) = await _options.ReadAsync(parsed, cancellationToken);
        var request = new ServiceRequest
        {
            Workspace = workspace,
            Configuration = configuration,
            StopTimeout = TimeSpan.FromSeconds(parsed.GetValue(_stop) ?? DefaultStopSeconds),
            IsVerbose = _options.IsVerbose(parsed),
        };
        await RiskService.RunAsync(request, _useCases, _terminal.Clock, cancellationToken);
        return (int)ExitCode.Done;
    }
}
