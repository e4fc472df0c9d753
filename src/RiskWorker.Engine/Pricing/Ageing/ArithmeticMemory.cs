using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>
/// An option on an arithmetic average of which some fixings are to come; the state is the sum of levels fixed inside the horizon. What is
/// fixed lowers the strike: with κ = n K - fixed, m of n fixings to come and λ = κ/(m S₀) the value is m λ/n times that of a reference option on
/// the m fixings alone with strike S₀, the underlying at S/λ (a price is homogeneous in spot and strike). Where κ is not positive, or the
/// average so deep in the money that nothing could leave it out, a call is sure to be exercised.
/// </summary>
internal sealed class ArithmeticMemory : PathMemory
{
    private readonly OptionFormula _reference;
    private readonly double _spot0;
    private readonly double[] _times;
    private readonly int _count;
    private readonly double _open;
    private readonly bool _isCall;
    private readonly double _deepest;

    /// <param name="reference">The reference option, for moves from <paramref name="spot0"/>.</param>
    /// <param name="spot0">S₀, today's level.</param>
    /// <param name="times">Times of the fixings to come, as fractions of the time to expiry.</param>
    /// <param name="count">All fixings, n.</param>
    /// <param name="open">n K less the levels known today.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <param name="deepest">Log-returns of the reference beyond which the exercise of a call is sure.</param>
    public ArithmeticMemory(OptionFormula reference, double spot0, double[] times, int count, double open, bool isCall, double deepest = double.PositiveInfinity) =>
        (_reference, _spot0, _times, _count, _open, _isCall, _deepest) = (reference, spot0, times, count, open, isCall, deepest);

    /// <inheritdoc/>
    public override double Value(in MarketPoint market, double state)
    {
        var (scale, x) = Scaled(market.X, state);
        return x <= _deepest ? Share * scale * _reference.Value(market with { X = x, Spot = market.Spot / scale }) : Sure(market, state);
    }

    /// <inheritdoc/>
    public override void Fill(in MarketSpans market, ReadOnlySpan<double> states, Span<double> values)
    {
        Span<double> scales = stackalloc double[values.Length], moved = stackalloc double[values.Length], spots = stackalloc double[values.Length];
        for (var s = 0; s < values.Length; s++)
        {
            var (scale, x) = Scaled(market.X[s], states[s]);
            // Where exercise is sure the reference is not read.
            (scales[s], moved[s], spots[s]) = x <= _deepest ? (scale, x, market.Spot[s] / scale) : (0, 0, _spot0);
        }
        Fill(_reference, new(moved, spots, market.Discount, market.Carry, market.Deviation), values);
        for (var s = 0; s < values.Length; s++) values[s] = scales[s] > 0 ? Share * scales[s] * values[s] : Sure(market[s], states[s]);
    }

    /// <inheritdoc/>
    public override PathMemory Tabulated(in MarketRange range)
    {
        if (_reference is not NumericFormula numeric) return this;
        var (least, most) = (_open - (_count * _spot0 * Exponential.Of(range.X.High)), _open);
        var growth = Math.Max(Math.Abs(range.Discount.High - range.Carry.Low), Math.Abs(range.Discount.Low - range.Carry.High));
        var deepest = (10 * Math.Max(range.Deviation.High, 0.01)) + growth;
        var high = least > 0 ? Math.Min(range.X.High - LogScale(least), deepest) : deepest;
        var low = Math.Min(most > 0 ? range.X.Low - LogScale(most) : -deepest, high - 0.01);
        var table = PriceTable.Build(numeric, _spot0, range with { X = new((low + high) / 2, (high - low) / 2) });
        return new ArithmeticMemory(table, _spot0, _times, _count, _open, _isCall, deepest);
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [4, _spot0, _times.Length, .. _times, _count, _open, _isCall ? 1 : 0, _deepest, .. _reference.Numbers()];

    private double Share => (double)_times.Length / _count;

    private double LogScale(double strike) => Logarithm.Of(strike / (_times.Length * _spot0));

    private (double Scale, double X) Scaled(double x, double state)
    {
        var scale = (_open - state) / (_times.Length * _spot0);
        return scale > 0 ? (scale, x - Logarithm.Of(scale)) : (0, double.PositiveInfinity);
    }

    private double Sure(in MarketPoint market, double state)
    {
        if (!_isCall) return 0;
        var sum = 0.0;
        foreach (var time in _times) sum += Exponential.Of((market.Discount - market.Carry) * time);
        return Math.FusedMultiplyAdd(market.Spot, sum, state - _open) / _count * Exponential.Of(-market.Discount);
    }
}
