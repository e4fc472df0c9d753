using RiskWorker.Engine.Pricing.Ageing;

namespace RiskWorker.Engine.Tests.Pricing.Ageing;

/// <summary>27 November 2026 is a Friday.</summary>
public sealed class HorizonDatesTests
{
    [Theory]
    [InlineData("2026-11-27", 1, "2026-11-30")]
    [InlineData("2026-11-27", 5, "2026-12-04")]
    [InlineData("2026-11-27", 10, "2026-12-11")]
    [InlineData("2026-11-28", 1, "2026-11-30")]
    [InlineData("2026-12-02", 3, "2026-12-07")]
    public void End_lies_so_many_weekdays_later(string asOf, int days, string end) => Assert.Equal(Date(end), new HorizonDates(Date(asOf), days).End);

    // A weekend sees the Friday before it: the close of the as-of date itself is day 0.
    [Theory]
    [InlineData("2026-11-27", 0)]
    [InlineData("2026-11-28", 0)]
    [InlineData("2026-11-30", 1)]
    [InlineData("2026-12-04", 5)]
    [InlineData("2026-12-06", 5)]
    [InlineData("2026-12-11", 10)]
    public void DayOf_counts_weekdays_and_gives_a_weekend_the_close_before(string date, int day) => Assert.Equal(day, new HorizonDates(Date("2026-11-27"), 10).DayOf(Date(date)));

    [Theory]
    [InlineData("2026-11-27", false)]
    [InlineData("2026-11-28", true)]
    [InlineData("2026-12-11", true)]
    [InlineData("2026-12-12", false)]
    public void Hold_leaves_the_as_of_date_out_and_takes_the_end_in(string date, bool holds) => Assert.Equal(holds, new HorizonDates(Date("2026-11-27"), 10).Hold(Date(date)));

    [Theory]
    [InlineData("2026-11-20", "2026-11-30", new[] { 1 })]
    [InlineData("2026-12-05", "2026-12-08", new[] { 6, 7 })]
    [InlineData("2026-11-27", "2026-11-29", new int[0])]
    public void DaysFrom_gives_the_closes_between_two_dates(string first, string last, int[] days) => Assert.Equal(days, new HorizonDates(Date("2026-11-27"), 10).DaysFrom(Date(first), Date(last)));

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "yyyy-MM-dd", System.Globalization.CultureInfo.InvariantCulture);
}
