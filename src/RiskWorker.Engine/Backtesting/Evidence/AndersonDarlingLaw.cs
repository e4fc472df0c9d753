using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// The law of Anderson and Darling's statistic of n independent uniforms: the limit law by its series, and what a finite n adds to it.
/// G. Marsaglia and J. Marsaglia, Evaluating the Anderson-Darling distribution (Journal of Statistical Software, 2004).
/// </summary>
/// <remarks>What n adds was fitted to simulations and is good to about 2e-6: tails below <see cref="SmallestCorrected"/> are the limit law's alone.</remarks>
internal static class AndersonDarlingLaw
{
    /// <summary>The smallest tail that the correction for finite n is applied to.</summary>
    public const double SmallestCorrected = 1e-4;

    private const double NoMoreThan = 150;   // e^-150 adds nothing
    private const double SeriesEnds = 30;    // the series' own rounding is larger than the tail beyond

    /// <summary>P(A² ≥ <paramref name="statistic"/>) for <paramref name="days"/> days.</summary>
    public static double AtLeast(int days, double statistic)
    {
        if (statistic <= 0) return 1;
        // The tail of the largest of the chi-square parts, with the others' expectation: √3 P(|N| ≥ √(2z)).
        if (statistic > SeriesEnds) return Math.Sqrt(3) * 2 * NormalCdf.Of(-Math.Sqrt(2 * statistic));
        var limit = Limit(statistic);
        var tail = 1 - limit;
        return tail < SmallestCorrected ? Math.Max(tail, 0) : Math.Clamp(tail - Correction(days, limit), 0, 1);
    }

    /// <summary>P(A² &lt; z) as n grows (T. W. Anderson and D. A. Darling, A test of goodness of fit, 1954).</summary>
    internal static double Limit(double z)
    {
        if (z < 0.01) return 0;
        var ratio = 1 / z;
        var sum = ratio * Term(z, 0);
        for (var j = 1; j < 100; j++)
        {
            ratio *= (0.5 - j) / j;
            var next = sum + (((4 * j) + 1) * ratio * Term(z, j));
            if (next == sum) break;
            sum = next;
        }
        return sum;
    }

    private static double Term(double z, int j)
    {
        var t = ((4 * j) + 1.0) * ((4 * j) + 1.0) * 1.23370055013617 / z; // π²/8
        if (t > NoMoreThan) return 0;
        var a = 2.22144146907918 * Exponential.Of(-t) / Math.Sqrt(t); // π/√2
        var b = 3.93740248643060 * 2 * NormalCdf.Of(-Math.Sqrt(2 * t)); // (π/2)^(3/2) √2
        var r = z * 0.125;
        var f = a + (b * r);
        for (var i = 1; i < 200; i++)
        {
            var c = (((i - 0.5 - t) * b) + (t * a)) / i;
            (a, b) = (b, c);
            r *= z / ((8 * i) + 8);
            if (Math.Abs(r) < 1e-40 || Math.Abs(c) < 1e-40) return f;
            var next = f + (c * r);
            if (next == f) return f;
            f = next;
        }
        return f;
    }

    // The published fit, in three pieces.
    private static double Correction(int n, double x)
    {
        if (x > 0.8) return (-130.2137 + ((745.2337 - ((1705.091 - ((1950.646 - ((1116.360 - (255.7844 * x)) * x)) * x)) * x)) * x)) / n;
        var c = 0.01265 + (0.1757 / n);
        if (x < c)
        {
            var s = x / c;
            s = Math.Sqrt(s) * (1 - s) * ((49 * s) - 102);
            return s * ((0.0037 / ((double)n * n)) + (0.00078 / n) + 0.00006) / n;
        }
        var t = (x - c) / (0.8 - c);
        t = -0.00022633 + ((6.54034 - ((14.6538 - ((14.458 - ((8.259 - (1.91864 * t)) * t)) * t)) * t)) * t);
        return t * (0.04213 + (0.01365 / n)) / n;
    }
}
