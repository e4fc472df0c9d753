using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Options;

/// <summary>
/// An American call or put on a log-normal underlying with continuous rate r and carry yield q. The exercise boundary is found
/// once; a value at any spot then costs one quadrature.
/// </summary>
/// <remarks>
/// <para>A call is the put with strike and spot, rate and yield exchanged: C(S, K, r, q) = (S/K) P(K²/S, K, q, r) (McDonald and
/// Schroder 1998). The put's cases:
/// one boundary (r &gt; 0, or r = 0 with q &lt; 0): Kim's equation, <see cref="ExerciseBoundary"/>;
/// never exercised early (r ≤ 0 and q ≥ r, r = q = 0 included): the European value;
/// two boundaries (q &lt; r &lt; 0), or a volatility lost beside the drift: a binomial lattice;
/// v√T below 1e-9: the best time of a deterministic path; no time left: the intrinsic value.</para>
/// <para>A value is never below the European one nor below exercise. Arithmetic, roots and the kernels alone: the same bits on
/// every machine. Instances are immutable and may be shared between threads.</para>
/// </remarks>
public sealed class AmericanOption
{
    private const double SmallestDeviation = 1e-9;
    private readonly bool isCall;
    private readonly double strike;
    private readonly (double Years, double Rate, double Yield) put;
    private readonly EuropeanOptionTerms european;
    private readonly ExerciseBoundary? boundary;
    private readonly ExerciseLattice? lattice;
    private readonly bool isCertain;

    /// <param name="strike">K; positive.</param>
    /// <param name="years">Time to expiry; 0 gives the intrinsic value.</param>
    /// <param name="volatility">Per root year, 0 or more.</param>
    /// <param name="rate">r, continuously compounded.</param>
    /// <param name="carryYield">q, continuously compounded: dividends, the foreign rate, or r on a futures price.</param>
    /// <param name="isCall">Call, else put.</param>
    /// <exception cref="ArgumentOutOfRangeException">A term is not finite or outside its range.</exception>
    public AmericanOption(double strike, double years, double volatility, double rate, double carryYield, bool isCall)
    {
        if (!double.IsFinite(carryYield))
            throw new ArgumentOutOfRangeException(nameof(carryYield), carryYield, $"carryYield is {carryYield}; it must be finite.");
        if (!(strike > 0.0) || double.IsInfinity(strike))
            throw new ArgumentOutOfRangeException(nameof(strike), strike, $"strike is {strike}; it must be positive and finite.");
        if (!double.IsFinite(rate))
            throw new ArgumentOutOfRangeException(nameof(rate), rate, $"rate is {rate}; it must be finite.");
        (this.isCall, this.strike) = (isCall, strike);
        put = isCall ? (years, carryYield, rate) : (years, rate, carryYield);
        european = new EuropeanOptionTerms(1.0, 1.0, years, volatility, put.Rate, put.Rate - put.Yield, false);
        isCertain = volatility * Math.Sqrt(years) < SmallestDeviation;
        if (isCertain)
            return;
        if (put.Rate > 0.0 || (put.Rate == 0.0 && put.Yield < 0.0))
            boundary = ExerciseBoundary.Find(years, volatility, put.Rate, put.Yield);
        if (boundary is null && (put.Rate > 0.0 || put.Yield < put.Rate))
            lattice = new ExerciseLattice(years, volatility, put.Rate, put.Yield);
    }

    /// <summary>
    /// The spot at which it is best exercised today: at or below it for a put, at or above it for a call; null where there is no one such spot.
    /// A table of values should begin here: on the other side of it the value is exercise, on this side it is analytic.
    /// </summary>
    public double? ExerciseSpot => boundary is null ? null : isCall ? strike / boundary.Lowest : strike * boundary.Lowest;

    /// <summary>Value of one unit.</summary>
    /// <param name="spot">The underlying, positive.</param>
    /// <exception cref="ArgumentOutOfRangeException">The spot is not positive and finite.</exception>
    public double Value(double spot)
    {
        if (!(spot > 0.0) || double.IsInfinity(spot))
            throw new ArgumentOutOfRangeException(nameof(spot), spot, $"spot is {spot}; it must be positive and finite.");
        return isCall ? spot * Put(strike / spot) : strike * Put(spot / strike);
    }

    /// <summary>Values of one unit at many spots.</summary>
    /// <param name="spots">The underlying, positive.</param>
    /// <param name="values">As long as <paramref name="spots"/>; may be the same memory.</param>
    /// <exception cref="ArgumentException">The spans differ in length, or a spot is not positive and finite.</exception>
    public void Value(ReadOnlySpan<double> spots, Span<double> values)
    {
        if (values.Length != spots.Length)
            throw new ArgumentException($"values has {values.Length} elements; it must have {spots.Length}.", nameof(values));
        for (int i = 0; i < spots.Length; i++)
            values[i] = Value(spots[i]);
    }

    /// <summary>The put of strike 1.</summary>
    private double Put(double spot)
    {
        if (isCertain)
            return DeterministicExercise.PutValue(spot, put.Years, put.Rate, put.Yield);
        double exercised = 1.0 - spot;
        if (spot <= boundary?.Lowest)
            return exercised;
        double logSpot = Logarithm.Of(spot), held = EuropeanOption.Value(european, logSpot, spot);
        double kept = lattice is not null ? Math.Max(held, lattice.Value(spot, logSpot)) : held;
        if (boundary is not null)
            kept += Math.Max(boundary.Premium(spot, logSpot), 0.0);
        return Math.Max(kept, exercised);
    }
}
