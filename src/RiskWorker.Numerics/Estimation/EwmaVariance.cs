namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// The exponentially weighted variance filter (RiskMetrics Technical Document, 1996, chapter 5): v₁ is the mean square of the whole
/// series about the mean, v_{t+1} = λ v_t + (1 - λ)(x_t - mean)².
/// </summary>
public static class EwmaVariance
{
    /// <summary>Filters <paramref name="values"/>, the oldest first; a series that never leaves its mean has variances of 0.</summary>
    /// <param name="values">At least one finite number.</param>
    /// <param name="lambda">Strictly between 0 and 1.</param>
    /// <param name="mean">What the squares are taken about; 0 unless given.</param>
    /// <exception cref="ArgumentException">There is no value, one is not finite, or λ or the mean is no such number.</exception>
    public static ConditionalVariance Of(ReadOnlySpan<double> values, double lambda, double mean = 0)
    {
        Series.RequireFinite(values, 1, nameof(values));
        Series.RequireFinite(mean, nameof(mean));
        RequireDecay(lambda);
        var variances = new double[values.Length];
        var variance = Series.MeanSquare(values, mean);
        for (var t = 0; t < values.Length; t++)
        {
            variances[t] = variance;
            var error = values[t] - mean;
            variance = Math.FusedMultiplyAdd(lambda, variance, (1 - lambda) * (error * error));
        }
        return new(mean, variances, variance);
    }

    /// <summary>The recursion as a process to simulate: omega 0, alpha 1 - λ, beta λ.</summary>
    /// <exception cref="ArgumentException">λ or the mean is no such number.</exception>
    public static GarchParameters AsProcess(double lambda, double mean = 0)
    {
        RequireDecay(lambda);
        Series.RequireFinite(mean, nameof(mean));
        return new(mean, 0, 1 - lambda, lambda);
    }

    private static void RequireDecay(double lambda)
    {
        if (!(lambda > 0 && lambda < 1)) throw new ArgumentOutOfRangeException(nameof(lambda), lambda, "The decay factor lies strictly between 0 and 1.");
    }
}
