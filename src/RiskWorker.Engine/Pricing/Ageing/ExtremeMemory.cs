using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>
/// A lookback option; the state is the extreme so far. With E that extreme, or the strike where it lies beyond, the value is that of E less
/// the strike leg (the strike, or the underlying) and of an option on what an extreme to come goes beyond E: E/S₀ times that of a reference
/// option with strike S₀, the underlying at S S₀/E.
/// </summary>
internal sealed class ExtremeMemory : PathMemory
{
    private readonly OptionFormula? _reference;
    private readonly double _spot0;
    private readonly double? _strike;
    private readonly double _start;
    private readonly int _sign;

    /// <param name="reference">The reference option, for moves from <paramref name="spot0"/>; null at the expiry.</param>
    /// <param name="spot0">S₀, today's level.</param>
    /// <param name="strike">The strike; null where the underlying itself is it.</param>
    /// <param name="start">The extreme known today; infinite where there is none.</param>
    /// <param name="sign">+1 where the highest level counts, -1 for the lowest.</param>
    public ExtremeMemory(OptionFormula? reference, double spot0, double? strike, double start, int sign) =>
        (_reference, _spot0, _strike, _start, _sign) = (reference, spot0, strike, start, sign);

    /// <inheritdoc/>
    public override double Value(in MarketPoint market, double state)
    {
        var scale = Extreme(state) / _spot0;
        var ahead = _reference is null ? 0 : scale * _reference.Value(market with { X = market.X - Logarithm.Of(scale), Spot = market.Spot / scale });
        return Certain(market, scale) + ahead;
    }

    /// <inheritdoc/>
    public override void Fill(in MarketSpans market, ReadOnlySpan<double> states, Span<double> values)
    {
        values.Clear();
        if (_reference is not null)
        {
            Span<double> moved = stackalloc double[values.Length], spots = stackalloc double[values.Length];
            for (var s = 0; s < values.Length; s++)
            {
                var scale = Extreme(states[s]) / _spot0;
                (moved[s], spots[s]) = (market.X[s] - Logarithm.Of(scale), market.Spot[s] / scale);
            }
            Fill(_reference, new(moved, spots, market.Discount, market.Carry, market.Deviation), values);
        }
        for (var s = 0; s < values.Length; s++)
        {
            var scale = Extreme(states[s]) / _spot0;
            values[s] = Certain(market[s], scale) + (scale * values[s]);
        }
    }

    /// <inheritdoc/>
    public override PathMemory Tabulated(in MarketRange range)
    {
        if (_reference is not NumericFormula numeric) return this;
        // The underlying never lies beyond the extreme, which lies as far as scenarios go, or further where it does today.
        var reach = _sign > 0 ? range.X.High : -range.X.Low;
        foreach (var level in new[] { _strike ?? _start, _start })
        {
            if (level > 0 && double.IsFinite(level)) reach = Math.Max(reach, _sign * Logarithm.Of(level / _spot0));
        }
        var (far, near) = ((_sign > 0 ? -range.X.Low : range.X.High) + reach + 0.01, 1e-6);
        var x = new InputRange(_sign * (near - far) / 2, (near + far) / 2);
        return new ExtremeMemory(PriceTable.Build(numeric, _spot0, range with { X = x }), _spot0, _strike, _start, _sign);
    }

    /// <inheritdoc/>
    public override IEnumerable<double> Numbers() => [5, _spot0, _strike ?? 0, _start, _sign, .. _reference?.Numbers() ?? []];

    private double Extreme(double state)
    {
        if (_strike is not { } strike) return state;
        return _sign > 0 ? Math.Max(state, strike) : Math.Min(state, strike);
    }

    private double Certain(in MarketPoint market, double scale)
    {
        var against = _strike is { } strike ? strike * Exponential.Of(-market.Discount) : market.Spot * Exponential.Of(-market.Carry);
        return _sign * ((scale * _spot0 * Exponential.Of(-market.Discount)) - against);
    }
}
