using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Twice the logarithm of likelihood ratios of exceptions, with 0 ln 0 = 0; never below 0.</summary>
internal static class LikelihoodRatios
{
    /// <summary>The observed share against <paramref name="expected"/> (Kupiec 1995).</summary>
    public static double Failures(int days, int exceptions, double expected) =>
        AtLeastZero(-2 * (LogLikelihood(days - exceptions, exceptions, expected) - LogLikelihood(days - exceptions, exceptions, (double)exceptions / days)));

    /// <summary>A wait of <paramref name="day"/> days for one exception against <paramref name="expected"/> (Kupiec 1995; each wait of Haas 2001).</summary>
    public static double FirstFailure(int day, double expected) => Failures(day, 1, expected);

    /// <summary>One probability for each kind of day before against one for all (Christoffersen 1998).</summary>
    public static double Independence(TransitionCounts n)
    {
        var together = LogLikelihood(n.Stayed + n.Rose, n.Fell + n.Again, (double)(n.Fell + n.Again) / n.Total);
        return AtLeastZero(-2 * (together - LogLikelihood(n.Stayed, n.Fell, Share(n.Fell, n.Stayed)) - LogLikelihood(n.Rose, n.Again, Share(n.Again, n.Rose))));
    }

    private static double Share(int of, int others) => of == 0 ? 0 : (double)of / (of + others);

    private static double LogLikelihood(int without, int with, double probability) =>
        (without == 0 ? 0 : without * Logarithm.Of(1 - probability)) + (with == 0 ? 0 : with * Logarithm.Of(probability));

    // Rounding may leave a little less than nothing.
    private static double AtLeastZero(double ratio) => Math.Max(ratio, 0);
}

/// <summary>Days after a day: without exception after one without, with after without, without after with, with after with.</summary>
internal readonly record struct TransitionCounts(int Stayed, int Fell, int Rose, int Again)
{
    public int Total => Stayed + Fell + Rose + Again;

    public static TransitionCounts Of(IReadOnlyList<bool> exceptions)
    {
        Span<int> counts = stackalloc int[4];
        for (var t = 1; t < exceptions.Count; t++) counts[(exceptions[t - 1] ? 2 : 0) + (exceptions[t] ? 1 : 0)]++;
        return new(counts[0], counts[1], counts[2], counts[3]);
    }
}
