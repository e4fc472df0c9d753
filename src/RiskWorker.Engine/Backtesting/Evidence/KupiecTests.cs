using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Number of exceptions, and the day of the first. P. Kupiec, Techniques for verifying the accuracy of risk measurement models (Journal of
/// Derivatives, 1995).
/// </summary>
/// <remarks>
/// Both p-values are exact: the probability of every count, or every first day, whose likelihood ratio is as large. A series without
/// exception has its own ratio for the first failure, that of no failure in so many days, whose likeliest probability is 0.
/// </remarks>
public static class KupiecTests
{
    private static readonly Judgement s_failures = new(StatisticalTestNames.KupiecFailures, "Kupiec (1995), proportion of failures");
    private static readonly Judgement s_first = new(StatisticalTestNames.KupiecFirstFailure, "Kupiec (1995), time until first failure");

    /// <summary>Whether exceptions are as frequent as 1 - confidence.</summary>
    public static StatisticalTest Failures(IReadOnlyList<bool> exceptions, Confidence confidence, NullLaws laws)
    {
        if (exceptions.Count == 0) return s_failures.NotAssessed("No day to count.");
        var ratio = LikelihoodRatios.Failures(exceptions.Count, exceptions.Count(e => e), Expected(confidence));
        var asymptotic = Judgement.Text(Judgement.ChiSquareTail(ratio, 1));
        return s_failures.Of(ratio, ratio, FailuresLaw(exceptions.Count, confidence, laws), $"Every count enumerated; the chi-square law would give {asymptotic}.");
    }

    /// <summary>Whether the first exception came on a day that 1 - confidence makes likely.</summary>
    public static StatisticalTest FirstFailure(IReadOnlyList<bool> exceptions, Confidence confidence, NullLaws laws)
    {
        if (exceptions.Count == 0) return s_first.NotAssessed("No day to count.");
        var day = FirstDay(exceptions);
        var ratio = FirstRatio(day, exceptions.Count, Expected(confidence));
        var when = day is { } d ? $"First exception on day {d}." : $"No exception in {exceptions.Count} days: the ratio is that of none in so many.";
        return s_first.Of(ratio, ratio, FirstFailureLaw(exceptions.Count, confidence, laws), when + " Every first day enumerated.");
    }

    /// <summary>The law of the ratio of the count.</summary>
    internal static NullLaw FailuresLaw(int days, Confidence confidence, NullLaws laws) => laws.Of(StatisticalTestNames.KupiecFailures, days, confidence.Level, 0, () =>
    {
        var count = new CountLaw(days, 1 - confidence.Level);
        var counts = Enumerable.Range(count.First, count.Last - count.First + 1);
        return NullLaw.Exact([.. counts.Select(x => LikelihoodRatios.Failures(days, x, Expected(confidence)))], [.. counts.Select(x => count[x])]);
    });

    /// <summary>The law of the ratio of the first day.</summary>
    internal static NullLaw FirstFailureLaw(int days, Confidence confidence, NullLaws laws) => laws.Of(StatisticalTestNames.KupiecFirstFailure, days, confidence.Level, 0, () =>
    {
        var expected = Expected(confidence);
        var (values, probabilities) = (new double[days + 1], new double[days + 1]);
        var none = 1.0;
        for (var v = 1; v <= days; v++)
        {
            (values[v], probabilities[v]) = (FirstRatio(v, days, expected), none * expected);
            none *= 1 - expected;
        }
        (values[0], probabilities[0]) = (FirstRatio(null, days, expected), none);
        return NullLaw.Exact(values, probabilities);
    });

    private static double FirstRatio(int? day, int days, double expected) =>
        day is { } v ? LikelihoodRatios.FirstFailure(v, expected) : LikelihoodRatios.Failures(days, 0, expected);

    private static int? FirstDay(IReadOnlyList<bool> exceptions)
    {
        for (var t = 0; t < exceptions.Count; t++) if (exceptions[t]) return t + 1;
        return null;
    }

    private static double Expected(Confidence confidence) => (double)(1 - confidence.Level);
}
