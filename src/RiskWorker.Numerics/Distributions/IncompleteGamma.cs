using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Distributions;

/// <summary>
/// The regularised incomplete gamma functions P(a, x) and Q(a, x) = 1 - P(a, x): the series of P below x = a + 1, the continued fraction
/// of Q above, by the algorithm of Lentz (Abramowitz and Stegun, 6.5.29 and 6.5.31; Thompson and Barnett 1986).
/// </summary>
/// <remarks>
/// Their common factor x^a e^(-x)/Γ(a + 1) is taken in C. Loader's form (2000), where nothing large cancels.
/// </remarks>
internal static class IncompleteGamma
{
    private const double Negligible = 1e-17;
    private const double Converged = 2e-16;
    private const int MostTerms = 20_000;

    /// <summary>P(a, x).</summary>
    public static double Lower(double a, double x) => x <= 0.0 ? 0.0 : x < a + 1.0 ? Factor(a, x) * Series(a, x) : 1.0 - (Factor(a, x) * Fraction(a, x));

    /// <summary>Q(a, x).</summary>
    public static double Upper(double a, double x) => x <= 0.0 ? 1.0 : x < a + 1.0 ? 1.0 - (Factor(a, x) * Series(a, x)) : Factor(a, x) * Fraction(a, x);

    /// <summary>x^a e^(-x)/Γ(a + 1): x/a times the density.</summary>
    public static double Factor(double a, double x) =>
        Exponential.Of(-(Deviance(a, x) + LogGamma.StirlingRemainder(a))) / Math.Sqrt(2.0 * Math.PI * a);

    /// <summary>a ln(a/x) + x - a, 0 at x = a, in full precision about it.</summary>
    private static double Deviance(double a, double x)
    {
        double v = (a - x) / (a + x);
        if (Math.Abs(v) >= 0.1)
            return Math.FusedMultiplyAdd(a, Logarithm.Of(a / x), x - a);
        double square = v * v, power = 2.0 * a * v, sum = (a - x) * v;
        for (int k = 3; k < 60; k += 2)
        {
            power *= square;
            double next = sum + (power / k);
            if (next == sum)
                break;
            sum = next;
        }

        return sum;
    }

    private static double Series(double a, double x)
    {
        double term = 1.0, sum = 1.0;
        for (int n = 1; n < MostTerms && term > Negligible * sum; n++)
        {
            term *= x / (a + n);
            sum += term;
        }

        return sum;
    }

    private static double Fraction(double a, double x)
    {
        double b = x + 1.0 - a, c = 1e300, d = 1.0 / b, product = d;
        for (int n = 1; n < MostTerms; n++)
        {
            double numerator = n * (a - n);
            b += 2.0;
            d = 1.0 / Math.FusedMultiplyAdd(numerator, d, b);
            c = b + (numerator / c);
            double ratio = c * d;
            product *= ratio;
            if (Math.Abs(ratio - 1.0) <= Converged)
                break;
        }

        return a * product;
    }
}
