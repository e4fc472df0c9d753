using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

public sealed class DriftTests
{
    [Fact]
    public void Zero_drift_keeps_the_expected_price_and_the_expected_rate()
    {
        var model = Calibrate(DriftKind.Zero);

        Assert.Equal([-(model.Deviations[0] * model.Deviations[0] / 2), 0], model.DailyDrift);
    }

    [Fact]
    public void Historical_drift_is_the_mean_shock()
    {
        var model = Calibrate(DriftKind.Historical);

        Assert.Equal(Math.Log(121.0 / 100) / 4, model.DailyDrift[0], 1e-16); // the logarithms telescope
        Assert.Equal(0.02 / 4, model.DailyDrift[1], 1e-17);
    }

    [Fact]
    public void Explicit_drift_is_the_arithmetic_growth_a_year_and_zero_where_it_is_left_out()
    {
        var model = Calibrate(DriftKind.Explicit, ("A", 0.126));
        Assert.Equal([0.0005 - (model.Deviations[0] * model.Deviations[0] / 2), 0], model.DailyDrift);

        Assert.Equal(0.01, Calibrate(DriftKind.Explicit, ("R", 2.52)).DailyDrift[1], 1e-17);
    }

    [Fact]
    public void Explicit_drift_of_an_unknown_factor_is_refused()
    {
        var fault = Assert.Throws<CalibrationException>(() => Calibrate(DriftKind.Explicit, ("X", 0.1)));

        Assert.Equal("X: The model 'lognormal' gives a drift for it, but it is not among the factors.", fault.Message);
    }

    private static CalibratedModel Calibrate(DriftKind drift, params (string Factor, double Yearly)[] drifts)
    {
        var market = new Market().Equity("A", [100, 103, 101, 110, 121]).Rate("R", [0.01, 0.02, 0.00, 0.01, 0.03]);
        market.Model = market.Model with { Drift = drift, Drifts = drifts.ToDictionary(d => d.Factor, d => d.Yearly) };
        return Calibrator.Calibrate(market.Snapshot());
    }
}
