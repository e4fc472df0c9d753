namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>Implied volatility by expiry: a curve of factors, one factor, or a flat number.</summary>
/// <remarks>
/// The total variance sigma^2 t is linear in t between two tenors; before the first tenor and after the last the volatility is that tenor's.
/// A level below 0 squares to a positive variance: factors of volatility are log-normal.
/// </remarks>
public sealed class VolatilityCurve
{
    private readonly double _flat;
    private readonly TenorPoints? _points;

    private VolatilityCurve(double flat) => _flat = flat;

    internal VolatilityCurve(TenorPoints points) => _points = points;

    /// <summary>The volatility <paramref name="volatility"/> for every expiry; a finite number from 0 on.</summary>
    public static VolatilityCurve Flat(double volatility) =>
        double.IsFinite(volatility) && volatility >= 0 ? new(volatility) : throw new ArgumentOutOfRangeException(nameof(volatility), volatility, "A volatility is a finite number from 0 on.");

    /// <summary>The level of one factor for every expiry.</summary>
    internal static VolatilityCurve OfFactor(int place) => new(new TenorPoints([0], [place]));

    /// <summary>The total variance to an expiry in <paramref name="years"/>.</summary>
    /// <param name="years">From 0 on.</param>
    public VarianceForm VarianceAt(double years)
    {
        if (_points is null) return new(_flat * _flat * years);
        var (before, after, weight) = _points.Around(years);
        return weight == 0
            ? new(0, (before.Place, years))
            : new(0, (before.Place, before.Tenor * (1 - weight)), (after.Place, after.Tenor * weight));
    }
}
