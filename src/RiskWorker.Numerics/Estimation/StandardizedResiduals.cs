using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Residuals in units of their own day's standard deviation, z_t = (x_t - mean)/√v_t, then without their mean and divided by their
/// own deviation, so that mean and variance (divisor n) are 0 and 1 to rounding: what filtered historical simulation draws from
/// (Barone-Adesi, Giannopoulos and Vosper 1999, Journal of Futures Markets 19, 583-602).
/// </summary>
/// <param name="Mean">What was taken off.</param>
/// <param name="Deviation">What was divided by; 0 for residuals that do not vary, which are all written as 0.</param>
public readonly record struct StandardizedResiduals(double Mean, double Deviation)
{
    /// <summary>Writes the standardised residuals of a series.</summary>
    /// <param name="values">Finite numbers, at least one.</param>
    /// <param name="variance">A filter's variances of that series.</param>
    /// <param name="residuals">As long as <paramref name="values"/>, or the same memory.</param>
    /// <exception cref="ArgumentException">Lengths differ, a value is not finite, or a variance is not positive on a day that left the mean.</exception>
    public static StandardizedResiduals Write(ReadOnlySpan<double> values, ConditionalVariance variance, Span<double> residuals)
    {
        ArgumentNullException.ThrowIfNull(variance);
        Series.RequireFinite(values, 1, nameof(values));
        Spans.RequireLength(values.Length, variance.Variances.Length, nameof(variance));
        Spans.RequireLength(values.Length, residuals.Length, nameof(residuals));
        Spans.RequireSameOrApart(values, residuals, nameof(residuals));
        for (var t = 0; t < values.Length; t++) residuals[t] = Residual(values[t] - variance.Mean, variance.Variances[t], t);
        var mean = Series.Mean(residuals);
        for (var t = 0; t < residuals.Length; t++) residuals[t] -= mean;
        var deviation = Math.Sqrt(LaneSum.OfSquares(residuals) / residuals.Length);
        // Equal residuals leave what the last bit of their mean is worth.
        if (!(deviation > 4e-16 * Math.Abs(mean))) deviation = 0;
        for (var t = 0; t < residuals.Length; t++) residuals[t] = deviation > 0 ? residuals[t] / deviation : 0;
        return new(mean, deviation);
    }

    private static double Residual(double error, double variance, int day)
    {
        if (error == 0 && variance >= 0) return 0;
        if (!(variance > 0 && variance < double.PositiveInfinity))
            throw new ArgumentException($"The variance of day {day} is {variance}; it must be positive and finite where the series leaves its mean.", nameof(variance));
        return error / Math.Sqrt(variance);
    }
}
