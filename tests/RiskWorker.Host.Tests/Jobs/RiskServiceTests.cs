using RiskWorker.Host.Jobs;
using RiskWorker.Host.Options;
using RiskWorker.Host.Tests.Verbs;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Tests.Jobs;

/// <summary>The service in this process, its schedules due every second, its use cases under the test's control.</summary>
public sealed class RiskServiceTests : IDisposable
{
    private static readonly TimeSpan s_patience = TimeSpan.FromSeconds(60);
    private readonly TemporaryFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task RunAsync_failing_run_leaves_the_service_alive()
    {
        var second = new TaskCompletionSource();
        var runs = 0;
        await ServeUntilAsync(second.Task, TimeSpan.FromSeconds(30), TerminalRecorder.NoUseCases with
        {
            Measure = (_, _, _) =>
            {
                if (Interlocked.Increment(ref runs) == 1) throw new InvalidOperationException("first run fails");
                second.TrySetResult();
                return Task.FromResult(SampleRuns.Report());
            },
            RecordInterrupted = (_, _, _) => Task.FromResult(true),
            Holidays = NoHolidays,
        });
        Assert.True(runs >= 2);
    }

    [Fact]
    public async Task RunAsync_runs_of_two_schedules_never_overlap()
    {
        var third = new TaskCompletionSource();
        var (running, most, runs) = (0, 0, 0);
        await ServeUntilAsync(third.Task, TimeSpan.FromSeconds(30), TerminalRecorder.NoUseCases with
        {
            Measure = async (_, _, token) =>
            {
                most = Math.Max(most, Interlocked.Increment(ref running));
                await Task.Delay(1_500, token); // the run itself takes longer than the second between two fires
                Interlocked.Decrement(ref running);
                if (Interlocked.Increment(ref runs) == 3) third.TrySetResult();
                return SampleRuns.Report();
            },
            RecordInterrupted = (_, _, _) => Task.FromResult(true),
            Holidays = NoHolidays,
        });
        Assert.Equal(1, most);
    }

    [Fact]
    public async Task RunAsync_stop_waits_for_the_run_that_is_on_and_begins_no_other()
    {
        var (began, finish, runs, finished) = (new TaskCompletionSource(), new TaskCompletionSource(), 0, 0);
        using var stop = new CancellationTokenSource();
        var service = Serve(TimeSpan.FromMinutes(5), TerminalRecorder.NoUseCases with
        {
            Measure = async (_, _, token) =>
            {
                Interlocked.Increment(ref runs);
                began.TrySetResult();
                await finish.Task.WaitAsync(token);
                Interlocked.Increment(ref finished);
                return SampleRuns.Report();
            },
            RecordInterrupted = (_, _, _) => Task.FromResult(true),
            Holidays = NoHolidays,
        }, stop.Token);
        await began.Task.WaitAsync(s_patience, TestContext.Current.CancellationToken);
        await stop.CancelAsync();
        Assert.False(service.IsCompleted);
        finish.SetResult();
        await service.WaitAsync(s_patience, TestContext.Current.CancellationToken);
        Assert.Equal((1, 1), (runs, finished));
    }

    [Fact]
    public async Task RunAsync_stop_beyond_its_timeout_cuts_the_run_short_and_records_that()
    {
        var began = new TaskCompletionSource();
        var recorded = new List<InterruptedRun>();
        await ServeUntilAsync(began.Task, TimeSpan.Zero, TerminalRecorder.NoUseCases with
        {
            Measure = async (_, _, token) =>
            {
                began.TrySetResult();
                await Task.Delay(Timeout.Infinite, token);
                return SampleRuns.Report();
            },
            RecordInterrupted = (run, _, _) =>
            {
                recorded.Add(run);
                return Task.FromResult(true);
            },
        });
        Assert.NotEmpty(recorded); // the run that was on, and one of the other schedule if it was waiting
        Assert.Distinct(recorded.Select(r => r.Schedule));
        Assert.All(recorded, r => Assert.True(r.ScheduledFor < r.Started && r.Started <= r.Interrupted));
    }

    [Fact]
    public async Task RunAsync_second_service_on_one_store_is_refused()
    {
        var began = new TaskCompletionSource();
        using var stop = new CancellationTokenSource();
        var useCases = TerminalRecorder.NoUseCases with
        {
            Measure = (_, _, _) =>
            {
                began.TrySetResult();
                return Task.FromResult(SampleRuns.Report());
            },
            RecordInterrupted = (_, _, _) => Task.FromResult(true),
            Holidays = NoHolidays,
        };
        var service = Serve(TimeSpan.FromSeconds(30), useCases, stop.Token);
        await began.Task.WaitAsync(s_patience, TestContext.Current.CancellationToken);
        var refusal = await Assert.ThrowsAsync<SettingsException>(() => Serve(TimeSpan.Zero, useCases, stop.Token));
        Assert.Contains($"process {Environment.ProcessId}", refusal.Message, StringComparison.Ordinal);
        await stop.CancelAsync();
        await service.WaitAsync(s_patience, TestContext.Current.CancellationToken);
    }

    private static Task<IReadOnlyList<Domain.Market.Holiday>> NoHolidays(HolidaysRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) =>
        Task.FromResult<IReadOnlyList<Domain.Market.Holiday>>([]);

    private async Task ServeUntilAsync(Task seen, TimeSpan stopTimeout, UseCaseSet useCases)
    {
        using var stop = new CancellationTokenSource();
        var service = Serve(stopTimeout, useCases, stop.Token);
        await Task.WhenAny(seen, service).WaitAsync(s_patience, TestContext.Current.CancellationToken);
        await stop.CancelAsync();
        await service.WaitAsync(s_patience, TestContext.Current.CancellationToken);
    }

    private Task Serve(TimeSpan stopTimeout, UseCaseSet useCases, CancellationToken stop)
    {
        var schedules = new[] { "first", "second" }.Select(name => new ScheduleOptions(name, "* * * * * ?", TimeZoneInfo.Utc, null, "measure", null));
        var request = new ServiceRequest
        {
            Workspace = new(_folder.Path, _folder.Path, Path.Combine(_folder.Path, "riskworker.db")),
            Configuration = new() { Schedules = [.. schedules] },
            StopTimeout = stopTimeout,
        };
        return RiskService.RunAsync(request, useCases, TimeProvider.System, stop);
    }
}
