using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>Shrunk and pairwise covariances through the calibration.</summary>
public sealed class CovarianceChoicesTests
{
    // Ledoit and Wolf (2004), zero mean, on the log-returns of the four indices each divided by its deviation: with S the correlation of T days,
    // delta = (mean of |x_t|^4 - |S|²)/(T |S - I|²). Worked out in NumPy from the closes; order DAX, SMI, CAC, FTSE.
    [Theory]
    [InlineData(1859, 0.007540376246530217, 0.6992426011445855, 0.6443573794280456, 0.010318687682681347)]
    [InlineData(60, 0.05611706956525046, 0.7794944353410531, 0.7643058308708034, 0.013211795170096428)]
    public void Shrunk_correlation_of_the_indices_is_that_of_Ledoit_and_Wolf(int window, double intensity, double daxSmi, double cacFtse, double dax)
    {
        var market = IndexCloses.Market();
        market.Model = new() { Covariance = CovarianceEstimator.Shrunk, Window = window };
        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(intensity, Assert.Single(model.Parameters, p => p.Name == "shrinkage of the correlation").Value, 1e-11);
        Assert.Equal(daxSmi, model.Correlation(model.Number("DAX"), model.Number("SMI")), 1e-11);
        Assert.Equal(cacFtse, model.Correlation(model.Number("CAC"), model.Number("FTSE")), 1e-11);
        Assert.Equal(1, model.Deviations[model.Number("DAX")] / dax, 1e-11);
    }

    [Theory]
    [InlineData(CovarianceEstimator.Equal)]
    [InlineData(CovarianceEstimator.Ewma)]
    public void Pairwise_equals_complete_to_the_bit_where_nothing_is_missing(CovarianceEstimator estimator)
    {
        var market = IndexCloses.Market();
        market.Model = new() { Covariance = estimator };
        var complete = Calibrator.Calibrate(market.Snapshot());
        market.Model = market.Model with { MissingDays = MissingDays.Pairwise };
        var pairwise = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(ModelBits.Hash(complete), ModelBits.Hash(pairwise));
        Assert.Equal((complete.Shocks, complete.From, complete.To), (pairwise.Shocks, pairwise.From, pairwise.To));
    }

    // A lacks the price of one day, so two shocks: complete days lose them for both, pairs of days only where A takes part.
    [Fact]
    public void Pairwise_uses_every_day_that_a_pair_has()
    {
        double[] a = [.. Market.Prices(101, 1).Select((p, t) => t == 40 ? double.NaN : p)], b = Market.Prices(101, 2);
        var market = new Market().Equity("A", a).Equity("B", b);
        var complete = Calibrator.Calibrate(market.Snapshot());
        market.Model = market.Model with { MissingDays = MissingDays.Pairwise };
        var pairwise = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal((98, 100), (complete.Shocks, pairwise.Shocks));
        Assert.Equal(98, Assert.Single(pairwise.Parameters).Value);
        Assert.Equal(MeanSquare(b), pairwise.Deviations[1] * pairwise.Deviations[1], 1e-16);
        Assert.Equal(complete.Deviations[0], pairwise.Deviations[0], 1e-15);
        Assert.NotEqual(complete.Deviations[1], pairwise.Deviations[1]);
    }

    // Pairs of three factors that meet in turn, two days each, with correlations 0.95, 0.9 and -0.8: no three variables have them. The nearest correlation matrix
    // lies 0.94145 away (computed by a semismooth Newton method and by alternating projections, which agree to 4e-16).
    [Fact]
    public void Pairwise_matrix_that_no_factors_can_have_is_repaired_and_the_distance_said()
    {
        var (low, none) = (0.01 * Math.Sqrt(2), double.NaN);
        double[] first = [low, 0];
        double[] With(double correlation) => [low * correlation, low * Math.Sqrt(1 - (correlation * correlation))];
        // Between blocks a day without any price: prices of a block are one more than its shocks.
        double[] Row(params double[]?[] blocks) => [.. blocks.SelectMany(shocks => shocks is null
            ? [none, none, none, none]
            : new[] { 100, 100 * Math.Exp(shocks[0]), 100 * Math.Exp(shocks[0] + shocks[1]), none })];
        var market = new Market { Model = new() { Covariance = CovarianceEstimator.Equal, MissingDays = MissingDays.Pairwise } };
        market.Equity("A", Row(first, null, first)).Equity("B", Row(With(0.95), first, null)).Equity("C", Row(null, With(0.9), With(-0.8)));

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(0.9414513940437607, model.RepairDistance!.Value, 1e-9);
        Assert.Equal(0.5520802606664883, model.Correlation(0, 1), 1e-9);
        Assert.Equal(-0.43209980331619535, model.Correlation(0, 2), 1e-9);
        Assert.Equal(0.5133804324633346, model.Correlation(1, 2), 1e-9);
        Assert.All(model.Deviations, d => Assert.Equal(0.01, d, 1e-14));
        Assert.Equal(6, model.Shocks);
    }

    [Fact]
    public void Pairwise_factors_without_a_common_day_are_refused()
    {
        var market = new Market { Model = new() { Covariance = CovarianceEstimator.Equal, MissingDays = MissingDays.Pairwise } };
        market.Equity("A", Market.Prices(20, 1)).Equity("B", Market.Prices(20, 2), first: 20);
        Assert.Equal("A: It has no day in common with B.", Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(market.Snapshot())).Message);
    }

    [Fact]
    public void Shrunk_covariance_of_paired_days_is_refused()
    {
        var market = new Market { Model = new() { Covariance = CovarianceEstimator.Shrunk, MissingDays = MissingDays.Pairwise } };
        market.Equity("A", Market.Prices(20, 1));
        Assert.Contains("complete days", Assert.Throws<CalibrationException>(() => Calibrator.Calibrate(market.Snapshot())).Message, StringComparison.Ordinal);
    }

    private static double MeanSquare(double[] prices) => Enumerable.Range(1, prices.Length - 1).Average(t => Math.Pow(Math.Log(prices[t] / prices[t - 1]), 2));
}
