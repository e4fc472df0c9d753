namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// What of an option on a geometric average no scenario moves. Given S the average G is lognormal: ln G = known part + f ln S +
/// (bT - w²/2) t̄ + w√v Z, with f the share of the average that is still open, t̄ = ∫ t dF/T and v = ∬ min(s, t) dF dF/T over the open
/// part's measure dF of mass f, w² = σ²T and bT = rT - qT spread evenly over the time to expiry.
/// </summary>
public readonly struct GeometricAsianTerms
{
    /// <summary>Numbers that <see cref="CopyTo"/> writes.</summary>
    public const int NumberCount = 6;

    private GeometricAsianTerms(double spot0, double strike, bool isCall, double open, double known, double meanTime, double variance)
    {
        Sign = isCall ? 1.0 : -1.0;
        SignedStrike = Sign * TermRange.Positive(strike, nameof(strike));
        double logSpot = LogRatio.Of(TermRange.Positive(spot0, nameof(spot0)), strike);
        // Logarithms are taken to the strike, so that an average that sits at it leaves nothing to cancel.
        LogMoneyness = Math.FusedMultiplyAdd(open, logSpot, known);
        Exponent = open;
        MeanTime = meanTime;
        RootVariance = Math.Sqrt(variance);
    }

    /// <summary>+1 call, -1 put.</summary>
    internal double Sign { get; }

    /// <summary>±K.</summary>
    internal double SignedStrike { get; }

    /// <summary>ln of the average over the strike, where every open fixing came out at S₀.</summary>
    internal double LogMoneyness { get; }

    /// <summary>f, the power of S in the average.</summary>
    internal double Exponent { get; }

    /// <summary>t̄, in times to expiry.</summary>
    internal double MeanTime { get; }

    /// <summary>√v: the average's deviation is this times w.</summary>
    internal double RootVariance { get; }

    /// <summary>An average of fixings of equal weight.</summary>
    /// <param name="spot0">Underlying today, S₀; positive. Scenarios give ln(S/S₀).</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="years">T, time to expiry; 0 or more.</param>
    /// <param name="fixingYears">Times to the open fixings, ascending, from 0 (the scenario's own level) to T.</param>
    /// <param name="pastFixings">Levels already fixed; positive.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or outside its range.</exception>
    /// <exception cref="ArgumentException">There is no fixing, or the open ones are not ascending within [0, T]; the message names the place.</exception>
    public static GeometricAsianTerms Discrete(
        double spot0, double strike, double years, IReadOnlyList<double> fixingYears, IReadOnlyList<double> pastFixings, bool isCall)
    {
        TermRange.NotNegative(years, nameof(years));
        TermRange.Positive(strike, nameof(strike));
        int count = fixingYears.Count + pastFixings.Count;
        if (count == 0)
            throw new ArgumentException("There is no fixing; an average needs one at least.", nameof(fixingYears));
        double known = 0.0, total = 0.0, square = 0.0, last = 0.0;
        foreach (double level in pastFixings)
            known += LogRatio.Of(TermRange.Positive(level, nameof(pastFixings)), strike);
        for (int i = 0; i < fixingYears.Count; i++)
        {
            double time = fixingYears[i];
            if (!(time >= last && time <= years))
                throw new ArgumentException($"Fixing {i} is at {time} years; it must lie between {last} and {years}.", nameof(fixingYears));
            total += time;
            // Among the pairs with the later ones and itself this time is the lesser: 2(n - i) - 1 of them in both orders.
            square = Math.FusedMultiplyAdd(time, (2.0 * (fixingYears.Count - i)) - 1.0, square);
            last = time;
        }

        double perYear = years > 0.0 ? 1.0 / years : 0.0;
        return new(spot0, strike, isCall, (double)fixingYears.Count / count, known / count, total / count * perYear, square / count / count * perYear);
    }

    /// <summary>A continuous average from <paramref name="startYears"/> to the expiry (Kemna and Vorst 1990).</summary>
    /// <param name="spot0">Underlying today, S₀; positive. Scenarios give ln(S/S₀).</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="years">T, time to expiry; 0 or more.</param>
    /// <param name="startYears">Time to the average's first moment, T at most; negative where it has begun.</param>
    /// <param name="pastAverage">The geometric average from then until now; positive. Not read where the average has not begun.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or outside its range.</exception>
    public static GeometricAsianTerms Continuous(double spot0, double strike, double years, double startYears, double pastAverage, bool isCall)
    {
        TermRange.NotNegative(years, nameof(years));
        TermRange.Positive(strike, nameof(strike));
        if (TermRange.Finite(startYears, nameof(startYears)) > years)
            throw new ArgumentOutOfRangeException(nameof(startYears), startYears, $"startYears is {startYears}; it must be the {years} years to expiry at most.");
        if (startYears >= 0.0)
        {
            double start = years > 0.0 ? startYears / years : 0.0;
            return new(spot0, strike, isCall, 1.0, 0.0, 0.5 * (1.0 + start), start + ((1.0 - start) / 3.0));
        }

        double open = years / (years - startYears);
        double known = (1.0 - open) * LogRatio.Of(TermRange.Positive(pastAverage, nameof(pastAverage)), strike);
        return new(spot0, strike, isCall, open, known, 0.5 * open, open * open / 3.0);
    }

    /// <summary>Every number that a value depends on, in a fixed order: what a content hash of a book is made of.</summary>
    /// <param name="numbers">At least <see cref="NumberCount"/> elements.</param>
    public void CopyTo(Span<double> numbers)
    {
        Spans.RequireRoom(NumberCount, numbers.Length, nameof(numbers));
        (numbers[0], numbers[1], numbers[2]) = (Sign, SignedStrike, LogMoneyness);
        (numbers[3], numbers[4], numbers[5]) = (Exponent, MeanTime, RootVariance);
    }
}
