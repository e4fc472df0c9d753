using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Diffusion and jumps of series of daily moves, by the threshold method of <see cref="JumpThreshold"/>: of Merton's model (1976), in which
/// a day moves by a normal of zero mean and, on a jump day, by one jump of a size of its own. Series may share jump days.
/// </summary>
/// <remarks>
/// The mean square of a series is kept: it equals diffusion² + Σ intensity · (mean² + deviation²) to rounding. With D, J the diffusion and
/// jump days it is the weighted mean of the mean squares over D and J; the diffusion's variance is that over D; and a jump day holds
/// diffusion too, so the variance of its size is that of the moves over J less the diffusion's. Where that would be negative, or a single day shows
/// none, it is 0 and the diffusion is what is left of the total.
/// </remarks>
/// <param name="Diffusion">Standard deviation of a day without jump.</param>
/// <param name="Own">Jumps on the days that are not common.</param>
/// <param name="Common">Jumps on common days; a series takes part whether or not it passed its own threshold.</param>
public sealed record JumpDiffusionFit(double Diffusion, JumpSizes Own, JumpSizes Common)
{
    /// <summary>The variance of a day under the fit: to rounding the mean square of the series.</summary>
    public double Variance => (Diffusion * Diffusion) + Own.Variance + Common.Variance;

    /// <summary>One series by itself, all jumps its own.</summary>
    /// <param name="values">Daily moves of zero mean; see <see cref="JumpThreshold.Mark"/> for what they and <paramref name="c"/> must be.</param>
    /// <param name="c">The threshold in deviations.</param>
    public static JumpDiffusionFit Of(ReadOnlySpan<double> values, double c)
    {
        var own = new bool[values.Length];
        JumpThreshold.Mark(values, c, own);
        return Of(values, own, new bool[values.Length]);
    }

    /// <summary>Several series over the same days; a day is common where at least a given fraction of them jump.</summary>
    /// <param name="rows">n rows of one length, row-major.</param>
    /// <param name="n">Rows.</param>
    /// <param name="c">The threshold in deviations of each series.</param>
    /// <param name="fraction">Above 0 and at most 1.</param>
    /// <param name="commonDays">True on the common days; as long as a row.</param>
    /// <returns>A fit a row; the common intensity is the same in all.</returns>
    /// <exception cref="ArgumentException">The rows are not n of one length, too short or not finite, or c or the fraction lies outside.</exception>
    public static JumpDiffusionFit[] OfSeveral(ReadOnlySpan<double> rows, int n, double c, double fraction, Span<bool> commonDays)
    {
        var days = Series.RequireTable(rows, n, JumpThreshold.FewestDays, nameof(rows));
        Series.RequireFiniteTable(rows, days, nameof(rows));
        if (!(fraction > 0 && fraction <= 1)) throw new ArgumentOutOfRangeException(nameof(fraction), fraction, "The fraction of series lies above 0 and is at most 1.");
        if (commonDays.Length != days) throw new ArgumentException($"commonDays has {commonDays.Length} elements; it must have {days}.", nameof(commonDays));
        var own = new bool[n * days];
        var counts = new int[days];
        for (var i = 0; i < n; i++)
        {
            var jumps = own.AsSpan(i * days, days);
            JumpThreshold.Mark(rows.Slice(i * days, days), c, jumps);
            for (var t = 0; t < days; t++) counts[t] += jumps[t] ? 1 : 0;
        }
        for (var t = 0; t < days; t++) commonDays[t] = counts[t] > 0 && counts[t] >= fraction * n * (1 - 1e-12);
        var fits = new JumpDiffusionFit[n];
        for (var i = 0; i < n; i++)
        {
            var jumps = own.AsSpan(i * days, days);
            for (var t = 0; t < days; t++) jumps[t] &= !commonDays[t];
            fits[i] = Of(rows.Slice(i * days, days), jumps, commonDays);
        }
        return fits;
    }

    private static JumpDiffusionFit Of(ReadOnlySpan<double> values, ReadOnlySpan<bool> own, ReadOnlySpan<bool> common)
    {
        var (count, squares) = (0, 0.0);
        for (var t = 0; t < values.Length; t++)
        {
            if (!own[t] && !common[t]) (count, squares) = (count + 1, Math.FusedMultiplyAdd(values[t], values[t], squares));
        }
        var quiet = count > 0 ? squares / count : 0;
        var (ownSizes, commonSizes) = (JumpSizes.Of(values, own, quiet), JumpSizes.Of(values, common, quiet));
        var left = (LaneSum.OfSquares(values) / values.Length) - ownSizes.Variance - commonSizes.Variance;
        return new(Math.Sqrt(Math.Max(left, 0)), ownSizes, commonSizes);
    }
}
