using RiskWorker.Numerics.LinearAlgebra;

namespace RiskWorker.Engine.Calibration;

/// <summary>Zero-mean covariance of daily shocks: Σ_k w_k x_k x_k' / Σ_k w_k, k the lag in kept days. Sums run from the oldest day to the newest.</summary>
internal static class CovarianceEstimation
{
    /// <summary>Exponential weights: w_k = lambda^k, by repeated multiplication.</summary>
    public static double[] Ewma(ShockWindow window, int factors, double lambda)
    {
        var weights = new double[window.Days.Count];
        weights[^1] = 1;
        for (var k = weights.Length - 2; k >= 0; k--) weights[k] = weights[k + 1] * lambda;
        return Weighted(window, factors, weights);
    }

    /// <summary>Equal weights: divisor n.</summary>
    public static double[] Equal(ShockWindow window, int factors)
    {
        var weights = new double[window.Days.Count];
        Array.Fill(weights, 1);
        return Weighted(window, factors, weights);
    }

    private static double[] Weighted(ShockWindow window, int factors, double[] weights)
    {
        var covariance = WeightedGram.Of(window.Shocks, factors, weights);
        var total = 0.0;
        foreach (var weight in weights) total += weight;
        for (var i = 0; i < covariance.Length; i++) covariance[i] /= total;
        return covariance;
    }
}
