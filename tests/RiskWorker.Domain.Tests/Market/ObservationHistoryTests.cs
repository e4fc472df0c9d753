using RiskWorker.Domain.Market;

namespace RiskWorker.Domain.Tests.Market;

public sealed class ObservationHistoryTests
{
    private static readonly DateOnly s_first = new(2026, 11, 2);

    private static DateOnly Day(int i) => s_first.AddDays(i);

    private static readonly ObservationHistory s_history = ObservationHistory.From(["b", "B", "a"],
        [new(Day(3), "a", 4), new(Day(0), "a", 1), new(Day(2), "B", 30), new(Day(2), "x", 99), new(Day(0), "B", 10), new(Day(0), "a", 1.5)]);

    [Fact]
    public void From_lays_dates_ascending_and_factors_in_ordinal_order()
    {
        Assert.Equal(["B", "a", "b"], s_history.Factors);
        Assert.Equal([Day(0), Day(2), Day(3)], s_history.Dates.ToArray());
        Assert.Equal([10, 30, double.NaN], s_history.Column(0).ToArray());
    }

    [Fact]
    public void From_two_values_of_one_date_keeps_the_later_in_the_sequence() => Assert.Equal([1.5, double.NaN, 4], s_history.Column(1).ToArray());

    [Fact]
    public void From_factor_without_observations_has_a_column_of_NaN() => Assert.All(s_history.Column(2).ToArray(), value => Assert.Equal(double.NaN, value));

    [Fact]
    public void ColumnOf_finds_every_factor_and_no_other()
    {
        for (var j = 0; j < 3; j++) Assert.Equal(j, s_history.ColumnOf(s_history.Factors[j]));
        foreach (var name in new[] { "x", "A", "", "aa" }) Assert.True(s_history.ColumnOf(name) < 0, name);
    }

    [Fact]
    public void IndexOf_a_date_without_row_is_the_complement_of_its_place()
    {
        Assert.Equal(1, s_history.IndexOf(Day(2)));
        Assert.Equal(~1, s_history.IndexOf(Day(1)));
        Assert.Equal(~3, s_history.IndexOf(Day(9)));
    }

    [Theory]
    [InlineData(-1, 0)]
    [InlineData(0, 1)]
    [InlineData(1, 1)]
    [InlineData(2, 2)]
    [InlineData(9, 3)]
    public void UpTo_holds_no_later_date(int day, int count)
    {
        var cut = s_history.UpTo(Day(day));
        Assert.Equal(count, cut.Count);
        Assert.Equal(s_history.Dates[..count].ToArray(), cut.Dates.ToArray());
        Assert.Equal(count, cut.Column(1).Length);
        // A later date is unknown to the cut table, though the longer one knows it.
        Assert.Equal(count < 3, cut.IndexOf(Day(3)) < 0);
    }
}
