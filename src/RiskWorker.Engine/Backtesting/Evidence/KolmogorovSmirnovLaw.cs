using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>The law of the largest distance D of the empirical distribution of n independent uniforms from the uniform one.</summary>
/// <remarks>
/// Up to <see cref="MostDays"/> days from the probability that a Poisson process, given n events, keeps between the two boundaries, carried
/// from corner to corner (A. Moscovich and B. Nadler, Fast calculation of boundary crossing probabilities for Poisson processes, 2017):
/// every term is positive. Where n D² is above 4 twice the one-sided tail (N. Smirnov 1944), which is then too large by less than one
/// part in 10^10 (R. Simard and P. L'Ecuyer, Computing the two-sided Kolmogorov-Smirnov distribution, 2011). With more days the limit
/// law, D moved by 1/(6n) (J. Vrbik 2018).
/// </remarks>
public static class KolmogorovSmirnovLaw
{
    /// <summary>Most days for which the law is exact throughout.</summary>
    public const int MostDays = 2000;

    private const double FarTail = 4;
    private const double Negligible = 1e-19;

    /// <summary>P(D ≥ <paramref name="distance"/>) for <paramref name="days"/> days, at least 1.</summary>
    public static double AtLeast(int days, double distance)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(days, 1);
        if (distance <= 0.5 / days) return 1;
        if (distance >= 1) return 0;
        if (days * distance * distance > FarTail) return Math.Min(2 * OneSided(days, distance), 1);
        return days <= MostDays ? Math.Clamp(1 - Below(days, distance), 0, 1) : Limit(Math.Sqrt(days) * (distance + (1 / (6.0 * days))));
    }

    /// <summary>P(sup of a Brownian bridge's absolute value ≥ <paramref name="x"/>) = 2 Σ (-1)^(k-1) e^(-2k²x²) (A. Kolmogorov 1933), for x above 0.2.</summary>
    internal static double Limit(double x)
    {
        var (sum, sign) = (0.0, 2.0);
        for (var k = 1; k < 100; k++, sign = -sign)
        {
            var term = Exponential.Of(-2 * k * k * x * x);
            if (term < 1e-20) break;
            sum += sign * term;
        }
        return Math.Clamp(sum, 0, 1);
    }

    /// <summary>P(D⁺ ≥ d) = d Σ C(n, j) (d + j/n)^(j-1) (1 - d - j/n)^(n-j), j up to n (1 - d).</summary>
    private static double OneSided(int n, double d)
    {
        var (sum, all) = (0.0, LogGamma.Of(n + 1.0));
        for (var j = 0; j <= n * (1 - d); j++)
        {
            var (up, down) = (d + ((double)j / n), 1 - d - ((double)j / n));
            if (down <= 0) break;
            var ways = all - LogGamma.Of(j + 1.0) - LogGamma.Of(n - j + 1.0);
            sum += Exponential.Of(ways + ((j - 1) * Logarithm.Of(up)) + ((n - j) * Logarithm.Of(down)));
        }
        return d * sum;
    }

    /// <summary>P(D &lt; d): the count of uniforms up to t stays below i before i/n - d, and reaches i by (i - 1)/n + d.</summary>
    private static double Below(int n, double d)
    {
        var (states, steps) = (new double[n + 1], new double[n + 1]);
        states[0] = 1;
        var (lowest, highest, time) = (0, Math.Min((int)Math.Floor(n * d), n), 0.0);
        while (true)
        {
            var rises = highest < n ? ((highest + 1.0) / n) - d : 1;
            var falls = lowest < n ? ((double)lowest / n) + d : 1;
            var next = Math.Min(Math.Min(rises, falls), 1);
            Carry(states, steps, lowest, highest, Math.Max(next - time, 0) * n);
            if (next >= 1) break;
            time = next;
            if (rises <= falls) highest++; else states[lowest++] = 0;
        }
        return states[n] / PoissonOfItsMean(n);
    }

    // New events in a span of the process with that mean, state by state from the highest.
    private static void Carry(double[] states, double[] steps, int lowest, int highest, double mean)
    {
        var count = 0;
        for (var p = Exponential.Of(-mean); count <= highest - lowest; p *= mean / count)
        {
            steps[count++] = p;
            if (p < Negligible && count > mean) break;
        }
        for (var j = highest; j >= lowest; j--)
        {
            var sum = 0.0;
            var most = Math.Min(count, j - lowest + 1);
            for (var m = 0; m < most; m++) sum = Math.FusedMultiplyAdd(states[j - m], steps[m], sum);
            states[j] = sum;
        }
    }

    /// <summary>n^n e^(-n) / n!, by Stirling's series once it is good to all digits.</summary>
    private static double PoissonOfItsMean(int n)
    {
        if (n < 15)
        {
            var product = Exponential.Of(-n);
            for (var k = 1; k <= n; k++) product *= (double)n / k;
            return product;
        }
        var (inverse, square) = (1.0 / n, 1.0 / ((double)n * n));
        var remainder = inverse * ((1 / 12.0) - (square * ((1 / 360.0) - (square * ((1 / 1260.0) - (square * ((1 / 1680.0) - (square / 1188.0))))))));
        return Exponential.Of(-remainder) / Math.Sqrt(2 * Math.PI * n);
    }
}
