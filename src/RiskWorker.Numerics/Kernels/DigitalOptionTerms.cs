namespace RiskWorker.Numerics.Kernels;

/// <summary>What of a digital option no scenario moves. It pays a fixed amount, or the underlying itself, where it ends in the money.</summary>
public readonly struct DigitalOptionTerms
{
    /// <summary>Numbers that <see cref="CopyTo"/> writes.</summary>
    public const int NumberCount = 4;

    private DigitalOptionTerms(double spot0, double strike, double cash, bool isCall, bool paysAsset)
    {
        Sign = isCall ? 1.0 : -1.0;
        LogMoneyness = LogRatio.Of(TermRange.Positive(spot0, nameof(spot0)), TermRange.Positive(strike, nameof(strike)));
        Cash = cash;
        PaysAsset = paysAsset;
    }

    /// <summary>+1 call, -1 put.</summary>
    internal double Sign { get; }

    /// <summary>ln(S₀/K).</summary>
    internal double LogMoneyness { get; }

    /// <summary>The amount paid; 0 where the asset is.</summary>
    internal double Cash { get; }

    /// <summary>Pays one unit of the underlying, else the cash.</summary>
    internal bool PaysAsset { get; }

    /// <summary>Pays <paramref name="cash"/> where the underlying ends above the strike (call) or below it (put).</summary>
    /// <param name="spot0">Underlying today, S₀; positive. Scenarios give ln(S/S₀).</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="cash">The amount; 0 or more.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or outside its range.</exception>
    public static DigitalOptionTerms CashOrNothing(double spot0, double strike, double cash, bool isCall) =>
        new(spot0, strike, TermRange.NotNegative(cash, nameof(cash)), isCall, false);

    /// <summary>Pays one unit of the underlying where it ends above the strike (call) or below it (put).</summary>
    /// <param name="spot0">Underlying today, S₀; positive. Scenarios give ln(S/S₀).</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or not positive.</exception>
    public static DigitalOptionTerms AssetOrNothing(double spot0, double strike, bool isCall) => new(spot0, strike, 0.0, isCall, true);

    /// <summary>Every number that a value depends on, in a fixed order: what a content hash of a book is made of.</summary>
    /// <param name="numbers">At least <see cref="NumberCount"/> elements.</param>
    public void CopyTo(Span<double> numbers)
    {
        Spans.RequireRoom(NumberCount, numbers.Length, nameof(numbers));
        (numbers[0], numbers[1], numbers[2], numbers[3]) = (Sign, LogMoneyness, Cash, PaysAsset ? 1.0 : 0.0);
    }
}
