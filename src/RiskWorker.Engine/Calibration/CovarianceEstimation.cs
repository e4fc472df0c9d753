using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Engine.Calibration;

/// <summary>Zero-mean covariance of daily shocks: Σ_k w_k x_k x_k' / Σ_k w_k, k the lag in kept days. Sums run from the oldest day to the newest.</summary>
internal static class CovarianceEstimation
{
    /// <summary>The covariance that <paramref name="model"/> asks for.</summary>
    /// <param name="model">Estimator and decay; historical models take equal weights.</param>
    /// <param name="shocks">A row a factor, oldest day first.</param>
    /// <param name="factors">Rows.</param>
    /// <param name="isAroundMean">Whether moments are taken around the mean of the window instead of zero.</param>
    /// <param name="parameters">Where is noted what the estimator found besides.</param>
    public static double[] Of(ModelSettings model, double[] shocks, int factors, bool isAroundMean, List<ModelParameter> parameters)
    {
        var weights = Weights(model, shocks.Length / Math.Max(factors, 1));
        if (isAroundMean) shocks = Centred(shocks, factors, weights);
        return model.Covariance == CovarianceEstimator.Shrunk ? Shrunk(shocks, factors, parameters) : Weighted(shocks, factors, weights);
    }

    /// <summary>The same where days are missing, NaN: each pair of factors over the days that both have.</summary>
    /// <exception cref="CalibrationException">A pair has no day in common, or the estimator needs complete days.</exception>
    public static double[] Pairwise(ModelSettings model, ShockWindow window, int factors, IReadOnlyList<Domain.Market.Factor> names, List<ModelParameter> parameters)
    {
        if (model.Covariance == CovarianceEstimator.Shrunk) throw new CalibrationException(model.Name, "A shrunk covariance needs complete days; take 'missingDays: complete'.");
        var fewest = PairwiseCovariance.FewestDays(window.Shocks, factors);
        if (fewest.Days == 0) throw new CalibrationException(names[fewest.First].Name, $"It has no day in common with {names[fewest.Second].Name}.");
        parameters.Add(new("fewest days of a pair", fewest.Days, Note: $"{names[fewest.First].Name} and {names[fewest.Second].Name}"));
        return PairwiseCovariance.Of(window.Shocks, factors, Weights(model, window.Days.Count), 1).Matrix;
    }

    // By repeated multiplication from the newest day back.
    private static double[] Weights(ModelSettings model, int days)
    {
        var weights = new double[days];
        Array.Fill(weights, 1);
        if (model.Covariance != CovarianceEstimator.Ewma || model.Kind is ModelKind.Historical or ModelKind.FilteredHistorical) return weights;
        for (var k = days - 2; k >= 0; k--) weights[k] = weights[k + 1] * model.Lambda;
        return weights;
    }

    // By weights, too: with them the covariance is Σ w (x - m)(x - m)' / Σ w.
    private static double[] Centred(double[] shocks, int factors, double[] weights)
    {
        var centred = new double[shocks.Length];
        var total = weights.Sum();
        for (var j = 0; j < factors; j++)
        {
            var (from, mean) = (j * weights.Length, 0.0);
            for (var t = 0; t < weights.Length; t++) mean = Math.FusedMultiplyAdd(weights[t], shocks[from + t], mean);
            mean /= total;
            for (var t = 0; t < weights.Length; t++) centred[from + t] = shocks[from + t] - mean;
        }
        return centred;
    }

    private static double[] Weighted(double[] shocks, int factors, double[] weights)
    {
        var covariance = WeightedGram.Of(shocks, factors, weights);
        var total = 0.0;
        foreach (var weight in weights) total += weight;
        for (var i = 0; i < covariance.Length; i++) covariance[i] /= total;
        return covariance;
    }

    private static double[] Shrunk(double[] shocks, int factors, List<ModelParameter> parameters)
    {
        if (!Array.Exists(shocks, shock => shock != 0)) return new double[factors * factors]; // nothing moves, so nothing can be shrunk
        var shrunk = LedoitWolf.Correlation(shocks, factors);
        parameters.Add(new("shrinkage of the correlation", shrunk.Intensity, Note: "weight of independence (Ledoit and Wolf 2004)"));
        var covariance = new double[factors * factors];
        for (var i = 0; i < factors; i++)
        {
            for (var j = 0; j < factors; j++) covariance[(i * factors) + j] = shrunk.Matrix[(i * factors) + j] * (shrunk.Deviations[i] * shrunk.Deviations[j]);
        }
        return covariance;
    }
}
