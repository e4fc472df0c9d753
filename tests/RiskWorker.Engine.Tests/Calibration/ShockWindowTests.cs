using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

public sealed class ShockWindowTests
{
    [Fact]
    public void Newest_takes_complete_days_only_and_names_what_it_dropped()
    {
        var market = new Market()
            .Equity("A", [1, 2, 3, double.NaN, 5, 6, 7, 8, double.NaN])
            .Equity("B", [1, 2, 3, 4, 5, double.NaN, 7, 8, 9]);

        var window = Newest(market, 3);

        Assert.Equal([Market.Day(1), Market.Day(2), Market.Day(7)], window.Days);
        Assert.Equal([Market.Day(3), Market.Day(4), Market.Day(5), Market.Day(6), Market.Day(8)], window.Dropped);
        Assert.Equal([new DropCause("A", 3), new DropCause("B", 2)], window.DropCauses);
        Assert.Equal(3, window.Row(1).Length);
        Assert.Equal(ShockTable.From(market.Snapshot()).Shocks(1)[7], window.Row(1)[2]);
    }

    [Fact]
    public void Newest_counts_nothing_dropped_before_its_first_day()
    {
        var market = new Market().Equity("A", [1, 2, 3, 4, 5, 6, 7]).Equity("B", [1, 2, 3, 4], first: 3);

        var window = Newest(market, 100);

        Assert.Equal([Market.Day(4), Market.Day(5), Market.Day(6)], window.Days);
        Assert.Empty(window.Dropped);
        Assert.Empty(window.DropCauses);
    }

    [Fact]
    public void Newest_passes_over_dates_on_which_no_market_was_open()
    {
        var market = new Market().Equity("A", [1, 2, 3, 4, 5, 6]);
        market.Observations.Add(new(Market.Day(4).AddDays(1), "A", 9));

        var window = Newest(market, 100);

        Assert.Equal(5, window.Days.Count);
        Assert.Empty(window.Dropped);
    }

    [Fact]
    public void Newest_drops_the_holiday_of_one_market_and_keeps_the_day_after()
    {
        var market = new Market().Equity("A", [1, 2, double.NaN, 4, 5], calendar: "X").Equity("B", [1, 2, 3, 4, 5]);
        market.Holidays.Add(new("X", Market.Day(2)));

        var window = Newest(market, 100);

        Assert.Equal([Market.Day(1), Market.Day(3), Market.Day(4)], window.Days);
        Assert.Equal([Market.Day(2)], window.Dropped);
        Assert.Equal([new DropCause("A", 1)], window.DropCauses);
    }

    [Fact]
    public void Newest_names_ten_factors_at_most()
    {
        var market = new Market().Equity("full", [1, 2, 3, 4, 5]);
        for (var j = 10; j < 30; j++) market.Equity($"F{j}", [1, 2, double.NaN, 4, 5]);

        var window = Newest(market, 100);

        Assert.Equal(Enumerable.Range(10, 10).Select(j => new DropCause($"F{j}", 2)), window.DropCauses);
    }

    [Fact]
    public void Newest_counts_the_days_that_a_proxy_fills()
    {
        var market = new Market().Equity("P", [1, 2, 3, 4, 5, 6]).Equity("A", [1, 2, 3], first: 3, proxy: "P", beta: 1);

        Assert.Equal([3, 0], Newest(market, 100).Filled);
        Assert.Equal([1, 0], Newest(market, 3).Filled);
    }

    [Fact]
    public void Newest_without_a_complete_day_says_so()
    {
        var market = new Market().Equity("A", [1, 2]).Equity("B", [1, 2], first: 2);

        var fault = Assert.Throws<CalibrationException>(() => Newest(market, 100));

        Assert.Equal("observations: There is no day on which every factor has a shock.", fault.Message);
    }

    private static ShockWindow Newest(Market market, int window) => ShockWindow.Newest(ShockTable.From(market.Snapshot()), window);
}
