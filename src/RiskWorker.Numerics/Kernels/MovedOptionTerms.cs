namespace RiskWorker.Numerics.Kernels;

/// <summary>What of a European option no scenario moves, its logarithm of spot over strike included.</summary>
public readonly struct MovedOptionTerms
{
    /// <summary>Numbers that <see cref="CopyTo"/> writes.</summary>
    public const int NumberCount = 3;

    /// <param name="spot0">Underlying today, S₀; positive. Scenarios give ln(S/S₀).</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or not positive.</exception>
    public MovedOptionTerms(double spot0, double strike, bool isCall)
    {
        Sign = isCall ? 1.0 : -1.0;
        LogMoneyness = LogRatio.Of(TermRange.Positive(spot0, nameof(spot0)), TermRange.Positive(strike, nameof(strike)));
        SignedStrike = Sign * strike;
    }

    /// <summary>+1 call, -1 put.</summary>
    internal double Sign { get; }

    /// <summary>ln(S₀/K).</summary>
    internal double LogMoneyness { get; }

    /// <summary>±K.</summary>
    internal double SignedStrike { get; }

    /// <summary>Every number that a value depends on, in a fixed order: what a content hash of a book is made of.</summary>
    /// <param name="numbers">At least <see cref="NumberCount"/> elements.</param>
    public void CopyTo(Span<double> numbers)
    {
        Spans.RequireRoom(NumberCount, numbers.Length, nameof(numbers));
        (numbers[0], numbers[1], numbers[2]) = (Sign, LogMoneyness, SignedStrike);
    }
}
