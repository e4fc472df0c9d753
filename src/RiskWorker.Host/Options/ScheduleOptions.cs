namespace RiskWorker.Host.Options;

/// <summary>When the service runs a verb by itself.</summary>
/// <param name="Name">Identifies the schedule.</param>
/// <param name="Cron">Quartz cron expression, seconds first.</param>
/// <param name="TimeZone">The zone that the expression and the deadline are read in.</param>
/// <param name="Calendar">Business days that it keeps to, by the name in <c>holidays.csv</c>; null for every day that the expression names.</param>
/// <param name="Verb">What it runs.</param>
/// <param name="Deadline">Time of day by which the run should have ended; null for none.</param>
public sealed record ScheduleOptions(string Name, string Cron, TimeZoneInfo TimeZone, string? Calendar, string Verb, TimeOnly? Deadline)
{
    /// <summary>Where the settings hold it.</summary>
    public string Path => "schedules." + Name;

    /// <summary>The instant by which the run that came due at <paramref name="due"/> should have ended: the first such time of day after it.</summary>
    public DateTimeOffset? DeadlineAfter(DateTimeOffset due)
    {
        if (Deadline is not { } time) return null;
        var local = TimeZoneInfo.ConvertTime(due, TimeZone).DateTime;
        var deadline = local.Date + time.ToTimeSpan();
        if (deadline <= local) deadline = deadline.AddDays(1);
        if (TimeZone.IsInvalidTime(deadline)) deadline = deadline.AddHours(1); // the hour that the clocks skip in spring
        return new DateTimeOffset(deadline, TimeZone.GetUtcOffset(deadline)).ToUniversalTime();
    }
}
