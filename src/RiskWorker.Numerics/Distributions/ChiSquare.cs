using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Distributions;

/// <summary>
/// Tails and quantiles of the χ² distribution with real degrees of freedom, in the project's own arithmetic. Relative error of a tail below
/// 5e-14 at 2.05 to 200 degrees of freedom, against fifty digits, down to tails of 1e-60 (measured at 1,500 points).
/// </summary>
/// <remarks>
/// A quantile is found by Newton's method on the logarithm of its own, smaller tail, which is concave: in ln x from below for the lower
/// tail, in x from above (after one step) for the upper, so that it converges from anywhere without a bracket.
/// </remarks>
public static class ChiSquare
{
    /// <summary>Fewest degrees of freedom of a quantile.</summary>
    public const double FewestDegrees = 2.0;

    /// <summary>Most degrees of freedom.</summary>
    public const double MostDegrees = 1e4;

    private const double SmallestTail = 1e-100;
    private const double Converged = 1e-9;
    private const int MostSteps = 100;

    /// <summary>P(χ² ≤ x).</summary>
    /// <param name="nu">Degrees of freedom, above 0 and up to 10,000.</param>
    /// <param name="x">Any number; a NaN is refused.</param>
    public static double LowerTail(double nu, double x) => IncompleteGamma.Lower(Half(nu, 0.0), 0.5 * TermRange.Finite(x, nameof(x)));

    /// <summary>P(χ² &gt; x).</summary>
    /// <param name="nu">Degrees of freedom, above 0 and up to 10,000.</param>
    /// <param name="x">Any number; a NaN is refused.</param>
    public static double UpperTail(double nu, double x) => IncompleteGamma.Upper(Half(nu, 0.0), 0.5 * TermRange.Finite(x, nameof(x)));

    /// <summary>The x with P(χ² ≤ x) = p.</summary>
    /// <param name="nu">Degrees of freedom, 2 to 10,000.</param>
    /// <param name="p">1e-100 to 0.5; above, ask <see cref="UpperQuantile"/> for 1 - p.</param>
    /// <exception cref="ArgumentOutOfRangeException">An argument lies outside its range.</exception>
    public static double LowerQuantile(double nu, double p)
    {
        double a = Half(nu, FewestDegrees), target = Logarithm.Of(Tail(p, nameof(p)));
        // P(a, x) < x^a/Γ(a + 1): that power's own quantile lies below, Wilson and Hilferty's about, the one wanted.
        double power = Exponential.Of((target + LogGamma.Of(a + 1.0)) / a);
        double x = Math.Max(power, WilsonHilferty(a, InverseNormal.Of(p)));
        for (int step = 0; step < MostSteps; step++)
        {
            double lower = IncompleteGamma.Lower(a, x);
            double move = (target - Logarithm.Of(lower)) * lower / (a * IncompleteGamma.Factor(a, x));
            x *= Exponential.Of(move);
            if (Math.Abs(move) < Converged)
                break;
        }

        return 2.0 * x;
    }

    /// <summary>The x with P(χ² &gt; x) = q.</summary>
    /// <param name="nu">Degrees of freedom, 2 to 10,000.</param>
    /// <param name="q">1e-100 to 0.5; above, ask <see cref="LowerQuantile"/> for 1 - q.</param>
    /// <exception cref="ArgumentOutOfRangeException">An argument lies outside its range.</exception>
    public static double UpperQuantile(double nu, double q)
    {
        double a = Half(nu, FewestDegrees), target = Logarithm.Of(Tail(q, nameof(q)));
        double x = WilsonHilferty(a, -InverseNormal.Of(q));
        for (int step = 0; step < MostSteps; step++)
        {
            double upper = IncompleteGamma.Upper(a, x);
            double move = (Logarithm.Of(upper) - target) * upper / (a * IncompleteGamma.Factor(a, x));
            x = Math.FusedMultiplyAdd(move, x, x);
            if (Math.Abs(move) < Converged)
                break;
        }

        return 2.0 * x;
    }

    private static double WilsonHilferty(double a, double z)
    {
        double root = Math.Max(1.0 - (1.0 / (9.0 * a)) + (z / (3.0 * Math.Sqrt(a))), 0.0);
        return a * root * root * root;
    }

    private static double Half(double nu, double fewest)
    {
        if (!(nu >= fewest && nu > 0.0 && nu <= MostDegrees))
            throw new ArgumentOutOfRangeException(nameof(nu), nu, $"There are {nu} degrees of freedom; there must be {fewest} to {MostDegrees}, and more than 0.");
        return 0.5 * nu;
    }

    private static double Tail(double mass, string name)
    {
        if (!(mass is >= SmallestTail and <= 0.5))
            throw new ArgumentOutOfRangeException(name, mass, $"The tail holds {mass}; it must hold {SmallestTail} to 0.5.");
        return mass;
    }
}
