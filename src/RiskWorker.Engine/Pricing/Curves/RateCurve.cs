using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>Continuously compounded zero rates, or spreads, by time: a curve of factors, one factor, or a flat number.</summary>
/// <remarks>
/// With tenors a below t below b, zero rates z_a, z_b and w = (t - a)/(b - a), the exponent z(t) t is t ((1 - w) z_a + w z_b) for
/// <see cref="CurveInterpolation.LinearZero"/> and (1 - w) a z_a + w b z_b for <see cref="CurveInterpolation.LogLinearDiscount"/>:
/// linear in the rates either way. Before the first tenor and after the last the zero rate is that tenor's. Rates may be negative.
/// </remarks>
public sealed class RateCurve
{
    private readonly double _flat;
    private readonly TenorPoints? _points;
    private readonly CurveInterpolation _interpolation;

    private RateCurve(double flat) => _flat = flat;

    internal RateCurve(TenorPoints points, CurveInterpolation interpolation) => (_points, _interpolation) = (points, interpolation);

    /// <summary>The curve whose zero rate is <paramref name="rate"/> at all times; a finite number.</summary>
    public static RateCurve Flat(double rate) => double.IsFinite(rate) ? new(rate) : throw new ArgumentOutOfRangeException(nameof(rate), rate, "A flat rate is a finite number.");

    /// <summary>The curve whose zero rate is the level of one factor at all times.</summary>
    internal static RateCurve OfFactor(int place) => new(new([0], [place]), CurveInterpolation.LinearZero);

    /// <summary>The zero rate of time <paramref name="years"/> times that time: minus the logarithm of the discount factor.</summary>
    /// <param name="years">From 0 on.</param>
    public LinearForm ExponentAt(double years)
    {
        if (_points is null) return LinearForm.Of(_flat * years);
        var (before, after, weight) = _points.Around(years);
        if (weight == 0) return LinearForm.Of(before.Place, years);
        return _interpolation == CurveInterpolation.LinearZero
            ? LinearForm.Of(before.Place, years * (1 - weight), after.Place, years * weight)
            : LinearForm.Of(before.Place, before.Tenor * (1 - weight), after.Place, after.Tenor * weight);
    }
}
