using Quartz;
using RiskWorker.Domain.Market;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Jobs;

/// <summary>What only the service can check of its schedules: it needs the clock and the holidays.</summary>
public static class ScheduleChecks
{
    /// <summary>Every fault of <paramref name="schedules"/>.</summary>
    public static IReadOnlyList<SettingsFault> Faults(IReadOnlyList<ScheduleOptions> schedules, IReadOnlyList<Holiday> holidays, DateTimeOffset now)
    {
        if (schedules.Count == 0) return [new("schedules", "none", "at least one schedule, since the service runs by nothing else")];
        var faults = new List<SettingsFault>();
        var calendars = holidays.Select(h => h.Calendar).Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal).ToArray();
        foreach (var schedule in schedules)
        {
            if (schedule.Calendar is { } name && !calendars.Contains(name, StringComparer.Ordinal))
                faults.Add(new(schedule.Path + ".calendar", $"'{Printable.Of(name, 60)}'", calendars.Length == 0 ? "no calendar: holidays.csv holds none" : "a calendar of holidays.csv: " + string.Join(", ", calendars)));
            if (new CronExpression(schedule.Cron, schedule.TimeZone).GetNextValidTimeAfter(now) is null)
                faults.Add(new(schedule.Path + ".cron", $"'{schedule.Cron}', which lies in the past for good", "an expression that still comes due"));
        }
        return faults;
    }
}
