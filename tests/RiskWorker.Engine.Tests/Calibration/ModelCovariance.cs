using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Tests.Calibration;

/// <summary>What a calibrated model says about its factors, put together again by plain sums.</summary>
internal static class ModelCovariance
{
    /// <summary>Number of a factor in the model.</summary>
    public static int Number(this CalibratedModel model, string factor) =>
        model.Factors.Index().Single(f => f.Item.Name == factor).Index;

    /// <summary>Correlation of two moving factors: a row of L L'.</summary>
    public static double Correlation(this CalibratedModel model, int a, int b)
    {
        var (i, j) = (Array.IndexOf(model.Moving, a), Array.IndexOf(model.Moving, b));
        var sum = 0.0;
        for (var k = 0; k < model.Rank; k++) sum += model.Lower[(i * model.Rank) + k] * model.Lower[(j * model.Rank) + k];
        return sum;
    }

    /// <summary>Covariance of two moving factors, by name.</summary>
    public static double Covariance(this CalibratedModel model, string factor, string other)
    {
        var (a, b) = (model.Number(factor), model.Number(other));
        return model.Deviations[a] * model.Deviations[b] * model.Correlation(a, b);
    }
}
