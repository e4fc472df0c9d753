namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// One European option prepared for revaluation over many scenarios: everything that does not change with the scenario,
/// its logarithm of spot over strike included, with the option's right folded into the signs.
/// </summary>
/// <remarks>
/// The generalised Black-Scholes-Merton formula by cost of carry b: b = r for a stock without dividends, r - q with a yield,
/// r - r_f for a currency, 0 for a futures price (Black 1976).
/// </remarks>
public readonly struct EuropeanOptionTerms
{
    /// <param name="spot0">Underlying today, S₀; positive.</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="years">Time to expiry; 0 gives the intrinsic value.</param>
    /// <param name="volatility">Per root year, 0 or more; what the volatility-per-scenario form replaces.</param>
    /// <param name="rate">Continuously compounded.</param>
    /// <param name="costOfCarry">Continuously compounded growth of the forward.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or outside its range.</exception>
    public EuropeanOptionTerms(
        double spot0, double strike, double years, double volatility, double rate, double costOfCarry, bool isCall)
    {
        RequirePositive(spot0, nameof(spot0));
        RequirePositive(strike, nameof(strike));
        RequireNotNegative(years, nameof(years));
        RequireNotNegative(volatility, nameof(volatility));
        RequireFinite(rate, nameof(rate));
        RequireFinite(costOfCarry, nameof(costOfCarry));
        Sign = isCall ? 1.0 : -1.0;
        RootYears = Math.Sqrt(years);
        LogForwardMoneyness = Math.FusedMultiplyAdd(costOfCarry, years, Logarithm.Of(spot0 / strike));
        SpotFactor = Sign * Growth(costOfCarry, rate, years);
        StrikeValue = Sign * (strike * Growth(0.0, rate, years));

        double deviation = volatility * RootYears;
        IsExpired = years == 0.0;
        IsCertain = deviation == 0.0;
        deviation = deviation < EuropeanOption.SmallestDeviation ? EuropeanOption.SmallestDeviation : deviation;
        double inverse = 1.0 / deviation;
        SignedInverse = Sign * inverse;
        SignedDeviation = Sign * deviation;
        SignedOffset = Sign * Math.FusedMultiplyAdd(LogForwardMoneyness, inverse, 0.5 * deviation);
    }

    /// <summary>Numbers that <see cref="CopyTo"/> writes.</summary>
    public const int NumberCount = 8;

    /// <summary>Every number that a value depends on, in a fixed order: what a content hash of a book is made of.</summary>
    /// <param name="numbers">At least <see cref="NumberCount"/> elements.</param>
    public void CopyTo(Span<double> numbers)
    {
        Spans.RequireRoom(NumberCount, numbers.Length, nameof(numbers));
        (numbers[0], numbers[1], numbers[2], numbers[3]) = (Sign, RootYears, LogForwardMoneyness, SpotFactor);
        (numbers[4], numbers[5], numbers[6], numbers[7]) = (StrikeValue, SignedInverse, SignedDeviation, SignedOffset);
    }

    /// <summary>+1 call, -1 put.</summary>
    internal double Sign { get; }

    /// <summary>√T.</summary>
    internal double RootYears { get; }

    /// <summary>ln(S₀/K) + bT.</summary>
    internal double LogForwardMoneyness { get; }

    /// <summary>±e^((b-r)T).</summary>
    internal double SpotFactor { get; }

    /// <summary>±K e^(-rT).</summary>
    internal double StrikeValue { get; }

    /// <summary>±1/(v√T).</summary>
    internal double SignedInverse { get; }

    /// <summary>±v√T.</summary>
    internal double SignedDeviation { get; }

    /// <summary>±(ln(S₀/K) + (b + v²/2)T)/(v√T).</summary>
    internal double SignedOffset { get; }

    /// <summary>No time is left: no volatility matters.</summary>
    internal bool IsExpired { get; }

    /// <summary>Neither time nor volatility leaves anything open: the value is the discounted intrinsic value of the forward.</summary>
    internal bool IsCertain { get; }

    /// <summary>e^((up - down)·years), the exponent carried in two pieces: at twenty years its rounding would be the largest error.</summary>
    private static double Growth(double up, double down, double years)
    {
        double net = up - down;
        double back = net - up;
        double lost = up - (net - back) - (down + back);
        double head = net * years;
        return Exponential.OfSum(head, Math.FusedMultiplyAdd(lost, years, Math.FusedMultiplyAdd(net, years, -head)));
    }

    private static void RequireFinite(double value, string name)
    {
        if (!double.IsFinite(value))
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be finite.");
    }

    private static void RequirePositive(double value, string name)
    {
        RequireFinite(value, name);
        if (value <= 0.0)
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be positive.");
    }

    private static void RequireNotNegative(double value, string name)
    {
        RequireFinite(value, name);
        if (value < 0.0)
            throw new ArgumentOutOfRangeException(name, value, $"{name} is {value}; it must be 0 or more.");
    }
}
