using Quartz;
using RiskWorker.Domain.Market;
using RiskWorker.Host.Jobs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Jobs;

public sealed class BusinessDaysTests
{
    private static readonly TimeZoneInfo s_auckland = TimeZoneInfo.FindSystemTimeZoneById("Pacific/Auckland");
    private static readonly TimeZoneInfo s_honolulu = TimeZoneInfo.FindSystemTimeZoneById("Pacific/Honolulu");

    [Theory]
    [InlineData("2026-12-24T18:00:00Z", false)] // 25 December 07:00 in Auckland: the holiday
    [InlineData("2026-12-25T18:00:00Z", false)] // Saturday there, Friday in UTC
    [InlineData("2026-12-27T18:00:00Z", true)]  // Monday there, Sunday in UTC
    [InlineData("2026-12-23T18:00:00Z", true)]
    public void For_calendar_reads_dates_and_weekdays_in_the_schedules_zone(string instant, bool isOpen)
    {
        var calendar = BusinessDays.For([Schedule("a", s_auckland)], [new Holiday("NZ", new(2026, 12, 25))]).Single().Value;
        Assert.Equal(isOpen, calendar.IsTimeIncluded(DateTimeOffset.Parse(instant, null)));
    }

    [Fact]
    public void For_one_calendar_in_two_zones_gives_two()
    {
        var calendars = BusinessDays.For([Schedule("a", s_auckland), Schedule("b", s_honolulu), Schedule("c", s_auckland)], [new Holiday("NZ", new(2026, 12, 25))]);
        Assert.Equal(["NZ@Pacific/Auckland", "NZ@Pacific/Honolulu"], calendars.Keys.Order());
        var instant = DateTimeOffset.Parse("2026-12-24T18:00:00Z", null); // the 24th in Honolulu
        Assert.Equal((false, true), (calendars["NZ@Pacific/Auckland"].IsTimeIncluded(instant), calendars["NZ@Pacific/Honolulu"].IsTimeIncluded(instant)));
    }

    [Fact]
    public void For_other_calendars_holidays_do_not_close_this_one()
    {
        var calendar = BusinessDays.For([Schedule("a", TimeZoneInfo.Utc)], [new Holiday("NZ", new(2026, 1, 2)), new Holiday("XX", new(2026, 12, 24))]).Single().Value;
        Assert.True(calendar.IsTimeIncluded(DateTimeOffset.Parse("2026-12-24T12:00:00Z", null)));
    }

    [Theory]
    [InlineData("0 30 2 * * ?", "2026-03-28T12:00:00Z", "2026-03-29T01:00:00Z")] // 02:30 is skipped: fires at 03:00 local
    [InlineData("0 30 1 * * ?", "2026-10-24T22:00:00Z", "2026-10-24T23:30:00Z", "2026-10-26T00:30:00Z")] // clocks go back: once that night
    public void Cron_at_a_change_of_clocks_fires_once(string cron, string after, params string[] fires)
    {
        var expression = new CronExpression(cron, TimeZoneInfo.FindSystemTimeZoneById("Europe/Oslo"));
        var at = DateTimeOffset.Parse(after, null);
        foreach (var fire in fires)
        {
            at = expression.GetNextValidTimeAfter(at)!.Value;
            Assert.Equal(DateTimeOffset.Parse(fire, null), at);
        }
    }

    private static ScheduleOptions Schedule(string name, TimeZoneInfo zone) => new(name, "0 0 7 * * ?", zone, "NZ", "measure", null);
}
