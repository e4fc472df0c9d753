using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Number of exceptions and every wait for one. M. Haas, New methods in backtesting (Financial Engineering, research center caesar, 2001):
/// the ratio of the count plus that of each wait, chi-square with one degree of freedom more than there are exceptions.
/// </summary>
/// <remarks>
/// The law that the statistic tends to depends on the count, so that series are ranked by the tail of their own: the p-value is the share
/// of simulated series whose tail is as small. The chi-square law itself rejects 9% to 16% of right series of 250 or 500 days at 99% or
/// 97.5% where it should 5% (measured on 5,000 each).
/// </remarks>
public static class HaasTest
{
    /// <summary>Series of a simulated law.</summary>
    public const int Series = 20_000;

    /// <summary>Expected exceptions above which the law is not simulated.</summary>
    private const double ManyExceptions = 1000;

    private static readonly Judgement s_judgement = new(StatisticalTestNames.HaasMixed, "Haas (2001), mixed Kupiec test");

    /// <summary>Whether number and waits of exceptions are those of independent days.</summary>
    public static StatisticalTest Of(IReadOnlyList<bool> exceptions, Confidence confidence, NullLaws laws)
    {
        if (exceptions.Count == 0) return s_judgement.NotAssessed("No day to count.");
        var (statistic, count) = Statistic(exceptions, (double)(1 - confidence.Level));
        var tail = Judgement.ChiSquareTail(statistic, count + 1);
        if (exceptions.Count * (double)(1 - confidence.Level) > ManyExceptions) return s_judgement.Of(statistic, tail, PValueMethod.Asymptotic);
        var note = $"{Series} simulated series, ranked by their chi-square tail with {count + 1} degrees of freedom, which alone would give {Judgement.Text(tail)}.";
        return s_judgement.Of(statistic, Extremity(tail), Law(exceptions.Count, confidence, laws), note);
    }

    internal static NullLaw Law(int days, Confidence confidence, NullLaws laws) => laws.Of(StatisticalTestNames.HaasMixed, days, confidence.Level, 0, () =>
    {
        var expected = (double)(1 - confidence.Level);
        var ofWait = new double[days + 1];
        for (var v = 1; v <= days; v++) ofWait[v] = LikelihoodRatios.FirstFailure(v, expected);
        var (sums, counts) = (new double[Series], new int[Series]);
        GeometricWaits.ForEach(Series, days, expected, 0, (series, _, wait, _) =>
        {
            sums[series] += ofWait[wait];
            counts[series]++;
        });
        for (var i = 0; i < Series; i++) sums[i] = Extremity(Judgement.ChiSquareTail(sums[i] + LikelihoodRatios.Failures(days, counts[i], expected), counts[i] + 1));
        return NullLaw.Simulated(sums);
    });

    private static (double Statistic, int Count) Statistic(IReadOnlyList<bool> exceptions, double expected)
    {
        var (sum, count, last) = (0.0, 0, -1);
        for (var t = 0; t < exceptions.Count; t++)
        {
            if (!exceptions[t]) continue;
            sum += LikelihoodRatios.FirstFailure(t - last, expected);
            (last, count) = (t, count + 1);
        }
        return (sum + LikelihoodRatios.Failures(exceptions.Count, count, expected), count);
    }

    private static double Extremity(double tail) => -Logarithm.Of(Math.Max(tail, 1e-300));
}
