using RiskWorker.Domain.Market;
using RiskWorker.Host.Jobs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Jobs;

public sealed class ScheduleChecksTests
{
    private static readonly DateTimeOffset s_now = DateTimeOffset.Parse("2026-11-27T12:00:00Z", null);

    [Fact]
    public void Faults_no_schedule_is_one() =>
        Assert.Equal("schedules: found none, expected at least one schedule, since the service runs by nothing else", Assert.Single(ScheduleChecks.Faults([], [], s_now)).ToString());

    [Fact]
    public void Faults_unknown_calendar_and_past_cron_come_together()
    {
        ScheduleOptions[] schedules = [new("a", "0 0 7 * * ?", TimeZoneInfo.Utc, "OSL", "measure", null), new("b", "0 0 7 1 1 ? 2020", TimeZoneInfo.Utc, null, "measure", null)];
        Assert.Equal(
            ["schedules.a.calendar: found 'OSL', expected a calendar of holidays.csv: LONDON, OSLO", "schedules.b.cron: found '0 0 7 1 1 ? 2020', which lies in the past for good, expected an expression that still comes due"],
            ScheduleChecks.Faults(schedules, [new Holiday("OSLO", new(2026, 12, 25)), new Holiday("LONDON", new(2026, 12, 25))], s_now).Select(f => f.ToString()));
    }

    [Fact]
    public void Faults_calendar_that_the_feed_has_is_none() =>
        Assert.Empty(ScheduleChecks.Faults([new("a", "0 0 7 * * ?", TimeZoneInfo.Utc, "OSLO", "measure", null)], [new Holiday("OSLO", new(2026, 12, 25))], s_now));
}
