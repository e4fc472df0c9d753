using System.Globalization;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Whether the chance of an exception depends on the time since the last: times between exceptions by a Weibull law against the
/// exponential one. P. Christoffersen and D. Pelletier, Backtesting value-at-risk: a duration-based approach (Journal of Financial
/// Econometrics, 2004).
/// </summary>
/// <remarks>
/// Both laws are of continuous time, and days are whole and exceptions few: the chi-square law rejects 7% to 16% of right series of 250 or
/// 500 days at 99% or 97.5% where it should 5% (measured on 5,000 each). The p-value is simulated, given the number of exceptions, over
/// orders of the days, each as likely: it holds whatever the probability of an exception is.
/// </remarks>
public static class DurationTest
{
    /// <summary>Series of a simulated law.</summary>
    public const int Series = 10_000;

    private const int SeriesAtOnce = 500;
    private static readonly Judgement s_judgement = new(StatisticalTestNames.Duration, "Christoffersen and Pelletier (2004), Weibull against exponential");

    /// <summary>The test; not assessed below two exceptions, since no time between them is whole.</summary>
    public static StatisticalTest Of(IReadOnlyList<bool> exceptions, NullLaws laws)
    {
        int[] days = [.. Enumerable.Range(1, exceptions.Count).Where(t => exceptions[t - 1])];
        if (days.Length < 2) return s_judgement.NotAssessed("Fewer than two exceptions: there is no time between them.");
        var logs = Logs(exceptions.Count);
        var (ratio, shape) = Ratio(days, exceptions.Count, logs, new double[days.Length + 1]);
        var kind = shape < 1 ? "below 1: exceptions cluster" : "not below 1: they do not cluster";
        var note = string.Create(CultureInfo.InvariantCulture,
            $"Weibull shape {shape:G4}, {kind}. Times in whole days under laws of continuous time: {Series} simulated orders of the days give the p-value; the chi-square law would give {Judgement.Text(Judgement.ChiSquareTail(ratio, 1))}.");
        return s_judgement.Of(ratio, ratio, Law(exceptions.Count, days.Length, laws), note);
    }

    internal static NullLaw Law(int days, int count, NullLaws laws) => laws.Of(StatisticalTestNames.Duration, days, 0, count, () =>
    {
        var (ratios, logs) = (new double[Series], Logs(days));
        var stream = new DrawStream(NullLaws.Seed, DrawPurpose.NullSeries, 1);
        var draws = new double[count + 1][];
        for (var j = 0; j < draws.Length; j++) draws[j] = new double[SeriesAtOnce];
        var (chosen, order, scratch) = (new bool[days + 1], new int[count], new double[count + 1]);
        for (var first = 0; first < Series; first += SeriesAtOnce)
        {
            for (var j = 0; j < count; j += 2) UniformDraws.FillPair(stream, (ulong)first, (uint)j / 2, draws[j], draws[j + 1]);
            for (var i = 0; i < SeriesAtOnce; i++)
            {
                Choose(draws, i, chosen, order);
                ratios[first + i] = Ratio(order, days, logs, scratch).Ratio;
            }
        }
        return NullLaw.Simulated(ratios);
    });

    // Any set of that many days is as likely (R. W. Floyd in J. Bentley, Programming pearls: a sample of brilliance, 1987).
    private static void Choose(double[][] draws, int series, bool[] chosen, int[] order)
    {
        var (days, count) = (chosen.Length - 1, order.Length);
        for (var j = 0; j < count; j++)
        {
            var last = days - count + 1 + j;
            var day = Math.Min(1 + (int)(draws[j][series] * last), last);
            if (chosen[day]) day = last;
            chosen[day] = true;
            order[j] = day;
        }
        foreach (var day in order) chosen[day] = false;
        Array.Sort(order);
    }

    private static (double Ratio, double Shape) Ratio(int[] days, int length, double[] logs, double[] scratch)
    {
        var (count, whole, longest) = (0, 0.0, 0.0);
        if (days[0] > 1) scratch[count++] = logs[days[0]];
        for (var i = 1; i < days.Length; i++) whole += scratch[count++] = logs[days[i] - days[i - 1]];
        if (days[^1] < length) scratch[count++] = logs[length - days[^1]];
        var all = scratch.AsSpan(0, count);
        foreach (var log in all) longest = Math.Max(longest, log);
        foreach (ref var log in all) log -= longest;
        return WeibullDurations.Ratio(all, whole - ((days.Length - 1) * longest), days.Length - 1);
    }

    private static double[] Logs(int days) => [0, .. Enumerable.Range(1, days).Select(d => Logarithm.Of(d))];
}
