using Microsoft.Extensions.Logging;
using Quartz;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Jobs;

/// <summary>One scheduled run: reads the options, calls the use case, records the outcome. Whatever happens in it, the service goes on.</summary>
[DisallowConcurrentExecution]
public sealed class MeasureJob(
    ServiceRequest request, UseCaseSet useCases, BusinessDayRefresh businessDays, StopGrace grace, TimeProvider clock, ILogger<MeasureJob> logger) : IJob
{
    private static readonly TimeSpan s_recordTimeout = TimeSpan.FromSeconds(10);

    /// <inheritdoc/>
    public async ValueTask Execute(IJobExecutionContext context, CancellationToken cancellationToken)
    {
        var schedule = request.Configuration.Schedules.Single(s => s.Name == context.JobDetail.Key.Name);
        var due = context.ScheduledFireTimeUtc ?? context.FireTimeUtc;
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellationToken, grace.Over);
        if (grace.HasBegun) await RecordInterruptionAsync(schedule, due, clock.GetUtcNow()); // it waited behind the run that the stop waits for
        else await MeasureAsync(schedule, due, stop.Token);
        if (grace.HasBegun) return;
        if (schedule.DeadlineAfter(due) is { } deadline && clock.GetUtcNow() > deadline) ServiceLog.DeadlineMissed(logger, schedule.Name, Instants.Utc(due), Instants.Utc(deadline));
        await businessDays.RunAsync(context.Scheduler, new PhaseLog(logger, schedule.Name), stop.Token);
    }

    private async Task MeasureAsync(ScheduleOptions schedule, DateTimeOffset due, CancellationToken stop)
    {
        var started = clock.GetUtcNow();
        ServiceLog.RunStarted(logger, schedule.Name, Instants.Utc(due));
        try
        {
            LogOutcome(schedule, await useCases.Measure(Request(), new PhaseLog(logger, schedule.Name), stop));
        }
        catch (OperationCanceledException) when (stop.IsCancellationRequested)
        {
            await RecordInterruptionAsync(schedule, due, started);
        }
        catch (DataRefusedException refusal)
        {
            ServiceLog.RunRefused(logger, schedule.Name, refusal.Message);
        }
        catch (Exception failure)
        {
            ServiceLog.RunFailed(logger, failure, schedule.Name);
        }
    }

    private MeasureRequest Request() => new()
    {
        Workspace = request.Workspace,
        Configuration = request.Configuration,
        Command = ["riskworker", "measure", "--config", request.Workspace.ConfigFolder, "--out", request.Workspace.OutFolder],
    };

    private void LogOutcome(ScheduleOptions schedule, MeasureReport report)
    {
        var level = report.ExitCode switch
        {
            ExitCode.Done => LogLevel.Information,
            ExitCode.Breach or ExitCode.Undecided => LogLevel.Warning,
            _ => LogLevel.Error,
        };
        var record = report.Record;
        var asOf = Instants.Date(record.AsOf);
        ServiceLog.RunFinished(logger, level, schedule.Name, record.Run, asOf, record.Status, report.ExitCode, report.Folder);
    }

    /// <summary>A cancelled job counts as done for the scheduler, so the interruption is on record here or nowhere.</summary>
    private async Task RecordInterruptionAsync(ScheduleOptions schedule, DateTimeOffset due, DateTimeOffset started)
    {
        using var timeout = new CancellationTokenSource(s_recordTimeout, clock);
        try
        {
            var run = new InterruptedRun(request.Workspace, schedule.Name, due, started, clock.GetUtcNow());
            if (await useCases.RecordInterrupted(run, new PhaseLog(logger, schedule.Name), timeout.Token)) ServiceLog.RunInterrupted(logger, schedule.Name, Instants.Utc(due));
            else ServiceLog.InterruptionLost(logger, null, schedule.Name, Instants.Utc(due));
        }
        catch (Exception failure)
        {
            ServiceLog.InterruptionLost(logger, failure, schedule.Name, Instants.Utc(due));
        }
    }
}
