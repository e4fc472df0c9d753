using RiskWorker.Domain.Market;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

public sealed class AdjustedHistoryTests
{
    private static readonly ObservationHistory Six = ObservationHistory.From(["A", "B"],
        [.. Enumerable.Range(0, 6).SelectMany(i => new Observation[] { new(Market.Day(i), "A", 10 + i), new(Market.Day(i), "B", 20 + i) })]);

    [Fact]
    public void Values_before_each_adjustment_are_multiplied_and_ratios_compound()
    {
        var history = new AdjustedHistory(Six, [new("A", Market.Day(2), 0.5, "split"), new("A", Market.Day(4), 0.25, "split")], Market.Day(5));

        Assert.Equal([10 * 0.125, 11 * 0.125, 12 * 0.25, 13 * 0.25, 14, 15], history.Values("A"));
        Assert.Equal([20.0, 21, 22, 23, 24, 25], history.Values("B"));
    }

    [Fact]
    public void Values_are_those_known_at_the_close_of_the_date()
    {
        var adjustments = new Adjustment[] { new("A", Market.Day(3), 0.5, null), new("A", Market.Day(4), 0.1, null) };

        var history = new AdjustedHistory(Six, adjustments, Market.Day(3));

        Assert.Equal([5, 5.5, 6, 13], history.Values("A"));
        Assert.Equal(4, history.Dates.Length);
    }

    [Fact]
    public void Values_with_two_adjustments_of_one_date_do_not_depend_on_their_order()
    {
        var adjustments = new Adjustment[] { new("A", Market.Day(3), 1.1, null), new("A", Market.Day(3), 0.3, null), new("A", Market.Day(5), 0.7, null) };

        Assert.Equal(
            new AdjustedHistory(Six, adjustments, Market.Day(5)).Values("A"),
            new AdjustedHistory(Six, [.. adjustments.Reverse()], Market.Day(5)).Values("A"));
    }

    [Fact]
    public void Adjustment_between_two_observed_dates_applies_to_those_before_it()
    {
        var weekend = Market.Day(4).AddDays(1);

        Assert.Equal([20, 22, 24, 26, 28, 15], new AdjustedHistory(Six, [new("A", weekend, 2, null)], Market.Day(5)).Values("A"));
    }

    [Fact]
    public void Applied_lists_by_date_those_that_changed_a_value_from_the_given_date_on()
    {
        var history = new AdjustedHistory(Six, [new("A", Market.Day(4), 2, "late"), new("A", Market.Day(1), 3, "early"), new("B", Market.Day(2), 4, null)], Market.Day(5));

        Assert.Equal(["early", "late"], history.Applied("A", Market.Day(0)).Select(a => a.Reason));
        Assert.Equal(["late"], history.Applied("A", Market.Day(1)).Select(a => a.Reason));
        Assert.Empty(history.Applied("A", Market.Day(4)));
        Assert.Equal(new Domain.Runs.AppliedAdjustment("B", Market.Day(2), 4, null), Assert.Single(history.Applied("B", Market.Day(0))));
    }

    [Fact]
    public void Values_of_a_factor_without_observations_are_NaN() =>
        Assert.All(new AdjustedHistory(Six, [], Market.Day(5)).Values("C"), v => Assert.Equal(double.NaN, v));
}
