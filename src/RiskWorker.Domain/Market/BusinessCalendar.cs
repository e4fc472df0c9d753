namespace RiskWorker.Domain.Market;

/// <summary>Open days of a market: Monday to Friday less its holidays.</summary>
public sealed class BusinessCalendar
{
    private readonly HashSet<DateOnly> _holidays;

    /// <summary>A calendar that is open every Monday to Friday.</summary>
    public static BusinessCalendar Weekdays { get; } = new([]);

    /// <summary>Builds a calendar from its holidays; weekends among them are harmless.</summary>
    public BusinessCalendar(IEnumerable<DateOnly> holidays) => _holidays = [.. holidays];

    /// <summary>The calendars named in <paramref name="holidays"/>, by name.</summary>
    public static IReadOnlyDictionary<string, BusinessCalendar> ByName(IEnumerable<Holiday> holidays) =>
        holidays.GroupBy(h => h.Calendar, StringComparer.Ordinal)
            .ToDictionary(g => g.Key, g => new BusinessCalendar(g.Select(h => h.Date)), StringComparer.Ordinal);

    /// <summary>Whether the market is open on <paramref name="date"/>.</summary>
    public bool IsOpen(DateOnly date) =>
        date.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday) && !_holidays.Contains(date);

    /// <summary>The last open day strictly before <paramref name="date"/>.</summary>
    public DateOnly Previous(DateOnly date)
    {
        do date = date.AddDays(-1);
        while (!IsOpen(date));
        return date;
    }

    /// <summary>The first open day strictly after <paramref name="date"/>.</summary>
    public DateOnly Next(DateOnly date)
    {
        do date = date.AddDays(1);
        while (!IsOpen(date));
        return date;
    }
}
