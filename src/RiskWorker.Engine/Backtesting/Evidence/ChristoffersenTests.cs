using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Whether exceptions follow one another, alone and with their number. P. Christoffersen, Evaluating interval forecasts (International
/// Economic Review, 1998).
/// </summary>
/// <remarks>
/// Independence says nothing of how many exceptions there are: its p-value is exact given their number, over all orders of the days. That
/// of both together is exact for independent days with the confidence's probability, up to <see cref="MostEnumerated"/> days.
/// </remarks>
public static class ChristoffersenTests
{
    /// <summary>Most days whose transition counts are enumerated over all numbers of exceptions.</summary>
    public const int MostEnumerated = 5000;

    private static readonly Judgement s_independence = new(StatisticalTestNames.ChristoffersenIndependence, "Christoffersen (1998), independence");
    private static readonly Judgement s_conditional = new(StatisticalTestNames.ChristoffersenConditional, "Christoffersen (1998), conditional coverage");

    /// <summary>Whether an exception makes one on the next day more or less likely.</summary>
    public static StatisticalTest Independence(IReadOnlyList<bool> exceptions, NullLaws laws)
    {
        if (exceptions.Count < 2) return s_independence.NotAssessed("Two days at least have a day after a day.");
        var counts = TransitionCounts.Of(exceptions);
        var ratio = LikelihoodRatios.Independence(counts);
        var count = exceptions.Count(e => e);
        var note = count < 2
            ? $"{count} exception{(count == 1 ? "" : "s")}: none can follow another."
            : $"{counts.Again} of {count} exceptions follow one on the day before, over {counts.Total} transitions. Exact given the count; the chi-square law would give {Judgement.Text(Judgement.ChiSquareTail(ratio, 1))}.";
        return s_independence.Of(ratio, ratio, IndependenceLaw(exceptions.Count, count, laws), note);
    }

    /// <summary>Both together: the ratio of the count over all days plus that of independence over the transitions.</summary>
    public static StatisticalTest Conditional(IReadOnlyList<bool> exceptions, Confidence confidence, NullLaws laws)
    {
        if (exceptions.Count < 2) return s_conditional.NotAssessed("Two days at least have a day after a day.");
        var expected = (double)(1 - confidence.Level);
        var count = exceptions.Count(e => e);
        var independence = LikelihoodRatios.Independence(TransitionCounts.Of(exceptions));
        var ratio = LikelihoodRatios.Failures(exceptions.Count, count, expected) + independence;
        var other = LikelihoodRatios.Failures(exceptions.Count - 1, count - (exceptions[0] ? 1 : 0), expected) + independence;
        var note = $"Count over all {exceptions.Count} days; without the first, as transitions have it, the statistic is {Significant.Of(other)}.";
        var asymptotic = Judgement.ChiSquareTail(ratio, 2);
        if (exceptions.Count > MostEnumerated) return s_conditional.Of(ratio, asymptotic, PValueMethod.Asymptotic, note);
        return s_conditional.Of(ratio, ratio, ConditionalLaw(exceptions.Count, confidence, laws), $"{note} The chi-square law would give {Judgement.Text(asymptotic)}.");
    }

    /// <summary>The law of the ratio of independence, given the number of exceptions.</summary>
    internal static NullLaw IndependenceLaw(int days, int count, NullLaws laws) => laws.Of(StatisticalTestNames.ChristoffersenIndependence, days, 0, count, () =>
    {
        var outcomes = TransitionLaw.Of(days, count);
        return NullLaw.Exact([.. outcomes.Select(o => LikelihoodRatios.Independence(o.Counts))], [.. outcomes.Select(o => o.Probability)]);
    });

    /// <summary>The law of the sum of both ratios.</summary>
    internal static NullLaw ConditionalLaw(int days, Confidence confidence, NullLaws laws) => laws.Of(StatisticalTestNames.ChristoffersenConditional, days, confidence.Level, 0, () =>
    {
        var (expected, law) = ((double)(1 - confidence.Level), new CountLaw(days, 1 - confidence.Level));
        var (values, probabilities) = (new List<double>(), new List<double>());
        for (var x = law.First; x <= law.Last; x++)
        {
            var failures = LikelihoodRatios.Failures(days, x, expected);
            foreach (var (counts, probability) in TransitionLaw.Of(days, x))
            {
                values.Add(failures + LikelihoodRatios.Independence(counts));
                probabilities.Add(law[x] * probability);
            }
        }
        return NullLaw.Exact([.. values], [.. probabilities]);
    });
}
