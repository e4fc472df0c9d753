using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>Zone of a desk's profit attribution.</summary>
public enum AttributionZone
{
    /// <summary>Correlation above 0.80 and distance below 0.09.</summary>
    Green,

    /// <summary>Neither green nor red.</summary>
    Amber,

    /// <summary>Correlation below 0.70 or distance above 0.12.</summary>
    Red,
}

/// <summary>
/// Whether risk-theoretical profit, by the model's own factors and pricing, goes with hypothetical profit, by the firm's: rank correlation
/// (C. Spearman 1904) and the largest distance of the two distributions (MAR32.35 to MAR32.45), compared as whole numbers.
/// </summary>
public static class ProfitAttribution
{
    /// <summary>Days that the supervisory zones are of.</summary>
    public const int Days = 250;

    private static readonly Judgement s_spearman = new(StatisticalTestNames.AttributionSpearman, "MAR32.36 to MAR32.38; Spearman (1904)");
    private static readonly Judgement s_kolmogorov = new(StatisticalTestNames.AttributionKolmogorovSmirnov, "MAR32.39 to MAR32.41; Smirnov (1939)");

    /// <summary>Both figures and the zone.</summary>
    /// <param name="hypothetical">Profit that the firm computed apart from this model, day by day; null where it has none.</param>
    /// <param name="riskTheoretical">Profit by the model on the same days; null where it was not kept.</param>
    /// <exception cref="ArgumentException">The series differ in length, or a number is not finite.</exception>
    public static AttributionResult Of(IReadOnlyList<double>? hypothetical, IReadOnlyList<double>? riskTheoretical)
    {
        if (hypothetical is null) return NotAssessed("Not assessable: the firm supplies no hypothetical profit of its own, and the model's would be held against itself.");
        if (riskTheoretical is null) return NotAssessed("Not assessable: there is no risk-theoretical profit.");
        if (hypothetical.Count != riskTheoretical.Count)
            throw new ArgumentException($"There are {hypothetical.Count} hypothetical and {riskTheoretical.Count} risk-theoretical profits; both must have the same days.", nameof(riskTheoretical));
        for (var t = 0; t < hypothetical.Count; t++)
        {
            if (!double.IsFinite(hypothetical[t]) || !double.IsFinite(riskTheoretical[t]))
                throw new ArgumentException($"Day {t} has hypothetical profit {hypothetical[t]} and risk-theoretical profit {riskTheoretical[t]}; both must be finite.", nameof(hypothetical));
        }
        if (hypothetical.Count < 2) return NotAssessed($"{hypothetical.Count} days with both profits: not assessable.");
        var ranks = RankMoments.Of(AverageRanks.Doubled(hypothetical), AverageRanks.Doubled(riskTheoretical));
        var steps = Steps(hypothetical, riskTheoretical);
        var days = hypothetical.Count;
        AttributionZone? zone = ranks.IsConstant ? null : Zone(ranks, steps, days);
        var few = days == Days ? "" : $" The supervisory test has {Days} days, this one {days}.";
        return new(Spearman(ranks, few), Kolmogorov(steps, days, few), zone);
    }

    private static AttributionResult NotAssessed(string why) => new(s_spearman.NotAssessed(why), s_kolmogorov.NotAssessed(why), null);

    private static StatisticalTest Spearman(RankMoments ranks, string few) => ranks.IsConstant
        ? s_spearman.NotAssessed("A series has one value on all days: it has no ranks to correlate." + few)
        : s_spearman.NotAssessed("Held against 0.80 and 0.70, ties by their average rank. A p-value of no correlation would say nothing: correlation is what is asked for." + few, ranks.Correlation);

    private static StatisticalTest Kolmogorov(int steps, int days, string few) => s_kolmogorov.Of((double)steps / days, TwoSampleTail(days, steps), PValueMethod.Exact,
        $"{steps} steps of 1/{days}, held against 0.09 and 0.12. The p-value takes the two series as independent, which profits of the same days are not: it is large, and the zone decides.{few}");

    private static AttributionZone Zone(RankMoments ranks, int steps, int days)
    {
        if (ranks.CompareTo(7, 10) < 0 || 100L * steps > 12L * days) return AttributionZone.Red;
        return ranks.CompareTo(8, 10) > 0 && 100L * steps < 9L * days ? AttributionZone.Green : AttributionZone.Amber;
    }

    /// <summary>The largest difference of the numbers of days at or below a profit, over all profits.</summary>
    internal static int Steps(IReadOnlyList<double> first, IReadOnlyList<double> second)
    {
        double[] a = [.. first.Order()];
        double[] b = [.. second.Order()];
        var (i, j, most) = (0, 0, 0);
        while (i < a.Length && j < b.Length)
        {
            var profit = Math.Min(a[i], b[j]);
            while (i < a.Length && a[i] <= profit) i++;
            while (j < b.Length && b[j] <= profit) j++;
            most = Math.Max(most, Math.Abs(i - j));
        }
        return most;
    }

    /// <summary>
    /// P(steps or more) of two independent samples of n days each without ties: 2 Σ (-1)^(k-1) C(2n, n - k steps) / C(2n, n), by reflected
    /// paths (B. V. Gnedenko and V. S. Korolyuk 1951).
    /// </summary>
    internal static double TwoSampleTail(int days, int steps)
    {
        if (steps <= 0) return 1;
        var (sum, sign, middle) = (0.0, 2.0, 2 * LogGamma.Of(days + 1.0));
        for (var apart = steps; apart <= days; apart += steps, sign = -sign)
            sum += sign * Exponential.Of(middle - LogGamma.Of(days - apart + 1.0) - LogGamma.Of(days + apart + 1.0));
        return Math.Clamp(sum, 0, 1);
    }
}

/// <summary>The attribution of one desk.</summary>
/// <param name="Spearman">Rank correlation; no p-value.</param>
/// <param name="KolmogorovSmirnov">Largest distance of the distributions.</param>
/// <param name="Zone">The zone; null where it is not assessable.</param>
public sealed record AttributionResult(StatisticalTest Spearman, StatisticalTest KolmogorovSmirnov, AttributionZone? Zone);
