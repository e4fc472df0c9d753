namespace RiskWorker.Benchmarks.Quality;

/// <summary>The largest distance of an empirical distribution from the uniform one on (0, 1).</summary>
internal static class KolmogorovSmirnov
{
    /// <summary>Probability of a distance at least as large, by Kolmogorov's limit with Stephens's correction for n (J. R. Statist. Soc. B 32, 1970). Sorts the sample.</summary>
    public static double PValue(Span<double> sample)
    {
        sample.Sort();
        double n = sample.Length, distance = 0;
        for (var i = 0; i < sample.Length; i++) distance = Math.Max(distance, Math.Max(((i + 1) / n) - sample[i], sample[i] - (i / n)));
        return BeyondLimit(distance * (Math.Sqrt(n) + 0.12 + (0.11 / Math.Sqrt(n))));
    }

    /// <summary>2 Σ (-1)^(k-1) exp(-2 k² x²); below x = 0.27 it is 1 to 9 digits, and the series does not converge.</summary>
    private static double BeyondLimit(double x)
    {
        if (x < 0.27) return 1;
        double sum = 0, sign = 1;
        for (var k = 1; k <= 100; k++, sign = -sign) sum += sign * Math.Exp(-2.0 * k * k * x * x);
        return Math.Clamp(2 * sum, 0, 1);
    }
}
