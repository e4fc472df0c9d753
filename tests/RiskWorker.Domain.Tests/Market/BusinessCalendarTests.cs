using RiskWorker.Domain.Market;

namespace RiskWorker.Domain.Tests.Market;

public sealed class BusinessCalendarTests
{
    // 25 December 2026 is a Friday.
    private static readonly DateOnly s_christmas = new(2026, 12, 25);
    private static readonly BusinessCalendar s_calendar = new([s_christmas, s_christmas.AddDays(3), s_christmas.AddDays(1)]);

    [Fact]
    public void Weekdays_are_open_from_Monday_to_Friday()
    {
        var monday = new DateOnly(2026, 11, 23);
        Assert.Equal([true, true, true, true, true, false, false], Enumerable.Range(0, 7).Select(i => BusinessCalendar.Weekdays.IsOpen(monday.AddDays(i))));
    }

    [Fact]
    public void IsOpen_is_false_on_holidays() => Assert.False(s_calendar.IsOpen(s_christmas));

    [Fact]
    public void Next_and_Previous_pass_over_holidays_and_weekends()
    {
        Assert.Equal(new DateOnly(2026, 12, 29), s_calendar.Next(new(2026, 12, 24)));
        Assert.Equal(new DateOnly(2026, 12, 24), s_calendar.Previous(new(2026, 12, 29)));
        Assert.Equal(new DateOnly(2026, 12, 29), s_calendar.Next(new(2026, 12, 26)));
    }

    [Fact]
    public void Next_and_Previous_are_strict()
    {
        var tuesday = new DateOnly(2026, 11, 24);
        Assert.Equal(tuesday.AddDays(1), BusinessCalendar.Weekdays.Next(tuesday));
        Assert.Equal(tuesday.AddDays(-1), BusinessCalendar.Weekdays.Previous(tuesday));
    }

    [Fact]
    public void Previous_of_Next_is_the_open_day_itself()
    {
        for (var day = new DateOnly(2026, 12, 1); day < new DateOnly(2027, 1, 31); day = day.AddDays(1))
        {
            if (s_calendar.IsOpen(day)) Assert.Equal(day, s_calendar.Previous(s_calendar.Next(day)));
        }
    }

    [Fact]
    public void ByName_keeps_calendars_apart()
    {
        var calendars = BusinessCalendar.ByName([new("oslo", new(2026, 5, 18)), new("OSLO", new(2026, 5, 19)), new("oslo", new(2026, 5, 20))]);
        Assert.Equal(["OSLO", "oslo"], calendars.Keys.Order(StringComparer.Ordinal));
        Assert.Equal([false, true, false], Enumerable.Range(18, 3).Select(d => calendars["oslo"].IsOpen(new(2026, 5, d))));
        Assert.Equal([true, false, true], Enumerable.Range(18, 3).Select(d => calendars["OSLO"].IsOpen(new(2026, 5, d))));
    }
}
