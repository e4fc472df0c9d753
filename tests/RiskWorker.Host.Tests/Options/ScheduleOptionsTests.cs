using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class ScheduleOptionsTests
{
    [Theory]
    [InlineData("2026-11-27T05:30:00Z", "07:30", "2026-11-27T06:30:00Z")] // winter: 06:30 local
    [InlineData("2026-06-26T04:30:00Z", "07:30", "2026-06-26T05:30:00Z")] // summer
    [InlineData("2026-11-27T22:00:00Z", "07:30", "2026-11-28T06:30:00Z")] // due in the evening: the next morning
    [InlineData("2026-03-28T22:00:00Z", "02:30", "2026-03-29T01:30:00Z")] // 02:30 does not exist on that day: 03:30
    public void DeadlineAfter_due_time_is_the_next_such_time_in_the_zone(string due, string deadline, string expected)
    {
        var schedule = new ScheduleOptions("x", "0 0 0 * * ?", TimeZoneInfo.FindSystemTimeZoneById("Europe/Oslo"), null, "measure", TimeOnly.Parse(deadline, null));
        Assert.Equal(DateTimeOffset.Parse(expected, null), schedule.DeadlineAfter(DateTimeOffset.Parse(due, null)));
    }

    [Fact]
    public void DeadlineAfter_without_deadline_is_null() =>
        Assert.Null(new ScheduleOptions("x", "0 0 0 * * ?", TimeZoneInfo.Utc, null, "measure", null).DeadlineAfter(DateTimeOffset.UnixEpoch));
}
