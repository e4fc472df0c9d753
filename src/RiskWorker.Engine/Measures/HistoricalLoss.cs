using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Measures;

/// <summary>
/// The losses of past days, all of them. They are no draws: measures carry no simulation error, and what a sample of so many days says of
/// the law behind them stands apart.
/// </summary>
public sealed class HistoricalLoss : LossSeries
{
    private readonly SampledLoss _equal;
    private readonly TailEntry[] _worstFirst;
    private readonly double[]? _weights;
    private readonly bool _isOverlapping;

    /// <summary>Takes every loss of a series.</summary>
    /// <param name="worstFirst">Losses and scenario numbers, worst first.</param>
    /// <param name="weights">Weight of each scenario by its number, summing to 1; null where all weigh the same.</param>
    /// <param name="isOverlapping">Whether scenarios share days: then no interval is claimed.</param>
    public HistoricalLoss(TailEntry[] worstFirst, double[]? weights, bool isOverlapping)
    {
        ArgumentNullException.ThrowIfNull(worstFirst);
        if (weights is not null && weights.Length != worstFirst.Length) throw new ArgumentException($"There are {weights.Length} weights for {worstFirst.Length} losses.", nameof(weights));
        (_worstFirst, _weights, _isOverlapping) = (worstFirst, weights, isOverlapping);
        _equal = new(worstFirst.Length, worstFirst, double.NegativeInfinity, 0);
    }

    /// <inheritdoc/>
    public override int Count => _worstFirst.Length;

    /// <inheritdoc/>
    public override long Known => Count;

    /// <inheritdoc/>
    public override double AtRank(long rank) => _equal.AtRank(rank);

    /// <inheritdoc/>
    public override long RankOf(decimal mass)
    {
        if (_weights is null) return base.RankOf(mass);
        var (rank, passed) = (0, 0.0);
        while (passed < (double)mass && rank < Count) passed += WeightOf(rank++);
        return Math.Max(1, rank);
    }

    /// <inheritdoc/>
    public override MeasureResult Measure(MeasureSpec spec, decimal level)
    {
        var value = Value(spec);
        return new(spec, value, value, value, (double)level) { Sample = SampleOf(spec, level) };
    }

    /// <inheritdoc/>
    public override (double Mean, double Deviation) Moments(double sum, double squares)
    {
        if (_weights is null) return base.Moments(sum, squares);
        var (mean, square) = (0.0, 0.0);
        for (var i = 0; i < Count; i++) mean = Math.FusedMultiplyAdd(WeightOf(i), _worstFirst[i].Loss, mean);
        for (var i = 0; i < Count; i++) square = Math.FusedMultiplyAdd(WeightOf(i) * (_worstFirst[i].Loss - mean), _worstFirst[i].Loss - mean, square);
        return (mean, Math.Sqrt(square));
    }

    private double Value(MeasureSpec spec)
    {
        if (_weights is not null) return spec.Kind == MeasureKind.Var ? WeightedVar(spec.Confidence) : WeightedShortfall(spec.Confidence);
        return spec.Kind == MeasureKind.Var ? _equal.Var(spec.Confidence) : _equal.ExpectedShortfall(spec.Confidence);
    }

    // Days that overlap, or weigh differently, are no sample of independent draws.
    private SampleInterval SampleOf(MeasureSpec spec, decimal level)
    {
        if (_isOverlapping || _weights is not null) return new(null, null);
        if (spec.Kind == MeasureKind.Var)
        {
            var (low, high) = _equal.VarInterval(spec.Confidence, level);
            return new(low, high);
        }
        var shortfall = _equal.ExpectedShortfallInterval(spec.Confidence, level);
        return new(shortfall.Low, shortfall.High);
    }

    // The smallest loss such that losses beyond it weigh at most 1 - alpha.
    private double WeightedVar(Confidence confidence)
    {
        var (rank, beyond, mass) = (0, 0.0, (double)(1 - confidence.Level));
        while (rank + 1 < Count && beyond + WeightOf(rank) <= mass) beyond += WeightOf(rank++);
        return AtRank(rank + 1);
    }

    private double WeightedShortfall(Confidence confidence)
    {
        var (sum, left, mass) = (0.0, (double)(1 - confidence.Level), (double)(1 - confidence.Level));
        for (var rank = 0; rank < Count && left > 0; rank++)
        {
            var weight = Math.Min(left, WeightOf(rank));
            sum = Math.FusedMultiplyAdd(weight, AtRank(rank + 1), sum);
            left -= weight;
        }
        return sum / mass;
    }

    private double WeightOf(int place) => _weights![(int)_worstFirst[place].Scenario];
}
