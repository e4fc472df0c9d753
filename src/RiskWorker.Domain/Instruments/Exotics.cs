namespace RiskWorker.Domain.Instruments;

/// <summary>
/// A European option that pays all or nothing: <paramref name="Notional"/> in cash, or one unit of the underlying. The notional is null
/// exactly where it pays the asset.
/// </summary>
public sealed record Digital(
    Underlying Underlying,
    double Strike,
    DateOnly Expiry,
    OptionRight Right,
    VolatilityTerm Volatility,
    RateTerm? Curve,
    RateTerm? Carry,
    DigitalPayoff Payoff,
    double? Notional) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Digital;
}

/// <summary>
/// A European option that starts or ends its life when the underlying touches <paramref name="Barrier"/> between <paramref name="Issue"/>
/// and <paramref name="Expiry"/>. <paramref name="Rebate"/> is paid at the hit by a knock-out, at expiry by a knock-in that was never hit.
/// </summary>
/// <remarks><paramref name="Knocked"/> is the date of the hit where the feed says so; null leaves it to the observations since the issue.</remarks>
public sealed record SingleBarrier(
    Underlying Underlying,
    double Strike,
    DateOnly Expiry,
    OptionRight Right,
    VolatilityTerm Volatility,
    RateTerm? Curve,
    RateTerm? Carry,
    double Barrier,
    BarrierKind BarrierKind,
    double Rebate,
    Monitoring Monitoring,
    DateOnly Issue,
    DateOnly? Knocked) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Barrier;
}

/// <summary>A European option on the average of its fixings; <paramref name="Issue"/> is set where the average is continuous.</summary>
public sealed record Asian(
    Underlying Underlying,
    double Strike,
    DateOnly Expiry,
    OptionRight Right,
    VolatilityTerm Volatility,
    RateTerm? Curve,
    RateTerm? Carry,
    AverageKind Average,
    FixingSchedule Fixings,
    DateOnly? Issue) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Asian;
}

/// <summary>
/// A European option on the highest or lowest level since <paramref name="Issue"/>: against <paramref name="Strike"/>, or, where that is
/// null, against the level at expiry (floating strike).
/// </summary>
public sealed record Lookback(
    Underlying Underlying,
    double? Strike,
    DateOnly Expiry,
    OptionRight Right,
    VolatilityTerm Volatility,
    RateTerm? Curve,
    RateTerm? Carry,
    Monitoring Monitoring,
    DateOnly Issue) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Lookback;
}
