using Microsoft.Extensions.Logging;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Jobs;

/// <summary>The service's log lines. An event id keeps its meaning for good: 10xx the service, 20xx its runs.</summary>
public static partial class ServiceLog
{
    /// <summary>The service is up.</summary>
    [LoggerMessage(1001, LogLevel.Information, "Service {Version} started as process {Process} on {Store}, {Schedules} schedules")]
    public static partial void ServiceStarted(ILogger logger, string version, int process, string store, int schedules);

    /// <summary>A schedule and when it comes due.</summary>
    [LoggerMessage(1002, LogLevel.Information, "Schedule {Schedule} ({Verb}) next at {Local} {Zone}, {Utc}")]
    public static partial void ScheduleNext(ILogger logger, string schedule, string verb, string local, string zone, string utc);

    /// <summary>The service was told to stop.</summary>
    [LoggerMessage(1003, LogLevel.Information, "Stopping; a run that is on has {Seconds} s to end")]
    public static partial void Stopping(ILogger logger, double seconds);

    /// <summary>The feed's holidays changed.</summary>
    [LoggerMessage(1004, LogLevel.Information, "Holidays changed; {Calendars} calendars of the scheduler replaced")]
    public static partial void CalendarsReplaced(ILogger logger, int calendars);

    /// <summary>The feed's holidays could not be read; the scheduler keeps those it has.</summary>
    [LoggerMessage(1005, LogLevel.Error, "Holidays could not be read again; schedules keep to those known")]
    public static partial void CalendarsKept(ILogger logger, Exception failure);

    /// <summary>A run began.</summary>
    [LoggerMessage(2001, LogLevel.Information, "Schedule {Schedule}: run due {Due} began")]
    public static partial void RunStarted(ILogger logger, string schedule, string due);

    /// <summary>A run came to its end; a failed one too has its record and its report.</summary>
    [LoggerMessage(EventId = 2002, Message = "Schedule {Schedule}: run {Run} for {AsOf} {Status}, outcome {Outcome}, documents in {Folder}")]
    public static partial void RunFinished(ILogger logger, LogLevel level, string schedule, string run, string asOf, RunStatus status, ExitCode outcome, string? folder);

    /// <summary>The data was refused: there is no run.</summary>
    [LoggerMessage(2003, LogLevel.Error, "Schedule {Schedule}: no run, the data was refused: {Reason}")]
    public static partial void RunRefused(ILogger logger, string schedule, string reason);

    /// <summary>A run failed inside; the service goes on.</summary>
    [LoggerMessage(2004, LogLevel.Error, "Schedule {Schedule}: run failed; the service goes on")]
    public static partial void RunFailed(ILogger logger, Exception failure, string schedule);

    /// <summary>A run was cut short by a stop, and that is recorded.</summary>
    [LoggerMessage(2005, LogLevel.Warning, "Schedule {Schedule}: run due {Due} cut short by the stop and recorded as interrupted")]
    public static partial void RunInterrupted(ILogger logger, string schedule, string due);

    /// <summary>A run was cut short by a stop, and that could not be recorded.</summary>
    [LoggerMessage(2006, LogLevel.Error, "Schedule {Schedule}: run due {Due} cut short by the stop, which could not be recorded")]
    public static partial void InterruptionLost(ILogger logger, Exception? failure, string schedule, string due);

    /// <summary>A run ended after its deadline.</summary>
    [LoggerMessage(2007, LogLevel.Warning, "Schedule {Schedule}: run due {Due} ended after its deadline {Deadline}")]
    public static partial void DeadlineMissed(ILogger logger, string schedule, string due, string deadline);

    /// <summary>How far a run has come.</summary>
    [LoggerMessage(2008, LogLevel.Debug, "Schedule {Schedule}: {Phase} {Detail}")]
    public static partial void RunPhase(ILogger logger, string schedule, string phase, string? detail);
}
