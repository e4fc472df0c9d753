using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

public sealed class GivenCovarianceTests
{
    [Fact]
    public void Given_entries_stand_for_both_orders()
    {
        var model = Calibrator.Calibrate(Two().Given("A", "A", 0.0004).Given("B", "A", 0.0003).Given("B", "B", 0.0009).Snapshot());

        Assert.Equal([Math.Sqrt(0.0004), Math.Sqrt(0.0009)], model.Deviations);
        Assert.Equal([0, 1], model.Moving);
        Assert.Equal(2, model.Rank);
        Assert.Equal([1, 0, 0.5, Math.Sqrt(0.75)], model.Lower, (a, b) => Math.Abs(a - b) < 1e-15);
        Assert.Equal((0, null, null), (model.Shocks, model.From, model.To));
        Assert.Equal([0.5 * -0.0004, 0.5 * -0.0009], model.DailyDrift, (a, b) => Math.Abs(a - b) < 1e-18);
        Assert.Equal([3.0, 4.0], model.Levels);
    }

    [Fact]
    public void Given_pair_twice_with_one_value_is_taken_once() =>
        Assert.Equal(2, Calibrator.Calibrate(Two().Given("A", "A", 1).Given("B", "A", 0.5).Given("A", "B", 0.5).Given("B", "B", 1).Snapshot()).Rank);

    [Fact]
    public void Given_pair_with_a_factor_that_never_moves_may_be_left_out()
    {
        var model = Calibrator.Calibrate(Two().Given("A", "A", 0).Given("B", "B", 0.01).Given("other", "B", 5).Snapshot());

        Assert.Equal([1], model.Moving);
        Assert.Equal([0.0, 0.1], model.Deviations);
    }

    [Theory]
    [InlineData("A A 1, B B 1", "A, B: The covariance is not given.")]
    [InlineData("A A 1, A B 0.5", "B, B: The variance is not given.")]
    [InlineData("A A 1, B B 1, A B 0.5, B A 0.4", "B, A: The covariance is given as 0.5 and as 0.4.")]
    [InlineData("A A -1, B B 1, A B 0.5", "A, A: The variance is -1; it must not be negative.")]
    [InlineData("A A 0, B B 1, A B 0.5", "A, B: The covariance is 0.5, but one of the two has no variance.")]
    [InlineData("A A 1, B B 1, A B NaN", "A, B: The covariance is NaN; it must be finite.")]
    public void Given_entries_that_are_no_covariance_are_refused(string entries, string message)
    {
        var market = Two();
        foreach (var entry in entries.Split(", "))
        {
            var fields = entry.Split(' ');
            market.Given(fields[0], fields[1], double.Parse(fields[2], System.Globalization.CultureInfo.InvariantCulture));
        }

        Assert.Equal(message, Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(market.Snapshot())).Message);
    }

    // 0.95, -0.8 and 0.9 contradict each other; the nearest matrix and its distance were computed to 1e-15 by two methods
    // (Newton on the dual, and alternating projections with Dykstra's correction; Higham 2002 states the problem).
    [Fact]
    public void Given_contradictory_correlations_are_repaired_and_the_distance_is_told()
    {
        var market = Two().Equity("C", [5]);
        market.Given("A", "A", 0.0001).Given("B", "B", 0.0004).Given("C", "C", 0.0009).Given("A", "B", 0.95 * 0.0002).Given("A", "C", -0.8 * 0.0003).Given("B", "C", 0.9 * 0.0006);

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(0.9414513940437607, model.RepairDistance!.Value, 1e-12);
        Assert.Equal(2, model.Rank);
        Assert.Equal(0.5520802606664883, model.Correlation(0, 1), 1e-12);
        Assert.Equal(-0.43209980331619535, model.Correlation(0, 2), 1e-12);
        Assert.Equal(0.5133804324633346, model.Correlation(1, 2), 1e-12);
        Assert.Equal([0.01, 0.02, 0.03], model.Deviations, (a, b) => Math.Abs(a - b) < 1e-17);
    }

    [Fact]
    public void Given_covariance_with_historical_drift_reads_the_shocks_for_the_drift_alone()
    {
        var market = new Market().Rate("R", [0, 0.01, 0.03]).Given("R", "R", 4);
        market.Model = market.Model with { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Historical };

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(0.015, model.DailyDrift[0], 1e-17);
        Assert.Equal(2.0, model.Deviations[0]);
        Assert.Equal(0, model.Shocks);
    }

    private static Market Two()
    {
        var market = new Market().Equity("A", [3]).Equity("B", [4]);
        market.Model = market.Model with { Covariance = CovarianceEstimator.Given };
        return market;
    }
}
