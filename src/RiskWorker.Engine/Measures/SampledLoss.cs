using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Reductions;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Statistics;

namespace RiskWorker.Engine.Measures;

/// <summary>
/// One series of N losses as its tail is known: the losses beyond a cutoff in full, those equal to it by count.
/// Ranks count from the worst, 1. Tails by cutoff give what sorting all N losses would.
/// </summary>
public sealed class SampledLoss : LossSeries
{
    private readonly IntervalRanks _ranks;
    private readonly double[] _losses;
    private readonly double _cutoff;
    private readonly long _equal;

    /// <summary>Takes the sorted tail of a series.</summary>
    /// <param name="count">All losses of the series, N.</param>
    /// <param name="tail">Those beyond the cutoff, worst first.</param>
    /// <param name="cutoff">The cutoff.</param>
    /// <param name="equal">Losses equal to the cutoff.</param>
    public SampledLoss(int count, ReadOnlySpan<TailEntry> tail, double cutoff, long equal)
        : this(new IntervalRanks(count), tail, cutoff, equal)
    {
    }

    internal SampledLoss(IntervalRanks ranks, ReadOnlySpan<TailEntry> tail, double cutoff, long equal)
    {
        (_ranks, _losses, _cutoff, _equal) = (ranks, GC.AllocateUninitializedArray<double>(tail.Length), Unsigned(cutoff), equal);
        for (var i = 0; i < tail.Length; i++) _losses[i] = Unsigned(tail[i].Loss);
    }

    /// <inheritdoc/>
    public override int Count => _ranks.Count;

    /// <inheritdoc/>
    public override long Known => _losses.Length + _equal;

    /// <inheritdoc/>
    public override double AtRank(long rank)
    {
        if (rank < 1 || rank > Known) throw new ArgumentOutOfRangeException(nameof(rank), rank, $"Ranks 1 to {Known} are known.");
        return rank <= _losses.Length ? _losses[rank - 1] : _cutoff;
    }

    /// <inheritdoc/>
    public override MeasureResult Measure(MeasureSpec spec, decimal level)
    {
        if (spec.Kind != MeasureKind.Var)
        {
            var shortfall = ExpectedShortfallInterval(spec.Confidence, level);
            return new(spec, ExpectedShortfall(spec.Confidence), shortfall.Low, shortfall.High, (double)level);
        }
        var (low, high) = VarInterval(spec.Confidence, level);
        return new(spec, Var(spec.Confidence), low, high, (double)level);
    }

    /// <summary>The rank from the worst that VaR at <paramref name="confidence"/> stands on: N - ceil(N alpha) + 1.</summary>
    public int VarRank(Confidence confidence) => Count - BinomialRanks.VarRank(Count, confidence.Level) + 1;

    /// <summary>The smallest l with P(L &lt;= l) >= confidence.</summary>
    public double Var(Confidence confidence) => AtRank(VarRank(confidence));

    /// <summary>The distribution-free interval of VaR from order statistics; an end whose rank lies outside the sample is null.</summary>
    public (double? Low, double? High) VarInterval(Confidence confidence, decimal level)
    {
        var ranks = _ranks.Interval(confidence.Level, level);
        return (ranks.Low is { } low ? AtRank(Count - low + 1) : null, ranks.High is { } high ? AtRank(Count - high + 1) : null);
    }

    /// <summary>The mean of the worst N(1 - alpha) losses, the boundary loss weighted by the fraction needed (Acerbi and Tasche 2002).</summary>
    public double ExpectedShortfall(Confidence confidence)
    {
        var (whole, fraction, weight) = TailOf(confidence);
        return Weighted(whole, fraction, LaneSum.Of(Kept(whole)), static loss => loss) / weight;
    }

    /// <summary>
    /// The interval of expected shortfall by its asymptotic variance,
    /// (Var(L given L >= VaR) + alpha (ES - VaR)²) / (N (1 - alpha)) (Manistre and Hancock 2005).
    /// </summary>
    public (double Low, double High) ExpectedShortfallInterval(Confidence confidence, decimal level)
    {
        var (whole, fraction, weight) = TailOf(confidence);
        var es = ExpectedShortfall(confidence);
        var excess = es - Var(confidence);
        var variance = Weighted(whole, fraction, LaneSum.OfSquares(Deviations(whole, es)), loss => (loss - es) * (loss - es)) / weight;
        var error = Math.Sqrt((variance + ((double)confidence.Level * excess * excess)) / weight);
        var half = InverseNormal.Of((double)((1 + level) / 2)) * error;
        return (es - half, es + half);
    }

    // A profit of 0 is a loss of -0 to the last bit, which would be written so.
    private static double Unsigned(double loss) => loss == 0 ? 0 : loss;

    private (long Whole, double Fraction, double Weight) TailOf(Confidence confidence)
    {
        var weight = BinomialRanks.TailWeight(Count, confidence.Level);
        var whole = decimal.Floor(weight);
        return ((long)whole, (double)(weight - whole), (double)weight);
    }

    // The worst `whole` losses as far as they are kept.
    private ReadOnlySpan<double> Kept(long whole) => _losses.AsSpan(0, (int)Math.Min(whole, _losses.Length));

    // Adds to the sum of a function over the kept ones of the worst `whole` losses those that are not kept, which equal the
    // cutoff, and a fraction of the next one.
    private double Weighted(long whole, double fraction, double sum, Func<double, double> of)
    {
        var kept = Kept(whole).Length;
        if (whole > kept) sum = Math.FusedMultiplyAdd(whole - kept, of(AtRank(whole)), sum);
        return fraction > 0 ? Math.FusedMultiplyAdd(fraction, of(AtRank(whole + 1)), sum) : sum;
    }

    private double[] Deviations(long whole, double center)
    {
        var kept = Kept(whole);
        var deviations = GC.AllocateUninitializedArray<double>(kept.Length);
        for (var i = 0; i < deviations.Length; i++) deviations[i] = kept[i] - center;
        return deviations;
    }
}
