using RiskWorker.Domain.Market;
using RiskWorker.Host.UseCases;
using RiskWorker.Host.Verbs;

namespace RiskWorker.Host.Tests.Verbs;

/// <summary>Runs command lines in this process and keeps what they print.</summary>
internal sealed class TerminalRecorder : IDisposable
{
    private readonly StringWriter _output = new();
    private readonly StringWriter _error = new();

    public string Output => _output.ToString();

    public string Error => _error.ToString();

    public Task<ExitCode> RunAsync(UseCaseSet useCases, params string[] args) => RunAsync(useCases, TestContext.Current.CancellationToken, args);

    public Task<ExitCode> RunAsync(UseCaseSet useCases, CancellationToken cancellationToken, params string[] args) =>
        new CommandTree(useCases, new Terminal(_output, _error, isInteractive: false, TimeProvider.System)).RunAsync(args, cancellationToken);

    public void Dispose()
    {
        _output.Dispose();
        _error.Dispose();
    }

    /// <summary>Use cases none of which may be called; a test replaces the one it is about.</summary>
    public static UseCaseSet NoUseCases { get; } = new()
    {
        Load = Uncalled<LoadRequest, LoadReport>,
        Measure = Uncalled<MeasureRequest, MeasureReport>,
        Backtest = Uncalled<BacktestRequest, BacktestReport>,
        Explain = Uncalled<ExplainRequest, int>,
        ListRuns = Uncalled<ListRunsRequest, IReadOnlyList<RunSummary>>,
        ShowRun = Uncalled<ShowRunRequest, ShowRunReport>,
        Verify = Uncalled<VerifyRequest, VerifyReport>,
        Holidays = Uncalled<HolidaysRequest, IReadOnlyList<Holiday>>,
        RecordInterrupted = Uncalled<InterruptedRun, bool>,
    };

    private static Task<TReport> Uncalled<TRequest, TReport>(TRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) =>
        throw new InvalidOperationException($"{typeof(TRequest).Name} was not expected.");
}
