namespace RiskWorker.Engine.Pricing;

/// <summary>
/// What a derivative is written on, as places in the factor list: one factor (<see cref="Quote"/> is -1), or one unit of
/// the base currency in the instrument's currency, the cross of two fx factors; -1 stands there for the reporting currency.
/// </summary>
/// <param name="IsCross">Whether it is a cross.</param>
/// <param name="Factor">The factor, or the base currency's fx factor.</param>
/// <param name="Quote">The instrument currency's fx factor, for a cross.</param>
public readonly record struct UnderlyingKey(bool IsCross, int Factor, int Quote) : IComparable<UnderlyingKey>
{
    /// <summary>The factor itself.</summary>
    public static UnderlyingKey Of(int factor) => new(false, factor, -1);

    /// <summary>Single factors first, each by place.</summary>
    public int CompareTo(UnderlyingKey other)
    {
        var order = IsCross.CompareTo(other.IsCross);
        if (order == 0) order = Factor.CompareTo(other.Factor);
        return order != 0 ? order : Quote.CompareTo(other.Quote);
    }

    /// <summary>The underlying's price, given the factors' levels.</summary>
    public double LevelOf(ReadOnlySpan<double> levels)
    {
        if (!IsCross) return levels[Factor];
        return (Factor < 0 ? 1 : levels[Factor]) / (Quote < 0 ? 1 : levels[Quote]);
    }
}

/// <summary>The shapes of value that the priced kinds come down to.</summary>
public enum PayoffShape
{
    /// <summary>One unit of its currency.</summary>
    Cash,

    /// <summary>One unit of the underlying.</summary>
    Spot,

    /// <summary>Value 0; profit is the change of the underlying.</summary>
    Future,

    /// <summary>S e^(-qT) - K e^(-rT).</summary>
    Forward,

    /// <summary>A European call or put.</summary>
    EuropeanOption,
}

/// <summary>An instrument with its names resolved to places in the factor list and the currency table: ready to be valued at any levels.</summary>
/// <param name="Shape">Which formula values it.</param>
/// <param name="Currency">Place of its currency in the currency table.</param>
/// <param name="Underlying">What it is written on; unused for cash.</param>
/// <param name="Multiplier">Value of one unit held per unit of the formula.</param>
/// <param name="Strike">Strike, or 0.</param>
/// <param name="Expiry">Last date that it lives on; <see cref="DateOnly.MaxValue"/> where it has none.</param>
/// <param name="Rate">Continuously compounded discount rate.</param>
/// <param name="Carry">Continuously compounded yield of the underlying, q.</param>
/// <param name="IsCall">Call or put.</param>
/// <param name="Volatility">Flat volatility, or NaN where a factor carries it.</param>
/// <param name="VolatilityFactor">The factor that carries the volatility, or -1.</param>
public readonly record struct BoundInstrument(
    PayoffShape Shape,
    int Currency,
    UnderlyingKey Underlying,
    double Multiplier,
    double Strike,
    DateOnly Expiry,
    double Rate,
    double Carry,
    bool IsCall,
    double Volatility,
    int VolatilityFactor)
{
    /// <summary>Years of 365 days from <paramref name="date"/> to the close of the expiry.</summary>
    public double YearsFrom(DateOnly date) => (Expiry.DayNumber - date.DayNumber) / 365.0;
}
