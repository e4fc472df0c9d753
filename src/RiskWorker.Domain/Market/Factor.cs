namespace RiskWorker.Domain.Market;

/// <summary>A risk factor: one row of <c>factors.csv</c>.</summary>
/// <param name="Name">Identifies the factor; compared ordinally.</param>
/// <param name="Class">Asset class; an <see cref="FactorClass.Fx"/> factor is the price of one unit of <paramref name="Currency"/> in the reporting currency.</param>
/// <param name="Shock">Whether its daily shock is a log-return or a difference.</param>
/// <param name="Currency">The currency it is quoted in (for an fx factor: the currency that it prices); null when the feed leaves it open.</param>
/// <param name="Curve">The curve that it is a point of, or null.</param>
/// <param name="TenorYears">Its place on the curve in years, or null.</param>
/// <param name="Calendar">Its business-day calendar; null means every Monday to Friday.</param>
/// <param name="LiquidityDays">Liquidity horizon in business days, or null.</param>
/// <param name="Proxy">The factor whose history stands in where this one's is too short, or null.</param>
/// <param name="Beta">Move of this factor for one unit of the proxy's move; null without a proxy.</param>
public sealed record Factor(
    string Name,
    FactorClass Class,
    ShockKind Shock,
    string? Currency = null,
    string? Curve = null,
    double? TenorYears = null,
    string? Calendar = null,
    int? LiquidityDays = null,
    string? Proxy = null,
    double? Beta = null);
