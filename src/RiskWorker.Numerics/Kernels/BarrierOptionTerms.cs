namespace RiskWorker.Numerics.Kernels;

/// <summary>What of a single-barrier option no scenario moves, its logarithms included, mirrored so that the barrier lies below.</summary>
public readonly struct BarrierOptionTerms
{
    /// <summary>-ζ(½)/√(2π): how far, in σ√Δt, a barrier looked at every Δt lies beyond the continuous one that is hit as often.</summary>
    public const double ContinuityCorrection = 0.5825971579390107;

    /// <summary>Numbers that <see cref="CopyTo"/> writes.</summary>
    public const int NumberCount = 9;

    /// <param name="spot0">Underlying today, S₀; positive. Scenarios give ln(S/S₀).</param>
    /// <param name="strike">K; positive.</param>
    /// <param name="barrier">H; positive.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <param name="isUp">Hit from below, else from above.</param>
    /// <param name="isIn">Lives once hit, else dies once hit.</param>
    /// <param name="rebate">R, 0 or more: paid at the hit by a knock-out, at expiry by a knock-in that was never hit.</param>
    /// <param name="years">T, the time that the scenarios' totals are over; only the correction reads it.</param>
    /// <param name="observationSpacing">
    /// Years between two looks at the barrier, 0 for every moment. Above 0 the barrier is moved away by e^(±βσ√Δt), β =
    /// <see cref="ContinuityCorrection"/> (Broadie, Glasserman and Kou 1997), with each scenario's own σ.
    /// </param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or outside its range.</exception>
    public BarrierOptionTerms(
        double spot0, double strike, double barrier, bool isCall, bool isUp, bool isIn, double rebate = 0.0, double years = 0.0, double observationSpacing = 0.0)
    {
        TermRange.Positive(spot0, nameof(spot0));
        Strike = TermRange.Positive(strike, nameof(strike));
        Barrier = TermRange.Positive(barrier, nameof(barrier));
        Rebate = TermRange.NotNegative(rebate, nameof(rebate));
        TermRange.NotNegative(years, nameof(years));
        TermRange.NotNegative(observationSpacing, nameof(observationSpacing));
        Side = isUp ? -1.0 : 1.0;
        Sign = isCall ? 1.0 : -1.0;
        IsIn = isIn;
        StrikeGap = Side * LogRatio.Of(spot0, strike);
        BarrierGap = Side * LogRatio.Of(spot0, barrier);
        Shift = years > 0.0 ? ContinuityCorrection * Math.Sqrt(observationSpacing / years) : 0.0;
    }

    /// <summary>+1 where the barrier lies below (down), -1 where it lies above.</summary>
    internal double Side { get; }

    /// <summary>+1 call, -1 put.</summary>
    internal double Sign { get; }

    /// <summary>Knock-in, else knock-out.</summary>
    internal bool IsIn { get; }

    /// <summary>The payoff's far end is the barrier itself: an up call or a down put.</summary>
    internal bool IsReverse => Side != Sign;

    /// <summary>K.</summary>
    internal double Strike { get; }

    /// <summary>H.</summary>
    internal double Barrier { get; }

    /// <summary>R.</summary>
    internal double Rebate { get; }

    /// <summary>±ln(S₀/K).</summary>
    internal double StrikeGap { get; }

    /// <summary>±ln(S₀/H): 0 or less where today's level has touched.</summary>
    internal double BarrierGap { get; }

    /// <summary>β√(Δt/T): times w, the logarithm by which the barrier is moved away.</summary>
    internal double Shift { get; }

    /// <summary>Every number that a value depends on, in a fixed order: what a content hash of a book is made of.</summary>
    /// <param name="numbers">At least <see cref="NumberCount"/> elements.</param>
    public void CopyTo(Span<double> numbers)
    {
        Spans.RequireRoom(NumberCount, numbers.Length, nameof(numbers));
        (numbers[0], numbers[1], numbers[2], numbers[3], numbers[4]) = (Side, Sign, IsIn ? 1.0 : 0.0, Strike, Barrier);
        (numbers[5], numbers[6], numbers[7], numbers[8]) = (Rebate, StrikeGap, BarrierGap, Shift);
    }
}
