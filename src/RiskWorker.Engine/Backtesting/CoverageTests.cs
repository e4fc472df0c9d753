using MathNet.Numerics.Distributions;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting;

/// <summary>
/// Likelihood-ratio tests of a series of exceptions. P. Kupiec, Techniques for verifying the accuracy of risk measurement models (Journal of
/// Derivatives, 1995); P. Christoffersen, Evaluating interval forecasts (International Economic Review, 1998).
/// </summary>
/// <remarks>An end product: the law comes from a library, and what it gives is rounded to 12 significant digits.</remarks>
public static class CoverageTests
{
    /// <summary>Whether exceptions are as frequent as 1 - confidence: chi-square with 1 degree of freedom; null without days.</summary>
    public static TestResult? Coverage(IReadOnlyList<bool> exceptions, Confidence confidence) =>
        exceptions.Count == 0 ? null : Result(CoverageRatio(exceptions.Count, exceptions.Count(e => e), (double)(1 - confidence.Level)), 1);

    /// <summary>Whether an exception makes another one on the next day more or less likely: chi-square with 1 degree of freedom; null below two days.</summary>
    public static TestResult? Independence(IReadOnlyList<bool> exceptions) => exceptions.Count < 2 ? null : Result(IndependenceRatio(exceptions), 1);

    /// <summary>Both together, coverage over all days: chi-square with 2 degrees of freedom; null below two days.</summary>
    public static TestResult? Conditional(IReadOnlyList<bool> exceptions, Confidence confidence) => exceptions.Count < 2
        ? null
        : Result(CoverageRatio(exceptions.Count, exceptions.Count(e => e), (double)(1 - confidence.Level)) + IndependenceRatio(exceptions), 2);

    private static double CoverageRatio(int days, int exceptions, double expected) =>
        -2 * (LogLikelihood(days - exceptions, exceptions, expected) - LogLikelihood(days - exceptions, exceptions, (double)exceptions / days));

    private static double IndependenceRatio(IReadOnlyList<bool> exceptions)
    {
        var counts = new int[2, 2];
        for (var t = 1; t < exceptions.Count; t++) counts[exceptions[t - 1] ? 1 : 0, exceptions[t] ? 1 : 0]++;
        var (stayed, fell, rose, again) = (counts[0, 0], counts[0, 1], counts[1, 0], counts[1, 1]);
        var together = LogLikelihood(stayed + rose, fell + again, (double)(fell + again) / (exceptions.Count - 1));
        return -2 * (together - LogLikelihood(stayed, fell, Share(fell, stayed)) - LogLikelihood(rose, again, Share(again, rose)));
    }

    private static double Share(int of, int others) => of == 0 ? 0 : (double)of / (of + others);

    // 0 ln 0 = 0.
    private static double LogLikelihood(int without, int with, double probability) =>
        (without == 0 ? 0 : without * Logarithm.Of(1 - probability)) + (with == 0 ? 0 : with * Logarithm.Of(probability));

    private static TestResult Result(double ratio, double freedom)
    {
        var statistic = Math.Max(ratio, 0); // rounding may leave a little less than nothing
        return new(Significant.Of(statistic), Significant.Of(1 - ChiSquared.CDF(freedom, statistic)));
    }
}
