using RiskWorker.Domain.Instruments;

namespace RiskWorker.Domain.Tests.Instruments;

public sealed class PaymentScheduleTests
{
    private static IEnumerable<DateOnly> Ends(DateOnly issue, DateOnly maturity, int frequency) => PaymentSchedule.Of(issue, maturity, frequency).Select(p => p.End);

    [Fact]
    public void Of_whole_periods_joins_them_from_issue_to_maturity()
    {
        var periods = PaymentSchedule.Of(new(2025, 10, 15), new(2027, 4, 15), 2);
        Assert.Equal([new(new(2025, 10, 15), new(2026, 4, 15), new(2025, 10, 15)), new(new(2026, 4, 15), new(2026, 10, 15), new(2026, 4, 15)), new(new(2026, 10, 15), new(2027, 4, 15), new(2026, 10, 15))], periods);
        Assert.All(periods, p => Assert.True(p.IsRegular));
    }

    [Fact]
    public void Of_an_odd_life_leaves_a_short_first_period()
    {
        var periods = PaymentSchedule.Of(new(2025, 12, 1), new(2027, 4, 15), 4);
        Assert.Equal(new(new(2025, 12, 1), new(2026, 1, 15), new(2025, 10, 15)), periods[0]);
        Assert.False(periods[0].IsRegular);
        Assert.All(periods[1..], p => Assert.True(p.IsRegular));
        Assert.Equal(6, periods.Length);
    }

    // Each date from maturity: after the short February the 31st comes back.
    [Fact]
    public void Of_a_maturity_on_the_31st_returns_to_it_after_shorter_months()
    {
        Assert.Equal([new(2023, 8, 31), new(2024, 2, 29), new(2024, 8, 31), new(2025, 2, 28), new(2025, 8, 31)], Ends(new(2023, 2, 28), new(2025, 8, 31), 2));
        Assert.Equal([new(2024, 1, 31), new(2024, 2, 29), new(2024, 3, 31), new(2024, 4, 30), new(2024, 5, 31)], Ends(new(2023, 12, 31), new(2024, 5, 31), 12));
    }

    [Fact]
    public void Of_a_maturity_at_the_end_of_a_shorter_month_keeps_its_day()
    {
        Assert.Equal([new(2024, 12, 30), new(2025, 6, 30)], Ends(new(2024, 6, 30), new(2025, 6, 30), 2));
        Assert.Equal([new(2021, 2, 28), new(2022, 2, 28), new(2023, 2, 28), new(2024, 2, 29)], Ends(new(2020, 2, 29), new(2024, 2, 29), 1));
    }

    // The issue on 28 February is where the rolled date falls: no stub of no days.
    [Fact]
    public void Of_an_issue_on_a_rolled_date_starts_with_a_whole_period() =>
        Assert.Equal(new(new(2023, 2, 28), new(2023, 8, 31), new(2023, 2, 28)), PaymentSchedule.Of(new(2023, 2, 28), new(2024, 8, 31), 2)[0]);

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(4)]
    [InlineData(12)]
    public void Of_any_dates_covers_the_life_without_gap(int frequency)
    {
        for (var day = 0; day < 800; day += 7)
        {
            var (issue, maturity) = (new DateOnly(2019, 1, 31).AddDays(day), new DateOnly(2024, 1, 29).AddDays(day / 3));
            var periods = PaymentSchedule.Of(issue, maturity, frequency);
            Assert.Equal((issue, maturity), (periods[0].Start, periods[^1].End));
            for (var i = 1; i < periods.Length; i++) Assert.Equal(periods[i - 1].End, periods[i].Start);
            Assert.All(periods, p => Assert.True(p.Start < p.End && p.RegularStart <= p.Start));
            Assert.All(periods[1..], p => Assert.True(p.IsRegular));
        }
    }

    [Fact]
    public void Of_frequency_0_has_no_period() => Assert.Empty(PaymentSchedule.Of(new(2020, 1, 1), new(2030, 1, 1), 0));

    [Fact]
    public void Of_bad_arguments_is_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => PaymentSchedule.Of(new(2020, 1, 1), new(2020, 1, 1), 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => PaymentSchedule.Of(new(1899, 12, 31), new(2020, 1, 1), 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => PaymentSchedule.Of(new(2020, 1, 1), new(2021, 1, 1), 3));
    }
}
