namespace RiskWorker.Numerics.Estimation;

/// <summary>Jumps of a series: how often, and how large on average and in spread.</summary>
/// <param name="Intensity">Jump days a day.</param>
/// <param name="Mean">Mean size; 0 without a jump.</param>
/// <param name="Deviation">Standard deviation of the size, the diffusion of the same days taken off.</param>
/// <param name="Days">Jump days counted.</param>
/// <param name="Caveats">What could not be done.</param>
public readonly record struct JumpSizes(double Intensity, double Mean, double Deviation, int Days, JumpCaveats Caveats)
{
    /// <summary>What the jumps add to the variance of a day: intensity · (mean² + deviation²).</summary>
    public double Variance => Intensity * Math.FusedMultiplyAdd(Mean, Mean, Deviation * Deviation);

    /// <summary>The sizes on the days where <paramref name="jumps"/> is true, given the diffusion's variance.</summary>
    internal static JumpSizes Of(ReadOnlySpan<double> values, ReadOnlySpan<bool> jumps, double diffusion)
    {
        var (count, sum) = (0, 0.0);
        for (var t = 0; t < values.Length; t++)
        {
            if (jumps[t]) (count, sum) = (count + 1, sum + values[t]);
        }
        if (count == 0) return new(0, 0, 0, 0, JumpCaveats.NoJumps);
        var (mean, squares) = (sum / count, 0.0);
        for (var t = 0; t < values.Length; t++)
        {
            if (jumps[t]) squares = Math.FusedMultiplyAdd(values[t] - mean, values[t] - mean, squares);
        }
        var variance = (squares / count) - diffusion;
        var caveats = (count == 1 ? JumpCaveats.SingleJump : JumpCaveats.None) | (variance < 0 ? JumpCaveats.DeviationAtZero : JumpCaveats.None);
        return new((double)count / values.Length, mean, Math.Sqrt(Math.Max(variance, 0)), count, caveats);
    }
}
