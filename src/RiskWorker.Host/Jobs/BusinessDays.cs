using Quartz;
using Quartz.Impl.Calendar;
using RiskWorker.Domain.Market;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Jobs;

/// <summary>The feed's calendars in the scheduler's form: Monday to Friday less the holidays, by the dates of a schedule's own zone.</summary>
public static class BusinessDays
{
    /// <summary>
    /// Name of the scheduler's calendar for <paramref name="schedule"/>: one for each calendar and zone, since a date begins
    /// at another instant in another zone. Null where the schedule keeps to none.
    /// </summary>
    public static string? NameFor(ScheduleOptions schedule) => schedule.Calendar is { } name ? $"{name}@{schedule.TimeZone.Id}" : null;

    /// <summary>The calendars that <paramref name="schedules"/> keep to, by <see cref="NameFor"/>.</summary>
    public static IReadOnlyDictionary<string, ICalendar> For(IEnumerable<ScheduleOptions> schedules, IReadOnlyList<Holiday> holidays) =>
        schedules.Where(s => s.Calendar is not null)
            .DistinctBy(NameFor)
            .ToDictionary(s => NameFor(s)!, s => (ICalendar)Calendar(holidays.Where(h => h.Calendar == s.Calendar), s.TimeZone), StringComparer.Ordinal);

    /// <summary>Both the holidays and the week need the zone: either would read dates in the machine's own.</summary>
    private static HolidayCalendar Calendar(IEnumerable<Holiday> holidays, TimeZoneInfo zone)
    {
        var calendar = new HolidayCalendar(new WeeklyCalendar { TimeZone = zone }) { TimeZone = zone };
        foreach (var holiday in holidays) calendar.AddExcludedDay(holiday.Date);
        return calendar;
    }
}
