using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>The covariance of four stock indices against statistics from general-purpose libraries (Data/eustock/README.md), to 1e-10 of each entry.</summary>
public sealed class IndexCovarianceTests
{
    private const int Returns = 1859;

    [Theory]
    [InlineData(0.94, "ewma_0.94")]
    [InlineData(0.97, "ewma_0.97")]
    public void Ewma_over_all_returns_equals_the_recursion(double lambda, string key)
    {
        var model = Calibrate(new() { Covariance = CovarianceEstimator.Ewma, Lambda = lambda, Window = Returns });

        Assert.Equal(Returns, model.Shocks);
        AssertCovariance(IndexCloses.Matrix(key), (a, b) => model.Covariance(a, b));
    }

    [Fact]
    public void Equal_weights_and_the_historical_mean_give_the_covariance_about_the_mean()
    {
        var model = Calibrate(new() { Covariance = CovarianceEstimator.Equal, Drift = DriftKind.Historical, Window = Returns });
        double Mean(string factor) => model.DailyDrift[model.Number(factor)];

        var mean = IndexCloses.Vector("mean");
        for (var j = 0; j < mean.Length; j++) Close(mean[j], Mean(IndexCloses.Names[j]));
        AssertCovariance(IndexCloses.Matrix("covariance_divisor_n"), (a, b) => model.Covariance(a, b) - (Mean(a) * Mean(b)));
        AssertCovariance(IndexCloses.Matrix("covariance_divisor_n_less_1"), (a, b) => (model.Covariance(a, b) - (Mean(a) * Mean(b))) * Returns / (Returns - 1));
    }

    [Fact]
    public void Default_model_takes_the_newest_500_days_and_the_last_closes()
    {
        var model = Calibrate(new());

        Assert.Equal(500, model.Shocks);
        Assert.Equal(new DateOnly(1998, 8, 14), model.To);
        Assert.Equal(new DateOnly(1996, 9, 16), model.From); // 499 weekdays before
        Assert.Equal(4, model.Rank);
        Assert.Null(model.RepairDistance);
        Assert.Equal(["CAC", "DAX", "FTSE", "SMI"], model.Factors.Select(f => f.Name));
        Assert.Equal([3995, 5473.72, 5455, 7676.3], model.Levels);
        Assert.Empty(model.DroppedDays);
    }

    private static CalibratedModel Calibrate(ModelSettings model)
    {
        var market = IndexCloses.Market();
        market.Model = model;
        return Calibrator.Calibrate(market.Snapshot());
    }

    private static void AssertCovariance(double[][] expected, Func<string, string, double> covariance)
    {
        for (var i = 0; i < 4; i++)
        {
            for (var j = 0; j < 4; j++) Close(expected[i][j], covariance(IndexCloses.Names[i], IndexCloses.Names[j]));
        }
    }

    private static void Close(double expected, double actual) => Assert.InRange(actual / expected, 1 - 1e-10, 1 + 1e-10);
}
