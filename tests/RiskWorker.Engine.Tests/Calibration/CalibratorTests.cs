using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

public sealed class CalibratorTests
{
    [Fact]
    public void Equal_weights_over_two_days_give_figures_worked_by_hand()
    {
        var model = Calibrator.Calibrate(new Market().Rate("R", [0, 3, -1]).Rate("S", [0, 1, 3]).Snapshot());

        Assert.Equal([Math.Sqrt(12.5), Math.Sqrt(2.5)], model.Deviations); // (9 + 16)/2, (1 + 4)/2
        Assert.Equal(((3 * 1) + (-4 * 2)) / 2.0, model.Covariance("R", "S"), 1e-14);
        Assert.Equal((2, Market.Day(1), Market.Day(2)), (model.Shocks, model.From!.Value, model.To!.Value));
    }

    [Fact]
    public void Ewma_weights_count_kept_days_and_are_normalised_over_the_window()
    {
        var market = new Market().Rate("R", [0, 8, double.NaN, 1, 3, 2]).Rate("S", [0, 8, 9, 1, 3, 2]);
        market.Model = new() { Covariance = CovarianceEstimator.Ewma, Lambda = 0.5, Window = 3 };

        var model = Calibrator.Calibrate(market.Snapshot());

        // Kept shocks of R, newest first: -1, 2, then 8 of the day before the gap; weights 4/7, 2/7, 1/7.
        Assert.Equal(Math.Sqrt(((4 * 1) + (2 * 4) + (1 * 64)) / 7.0), model.Deviations[0], 1e-15);
        Assert.Equal(2, model.DroppedDays.Count);
        Assert.Equal([new DropCause("R", 2)], model.DropCauses);
    }

    [Fact]
    public void Factor_that_never_moves_stands_apart()
    {
        var model = Calibrator.Calibrate(new Market().Equity("A", Market.Prices(50, 1)).Equity("B", Enumerable.Repeat(7.0, 50)).Equity("C", Market.Prices(50, 2)).Snapshot());

        Assert.Equal([0, 2], model.Moving.Order());
        Assert.Equal(0.0, model.Deviations[1]);
        Assert.Equal(0.0, model.DailyDrift[1]);
        Assert.Equal(2, model.Rank);
        Assert.Equal(4, model.Lower.Length);
    }

    [Fact]
    public void Factors_of_which_none_moves_need_no_normals()
    {
        var model = Calibrator.Calibrate(new Market().Equity("A", [7, 7, 7]).Snapshot());

        Assert.Empty(model.Moving);
        Assert.Equal(0, model.Rank);
        Assert.Empty(model.Lower);
    }

    [Fact]
    public void Two_that_always_move_together_share_one_normal()
    {
        var prices = Market.Prices(200, 3);
        var market = new Market().Equity("A", prices).Equity("B", prices.Select(p => 4 * p)).Equity("C", Market.Prices(200, 4));

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(2, model.Rank);
        Assert.Equal([0, 2, 1], model.Moving);
        Assert.Equal(model.Lower[..2], model.Lower[4..]); // the last row equals the first
        Assert.Null(model.RepairDistance);
    }

    [Fact]
    public void More_factors_than_days_have_the_rank_of_the_days_and_no_repair()
    {
        var market = new Market();
        for (var j = 0; j < 500; j++) market.Equity($"F{j:000}", Market.Prices(301, j));

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(300, model.Shocks);
        Assert.Equal(300, model.Rank);
        Assert.Null(model.RepairDistance);
        var table = ShockTable.From(market.Snapshot());
        for (var i = 0; i < 500; i += 7)
        {
            for (var j = 0; j <= i; j += 3) Assert.Equal(SampleCorrelation(table.Shocks(i)[1..], table.Shocks(j)[1..]), model.Correlation(i, j), 1e-12);
        }
    }

    [Fact]
    public void Level_is_the_last_adjusted_observation_on_an_open_day()
    {
        var market = new Market().Equity("A", [100, 101, 102, 50], calendar: "X").Equity("B", [1, 2, 3, 4]);
        market.Holidays.Add(new("X", Market.Day(3)));
        market.Adjustments.Add(new("A", Market.Day(3), 0.5, "split on a holiday"));

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal([51.0, 4.0], model.Levels);
        Assert.Equal([Market.Day(2), Market.Day(3)], model.LevelDates);
        Assert.Equal(1, model.ClosedDayObservations);
        Assert.Equal([new AppliedAdjustment("A", Market.Day(3), 0.5, "split on a holiday")], model.Adjustments);
    }

    [Fact]
    public void Adjustments_before_the_values_used_are_not_listed()
    {
        var market = new Market().Equity("A", Market.Prices(10, 1)).Equity("B", Market.Prices(10, 2));
        market.Model = market.Model with { Window = 3 }; // shocks of days 7, 8, 9 from values of days 6 to 9
        market.Adjustments.AddRange([new("B", Market.Day(7), 2, "base"), new("B", Market.Day(6), 2, "too old"), new("A", Market.Day(9), 2, "today")]);

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(["today", "base"], model.Adjustments.Select(a => a.Reason));
    }

    [Fact]
    public void Proxies_are_listed_with_their_share_of_the_window()
    {
        var market = new Market().Equity("P", Market.Prices(21, 1)).Equity("A", Market.Prices(6, 2), first: 15, proxy: "P", beta: 0.8);

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal([new UsedProxy("A", "P", 0.8, 15, 0.75)], model.Proxies);
        Assert.Equal(20, model.Shocks);
    }

    [Fact]
    public void Proxy_that_the_window_does_not_need_is_not_listed()
    {
        var market = new Market().Equity("P", Market.Prices(21, 1)).Equity("A", Market.Prices(6, 2), first: 15, proxy: "P", beta: 0.8);
        market.Model = market.Model with { Window = 5 };

        Assert.Empty(Calibrator.Calibrate(market.Snapshot()).Proxies);
    }

    [Fact]
    public void Factor_without_an_observation_is_named()
    {
        var market = new Market().Equity("A", Market.Prices(10, 1)).Equity("B", [], proxy: "A", beta: 1);

        Assert.Equal("B: It has no observation on an open day of its calendar.", Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(market.Snapshot())).Message);
    }

    [Fact]
    public void Price_that_is_not_positive_is_named_where_the_window_reads_it()
    {
        var prices = Market.Prices(10, 1);
        prices[4] = -2;
        var market = new Market().Equity("A", prices);

        market.Model = market.Model with { Window = 4 }; // days 6 to 9
        Assert.Equal(4, Calibrator.Calibrate(market.Snapshot()).Shocks);

        market.Model = market.Model with { Window = 5 };
        Assert.Equal("A: Its value on 2024-01-05 is -2; a factor with lognormal shocks must be positive.",
            Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(market.Snapshot())).Message);
    }

    [Fact]
    public void Later_observations_and_the_order_of_rows_change_nothing()
    {
        var market = new Market().Equity("A", Market.Prices(60, 1)).Equity("B", Market.Prices(60, 2));
        var full = Calibrator.Calibrate(market.Snapshot(Market.Day(49)));

        market.Observations.RemoveAll(o => o.Date > Market.Day(49));
        market.Observations.Reverse();
        var cut = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(ModelBits.Hash(full), ModelBits.Hash(cut));
        Assert.Equal(Market.Day(49), full.To);
    }

    [Fact]
    public void No_factors_give_an_empty_model()
    {
        var model = Calibrator.Calibrate(new Market().Snapshot(Market.Monday));

        Assert.Empty(model.Levels);
        Assert.Equal(0, model.Rank);
    }

    private static double SampleCorrelation(ReadOnlySpan<double> x, ReadOnlySpan<double> y)
    {
        var (xy, xx, yy) = (0.0, 0.0, 0.0);
        for (var t = 0; t < x.Length; t++) (xy, xx, yy) = (xy + (x[t] * y[t]), xx + (x[t] * x[t]), yy + (y[t] * y[t]));
        return xy / Math.Sqrt(xx * yy);
    }
}
