namespace RiskWorker.Domain.Instruments;

/// <summary>Coupons of a fixed rate.</summary>
/// <param name="Coupon">Rate per year, as a decimal.</param>
/// <param name="Frequency">Coupons a year: 1, 2, 4 or 12; 0 for a bond without coupons.</param>
/// <param name="DayCount">How a period becomes a fraction of a year.</param>
public sealed record FixedLeg(double Coupon, int Frequency, DayCount DayCount);

/// <summary>Coupons of a rate that is fixed at the start of each period.</summary>
/// <param name="Projection">The curve that projects the rates still unknown, or a flat rate.</param>
/// <param name="Frequency">Coupons a year: 1, 2, 4 or 12.</param>
/// <param name="DayCount">How a period becomes a fraction of a year.</param>
/// <param name="Spread">Added to the rate, per year, as a decimal.</param>
/// <param name="LastFixing">The rate of the period that runs, per year; null where none runs or it is unknown.</param>
public sealed record FloatLeg(RateTerm Projection, int Frequency, DayCount DayCount, double Spread, double? LastFixing);

/// <summary>Fixed coupons and the notional at maturity; its value is the dirty value.</summary>
/// <param name="Leg">The coupons.</param>
/// <param name="Issue">Start of the first coupon period.</param>
/// <param name="Maturity">Last payment.</param>
/// <param name="Curve">Discounts it.</param>
/// <param name="Notional">Paid back at maturity; what the coupons are a rate on.</param>
/// <param name="Spread">Added to the curve: a number, or the name of a factor or of a curve of spreads; null for none.</param>
public sealed record Bond(FixedLeg Leg, DateOnly Issue, DateOnly Maturity, RateTerm Curve, double Notional, RateTerm? Spread) : Instrument
{
    /// <summary>What a row means that names no notional.</summary>
    public const double DefaultNotional = 100;

    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Bond;
}

/// <summary>Floating coupons and the notional at maturity; its value is the dirty value. Terms as those of <see cref="Bond"/>.</summary>
public sealed record Floater(FloatLeg Leg, DateOnly Issue, DateOnly Maturity, RateTerm Curve, double Notional, RateTerm? Spread) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Floater;
}

/// <summary>Which leg of a swap is received; the other is paid.</summary>
public enum ReceivedLeg
{
    /// <summary>Fixed is received, floating paid.</summary>
    Fixed,

    /// <summary>Floating is received, fixed paid.</summary>
    Float,
}

/// <summary>Fixed against floating coupons on a notional that is not exchanged; its value is that of the leg received less that of the leg paid.</summary>
public sealed record Swap(ReceivedLeg Receive, FixedLeg Fixed, FloatLeg Floating, DateOnly Issue, DateOnly Maturity, RateTerm Curve, double Notional) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Swap;
}
