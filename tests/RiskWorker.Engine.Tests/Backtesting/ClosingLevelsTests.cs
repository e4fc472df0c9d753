using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Tests.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Backtesting;

public sealed class ClosingLevelsTests
{
    [Fact]
    public void At_a_date_takes_the_newest_observation_on_an_open_day()
    {
        var levels = new ClosingLevels(new FridaySnapshot().Factor("A").Prices("A", 10, 11, double.NaN).Price("A", Friday.AddDays(-6), 99).Build());

        Assert.Equal([11], levels.At(Friday));
        Assert.Equal([10], levels.At(Friday.AddDays(-2)));
        Assert.True(double.IsNaN(levels.At(Friday.AddDays(-5))[0]));
    }

    [Fact]
    public void At_a_later_date_in_the_terms_of_an_earlier_one_undoes_a_split()
    {
        var levels = new ClosingLevels(new FridaySnapshot().Factor("A").Prices("A", 100, 26).Adjustment("A", Friday, 0.25).Build());

        Assert.Equal([26], levels.At(Friday));
        Assert.Equal([104], levels.At(Friday, basis: Friday.AddDays(-1)));
        Assert.Equal([100], levels.At(Friday.AddDays(-1)));
    }

    [Fact]
    public void At_the_as_of_date_equals_the_calibrated_levels_bit_for_bit()
    {
        // The last price stands before two adjustments of ratios that no binary fraction holds.
        var snapshot = new FridaySnapshot().Factor("A", calendar: "NYSE").Holiday("NYSE", Friday).Prices("A", [.. Wave(61), 77.7, double.NaN])
            .Adjustment("A", Friday, 0.3).Adjustment("A", Friday.AddDays(-1), 0.7).Adjustment("A", Friday, 1.1).Build();

        Assert.Equal(Calibrator.Calibrate(snapshot).Levels, new ClosingLevels(snapshot).At(Friday));
    }
}
