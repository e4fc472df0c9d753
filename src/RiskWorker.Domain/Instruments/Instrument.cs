namespace RiskWorker.Domain.Instruments;

/// <summary>What a position holds: one row of <c>instruments.csv</c>, its terms checked and typed.</summary>
public abstract record Instrument
{
    /// <summary>Identifies the instrument.</summary>
    public required string Name { get; init; }

    /// <summary>Currency of its value.</summary>
    public required string Currency { get; init; }

    /// <summary>Factor between one unit held and the value of one unit; 1 unless given.</summary>
    public double Multiplier { get; init; } = 1;

    /// <summary>Who stands behind it, or null.</summary>
    public string? Issuer { get; init; }

    /// <summary>Smallest tradable quantity, or null.</summary>
    public double? Lot { get; init; }

    /// <summary>Average quantity traded a day, or null.</summary>
    public double? DailyVolume { get; init; }

    /// <summary>The kind as spelt in the feed.</summary>
    public abstract string Kind { get; }
}

/// <summary>One unit of a quoted factor: value S.</summary>
public sealed record Spot(string Factor) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Spot;
}

/// <summary>One unit of a currency: value 1 in that currency.</summary>
public sealed record Cash : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Cash;
}

/// <summary>A futures contract on its own price: settled daily, so its value is 0 and its profit the change of the price.</summary>
public sealed record Future(string Factor) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Future;
}

/// <summary>An agreement to buy at <paramref name="Strike"/> on <paramref name="Expiry"/>: value S e^(-qT) - K e^(-rT).</summary>
public sealed record Forward(Underlying Underlying, double Strike, DateOnly Expiry, RateTerm? Curve, RateTerm? Carry, string? SettlementCurrency) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Forward;
}

/// <summary>A plain call or put; its value is the premium.</summary>
public sealed record Option(
    Underlying Underlying,
    double Strike,
    DateOnly Expiry,
    OptionRight Right,
    ExerciseStyle Style,
    VolatilityTerm Volatility,
    RateTerm? Curve,
    RateTerm? Carry) : Instrument
{
    /// <inheritdoc/>
    public override string Kind => InstrumentKinds.Option;
}

/// <summary>An instrument that has no pricing: of a kind without one, or stored by an earlier version with a term that this one cannot read. Its terms are kept as typed.</summary>
public sealed record UnmodelledInstrument(string KindName, IReadOnlyDictionary<string, string> Terms) : Instrument
{
    /// <summary>The term that cannot be read, as a clause to follow its name; null where it is the kind that has no pricing.</summary>
    public string? Fault { get; init; }

    /// <inheritdoc/>
    public override string Kind => KindName;
}
