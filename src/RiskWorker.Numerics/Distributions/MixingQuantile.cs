using RiskWorker.Numerics.Interpolation;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Distributions;

/// <summary>
/// The inverse distribution function of W = ν/χ²_ν, whose root times a normal is a Student-t variate with ν degrees of freedom
/// (McNeil, Frey and Embrechts, Quantitative Risk Management, 2015, section 6.2): a table of ln W in the normal score of u.
/// </summary>
/// <remarks>
/// <para>
/// W is cut at its upper 1e-7 quantile, <see cref="Cap"/>: at few degrees of freedom a uniform within rounding of 1 would otherwise make a
/// day of any size. <see cref="Mean"/> says what the cut takes off the variance; with ν near 2 that is most of it.
/// </para>
/// <para>
/// Built from χ² quantiles in the project's own arithmetic, the same bits on every machine. Relative error of W from u = 1e-16 (smaller u
/// count as that) up to the cut, against fifty digits: below 1e-13 at ν = 2.05 and 2e-14 from 2.5 to 200 (measured at 1,500 points).
/// </para>
/// </remarks>
public sealed class MixingQuantile
{
    /// <summary>The mass above the cut.</summary>
    public const double CutProbability = 1e-7;

    /// <summary>Fewest degrees of freedom: at 2 the variance ends.</summary>
    public const double FewestDegrees = 2.01;

    /// <summary>Most degrees of freedom.</summary>
    public const double MostDegrees = 1000.0;

    private const double LowestScore = -8.25; // Φ(-8.25) = 8e-17

    private readonly PiecewisePolynomial logarithm;

    /// <param name="nu">Degrees of freedom ν, 2.01 to 1,000.</param>
    /// <exception cref="ArgumentOutOfRangeException">They lie outside.</exception>
    public MixingQuantile(double nu)
    {
        if (!(nu is >= FewestDegrees and <= MostDegrees))
            throw new ArgumentOutOfRangeException(nameof(nu), nu, $"There are {nu} degrees of freedom; there must be {FewestDegrees} to {MostDegrees}.");
        DegreesOfFreedom = nu;
        double smallest = ChiSquare.LowerQuantile(nu, CutProbability);
        Cap = nu / smallest;
        Mean = (UncutMean * IncompleteGamma.Upper((0.5 * nu) - 1.0, 0.5 * smallest)) + (CutProbability * Cap);
        logarithm = new(LogAtScore, LowestScore, -InverseNormal.Of(CutProbability));
    }

    /// <summary>ν.</summary>
    public double DegreesOfFreedom { get; }

    /// <summary>The largest value: the quantile at 1 - <see cref="CutProbability"/>.</summary>
    public double Cap { get; }

    /// <summary>E[min(W, cap)] = ν/(ν-2) Q(ν/2 - 1, ν/(2 cap)) + 1e-7 cap.</summary>
    public double Mean { get; }

    /// <summary>E[W] = ν/(ν-2).</summary>
    public double UncutMean => DegreesOfFreedom / (DegreesOfFreedom - 2.0);

    /// <summary>W at one u in (0, 1); an end counts as the nearest number inside, a number outside [0, 1] gives NaN.</summary>
    public double Of(double u)
    {
        double w = Exponential.Of(logarithm.Of(InverseNormal.Of(u)));
        return w > Cap ? Cap : w;
    }

    /// <summary>w[i] = W(u[i]); allocates nothing.</summary>
    /// <param name="u">Uniforms.</param>
    /// <param name="w">As long as <paramref name="u"/>; may be the same memory, and may not overlap it otherwise.</param>
    /// <exception cref="ArgumentException">The spans differ in length or overlap in part.</exception>
    [ScalarTwin(nameof(Of))]
    public void Of(ReadOnlySpan<double> u, Span<double> w)
    {
        Spans.RequireLength(u.Length, w.Length, nameof(w));
        InverseNormal.Of(u, w);
        logarithm.Of(w, w);
        Exponential.Of(w, w);
        Ceiling.Apply(Cap, w);
    }

    // u = Φ(z) is the mass of χ² above ν/W: the smaller of the two tails is asked for.
    private double LogAtScore(double z)
    {
        double tail = NormalCdf.Of(-Math.Abs(z));
        double square = z > 0.0 ? ChiSquare.LowerQuantile(DegreesOfFreedom, tail) : ChiSquare.UpperQuantile(DegreesOfFreedom, tail);
        return Logarithm.Of(DegreesOfFreedom / square);
    }
}
