using RiskWorker.Engine.Calibration;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Tests.Calibration;

public sealed class ShockTableTests
{
    private const double None = double.NaN;

    [Fact]
    public void Shocks_are_the_logarithm_of_the_quotient_or_the_difference()
    {
        var table = Table(new Market().Equity("A", [100, 105, 99]).Rate("R", [0.02, -0.01, 0.03]));

        Assert.Equal([None, Logarithm.Of(105.0 / 100), Logarithm.Of(99.0 / 105)], table.Shocks(0).ToArray());
        Assert.Equal([None, -0.01 - 0.02, 0.03 - -0.01], table.Shocks(1).ToArray());
        Assert.Equal(Math.Log(1.05), table.Shocks(0)[1], 1e-16);
    }

    [Fact]
    public void Shocks_bridge_a_weekend()
    {
        var table = Table(new Market().Equity("A", [100, 101, 102, 103, 104, 105]));

        Assert.Equal(DayOfWeek.Monday, table.Dates[5].DayOfWeek);
        Assert.Equal(Logarithm.Of(105.0 / 104), table.Shocks(0)[5]);
    }

    [Fact]
    public void Missing_day_costs_its_own_shock_and_the_next()
    {
        var table = Table(new Market().Equity("A", [100, 101, None, 103, 104]).Equity("B", [1, 1, 1, 1, 1]));

        Assert.Equal([None, Logarithm.Of(1.01), None, None, Logarithm.Of(104.0 / 103)], table.Shocks(0).ToArray());
        Assert.Equal([None, 0, 0, 0, 0], table.Shocks(1).ToArray());
        Assert.Equal(2, table.OwnCount(0));
        Assert.Equal(4, table.OwnCount(1));
    }

    [Fact]
    public void Day_that_the_whole_table_lacks_is_not_bridged()
    {
        var market = new Market().Equity("A", [100, 101, None, 103]);

        Assert.Equal([None, Logarithm.Of(1.01), None], Table(market).Shocks(0).ToArray());
    }

    [Fact]
    public void Closed_day_is_bridged_and_an_observation_on_it_left_out_and_counted()
    {
        var market = new Market().Equity("A", [100, 101, 500, 103], calendar: "X").Equity("B", [1, 1, 1, 1]);
        market.Holidays.Add(new("X", Market.Day(2)));
        market.Observations.Add(new(Market.Day(4).AddDays(1), "B", 7)); // a Saturday

        var table = Table(market);

        Assert.Equal([None, Logarithm.Of(1.01), None, Logarithm.Of(103.0 / 101), None], table.Shocks(0).ToArray());
        Assert.Equal(None, table.Values(0)[2]);
        Assert.Equal([1, 1], [table.ClosedDayObservations(0), table.ClosedDayObservations(1)]);
        Assert.Equal(0, table.Shocks(1)[3]);
        Assert.Equal((false, true), (table.IsOpen(0, 2), table.IsOpen(1, 2)));
        Assert.Equal((1, 2), (table.Previous(0, 3), table.Previous(1, 3)));
        Assert.Equal((3, 3), (table.LastObserved(0), table.LastObserved(1)));
    }

    [Fact]
    public void Calendar_without_holidays_has_every_weekday()
    {
        var table = Table(new Market().Equity("A", [1, 2, 4], calendar: "unknown"));

        Assert.Equal(2, table.OwnCount(0));
    }

    [Fact]
    public void Price_that_is_not_positive_has_no_lognormal_shock_on_either_side()
    {
        var table = Table(new Market().Equity("A", [100, 0, 102, 103, -1, 105]));

        Assert.Equal([None, None, None, Logarithm.Of(103.0 / 102), None, None], table.Shocks(0).ToArray());
        Assert.Equal(-1, table.Values(0)[4]);
    }

    [Fact]
    public void Split_leaves_no_shock_behind()
    {
        var market = new Market().Equity("A", [100, 100, 50, 50]);
        market.Adjustments.Add(new("A", Market.Day(2), 0.5, "2 for 1"));

        Assert.Equal([None, 0, 0, 0], Table(market).Shocks(0).ToArray());
    }

    [Fact]
    public void Proxy_stands_in_before_the_first_own_shock_and_not_after()
    {
        var market = new Market().Equity("P", [100, 102, 99, 101, 104, 107]).Equity("A", [10, 11, None, 12], first: 2, proxy: "P", beta: 0.5);

        var table = Table(market);

        var (a, p) = (table.Shocks(0).ToArray(), table.Shocks(1).ToArray());
        Assert.Equal([None, 0.5 * p[1], 0.5 * p[2], Logarithm.Of(1.1), None, None], a);
        Assert.Equal(3, table.FirstOwn(0));
        Assert.Equal(1, table.OwnCount(0));
    }

    [Fact]
    public void Proxies_of_each_other_fill_with_own_shocks_only()
    {
        var market = new Market()
            .Equity("A", [10, 11, 12], first: 2, proxy: "B", beta: 2)
            .Equity("B", [10, 11, 12, 13, 14], proxy: "C", beta: 3)
            .Equity("C", [5, 6], first: 0, proxy: "A", beta: 1);

        var table = Table(market);

        Assert.Equal(2 * table.Shocks(1)[1], table.Shocks(0)[1]);
        Assert.Equal(None, table.Shocks(2)[2]);
        Assert.Equal(None, table.Shocks(1)[0]);
    }

    [Fact]
    public void Factor_without_a_shock_of_its_own_takes_all_from_its_proxy()
    {
        var market = new Market().Equity("P", [100, 102, 99]).Equity("A", [10], first: 2, proxy: "P", beta: -1);

        var table = Table(market);

        Assert.Equal(3, table.FirstOwn(0));
        Assert.Equal([None, -table.Shocks(1)[1], -table.Shocks(1)[2]], table.Shocks(0).ToArray());
    }

    private static ShockTable Table(Market market) => ShockTable.From(market.Snapshot());
}
