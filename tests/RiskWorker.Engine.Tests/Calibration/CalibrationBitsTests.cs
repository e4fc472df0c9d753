using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>
/// The bits of calibrations, the same on any hardware. A hash here may change only together with the numerics epoch.
/// </summary>
public sealed class CalibrationBitsTests
{
    [Theory]
    [InlineData(CovarianceEstimator.Ewma, DriftKind.Zero, "c3df5b6e09dbe568fe4d01bd408bdaa595b1151a101733856bcd36ced96b095c")]
    [InlineData(CovarianceEstimator.Equal, DriftKind.Historical, "1642d5b78af0017e639a8839c54fb565f61e768b6b04bc0474ad660d1385afc9")]
    public void Bits_of_the_index_model_are_pinned(CovarianceEstimator covariance, DriftKind drift, string expected)
    {
        var market = IndexCloses.Market();
        market.Model = new() { Covariance = covariance, Drift = drift };

        Assert.Equal(expected, ModelBits.Hash(Calibrator.Calibrate(market.Snapshot())));
    }

    [Fact]
    public void Bits_of_a_singular_model_with_gaps_are_pinned()
    {
        var market = new Market();
        for (var j = 0; j < 67; j++) market.Equity($"F{j:00}", Market.Prices(61, j).Select((price, t) => t == 10 && j == 3 ? double.NaN : price));

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.Equal(58, model.Rank);
        Assert.Equal("f797ef64ec26358516e4ddf75fd7efd876c56cb92fb13e342fa919b4d5d7289c", ModelBits.Hash(model));
    }

    [Fact]
    public void Bits_of_a_repaired_model_are_pinned()
    {
        var market = new Market { Model = new() { Covariance = CovarianceEstimator.Given } };
        var random = new Random(1);
        for (var i = 0; i < 30; i++)
        {
            market.Equity($"F{i:00}", [100 + i]);
            for (var j = 0; j < i; j++) market.Given($"F{i:00}", $"F{j:00}", 0.0001 * ((1.8 * random.NextDouble()) - 0.9));
            market.Given($"F{i:00}", $"F{i:00}", 0.0001);
        }

        var model = Calibrator.Calibrate(market.Snapshot());

        Assert.NotNull(model.RepairDistance);
        Assert.Equal("248091512fca3c3c2069c4c8988d4da28a25eafee73f34f19a5d0a6af75511f6", ModelBits.Hash(model));
    }
}
