namespace RiskWorker.Domain.Instruments;

/// <summary>Whether an option gives the right to buy or to sell.</summary>
public enum OptionRight
{
    /// <summary>The right to buy.</summary>
    Call,

    /// <summary>The right to sell.</summary>
    Put,
}

/// <summary>When an option may be exercised.</summary>
public enum ExerciseStyle
{
    /// <summary>At expiry only.</summary>
    European,

    /// <summary>At any time up to expiry.</summary>
    American,
}

/// <summary>What a derivative is written on: a factor, or one unit of a currency at the cross of two fx factors. Exactly one is set.</summary>
public readonly record struct Underlying(string? Factor, string? BaseCurrency)
{
    /// <summary>The name to show.</summary>
    public override string ToString() => Factor ?? $"one {BaseCurrency}";
}

/// <summary>A continuously compounded rate: a flat number, or the name of a curve (then <see cref="Flat"/> is NaN).</summary>
public readonly record struct RateTerm(double Flat, string? Curve)
{
    /// <summary>A flat rate.</summary>
    public static RateTerm Of(double flat) => new(flat, null);

    /// <summary>A rate read from a curve.</summary>
    public static RateTerm From(string curve) => new(double.NaN, curve);
}

/// <summary>A volatility per year of 365 days: a flat number, or a factor that carries it. Exactly one is set.</summary>
public readonly record struct VolatilityTerm(double? Flat, string? Factor);
