using MathNet.Numerics.Distributions;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Likelihood-ratio tests of a series of exceptions. P. Kupiec, Techniques for verifying the accuracy of risk measurement models (Journal of
/// Derivatives, 1995); P. Christoffersen, Evaluating interval forecasts (International Economic Review, 1998).
/// </summary>
/// <remarks>An end product: the chi-square law is a library's, and figures are rounded to 12 significant digits.</remarks>
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

    private static double CoverageRatio(int days, int exceptions, double expected) => LikelihoodRatios.Failures(days, exceptions, expected);

    private static double IndependenceRatio(IReadOnlyList<bool> exceptions) => LikelihoodRatios.Independence(TransitionCounts.Of(exceptions));

    private static TestResult Result(double statistic, double freedom) =>
        new(Significant.Of(statistic), Significant.Of(1 - ChiSquared.CDF(freedom, statistic)));
}
