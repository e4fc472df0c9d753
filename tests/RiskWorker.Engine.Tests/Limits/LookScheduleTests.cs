using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Limits;

namespace RiskWorker.Engine.Tests.Limits;

public sealed class LookScheduleTests
{
    private static LookSchedule Of(int scenarios, int cap, int looks, bool decides = true) =>
        new(new SimulationSettings { Scenarios = scenarios, Cap = cap, Looks = looks }, decides);

    // J = min(looks, 1 + floor(log2(cap/N0))).
    [Theory]
    [InlineData(100_000, 1_600_000, 5, 5)]
    [InlineData(100_000, 1_600_000, 3, 3)]
    [InlineData(100_000, 1_599_999, 5, 4)]
    [InlineData(100_000, 100_000, 5, 1)]
    [InlineData(100_000, 150_000, 5, 1)]
    [InlineData(1_000_000, 1_600_000, 5, 1)]
    public void Looks_are_bounded_by_the_setting_and_by_the_cap(int scenarios, int cap, int looks, int expected)
    {
        var schedule = Of(scenarios, cap, looks);
        Assert.Equal(expected, schedule.Scenarios.Count);
        Assert.Equal(1 - (0.05m / expected), schedule.Level);
        Assert.Equal(Enumerable.Range(0, expected).Select(j => scenarios << j), schedule.Scenarios);
    }

    [Fact]
    public void Run_that_decides_nothing_has_one_look_at_95_percent()
    {
        var schedule = Of(100_000, 1_600_000, 5, decides: false);
        Assert.Equal([100_000], schedule.Scenarios);
        Assert.Equal(0.95m, schedule.Level);
    }
}
