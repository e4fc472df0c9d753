using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using Quartz;

namespace RiskWorker.Host.Jobs;

/// <summary>Says at the start what the service will do next, and at the stop that it stops.</summary>
public sealed class ScheduleAnnouncement(ServiceRequest request, ISchedulerFactory schedulers, ILogger<ScheduleAnnouncement> logger) : IHostedLifecycleService
{
    /// <inheritdoc/>
    public Task StartingAsync(CancellationToken cancellationToken) => Task.CompletedTask;

    /// <inheritdoc/>
    public Task StartAsync(CancellationToken cancellationToken) => Task.CompletedTask;

    /// <inheritdoc/>
    public async Task StartedAsync(CancellationToken cancellationToken)
    {
        var schedules = request.Configuration.Schedules;
        var version = typeof(ScheduleAnnouncement).Assembly.GetName().Version?.ToString(3) ?? "";
        ServiceLog.ServiceStarted(logger, version, Environment.ProcessId, request.Workspace.StoreFile, schedules.Count);
        var scheduler = await schedulers.GetScheduler(cancellationToken);
        foreach (var schedule in schedules)
        {
            var trigger = await scheduler.GetTrigger(new TriggerKey(schedule.Name), cancellationToken);
            if (trigger?.NextFireTimeUtc is { } next)
                ServiceLog.ScheduleNext(logger, schedule.Name, schedule.Verb, Instants.Local(next, schedule.TimeZone), schedule.TimeZone.Id, Instants.Utc(next));
        }
    }

    /// <inheritdoc/>
    public Task StoppingAsync(CancellationToken cancellationToken)
    {
        ServiceLog.Stopping(logger, request.StopTimeout.TotalSeconds);
        return Task.CompletedTask;
    }

    /// <inheritdoc/>
    public Task StopAsync(CancellationToken cancellationToken) => Task.CompletedTask;

    /// <inheritdoc/>
    public Task StoppedAsync(CancellationToken cancellationToken) => Task.CompletedTask;
}
