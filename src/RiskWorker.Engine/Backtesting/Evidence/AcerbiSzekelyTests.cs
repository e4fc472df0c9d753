using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Losses beyond VaR against expected shortfall. C. Acerbi and B. Szekely, Backtesting expected shortfall (Risk, December 2014):
/// Z1 = Σ X I / ES / N + 1 over the N exceptions, Z2 = Σ X I / (T p ES) + 1 over T days, with X the profit and I an exception. Both are 0
/// on average where the model is right, and negative where it understates.
/// </summary>
/// <remarks>
/// The p-value is the share of series, drawn from each day's own forecast distribution, whose statistic is as low. Only what lies beyond
/// VaR counts, so only that is drawn: exceptions by their waits at the largest probability that any day's forecast gives them, thinned
/// to each day's own.
/// </remarks>
public static class AcerbiSzekelyTests
{
    /// <summary>Series drawn unless another number is given.</summary>
    public const int Series = 5000;

    private const int Halvings = 60;

    private static readonly Judgement s_z1 = new(StatisticalTestNames.AcerbiSzekelyZ1, "Acerbi and Szekely (2014), Z1");
    private static readonly Judgement s_z2 = new(StatisticalTestNames.AcerbiSzekelyZ2, "Acerbi and Szekely (2014), Z2");

    /// <summary>Z1 and Z2.</summary>
    /// <param name="days">The days.</param>
    /// <param name="confidence">That of VaR and expected shortfall.</param>
    /// <param name="series">Series to draw.</param>
    /// <exception cref="ArgumentException">A number is not finite.</exception>
    public static (StatisticalTest Z1, StatisticalTest Z2) Of(IReadOnlyList<ShortfallDay> days, Confidence confidence, int series = Series)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(series, 1);
        for (var t = 0; t < days.Count; t++) RequireFinite(days[t], t);
        if (days.Count == 0) return (s_z1.NotAssessed("No day with profit and forecast."), s_z2.NotAssessed("No day with profit and forecast."));
        if (days.Count(d => d.Shortfall <= 0) is > 0 and var without)
        {
            var why = $"Expected shortfall is not a loss on {without} of {days.Count} days: its ratio to a loss says nothing.";
            return (s_z1.NotAssessed(why), s_z2.NotAssessed(why));
        }
        var expected = days.Count * (double)(1 - confidence.Level);
        var observed = new TailSum();
        foreach (var day in days) if (day.Profit < -day.Var) observed.Add(day.Profit / day.Shortfall);
        var drawn = Draw(days, series);
        return (Z1(observed, drawn), Z2(observed, drawn, expected));
    }

    private static StatisticalTest Z1(TailSum observed, TailSum[] drawn)
    {
        double[] extremities = [.. drawn.Where(d => d.Count > 0).Select(d => -Mean(d))];
        if (observed.Count == 0) return s_z1.NotAssessed("No loss beyond VaR: Z1 has no value.");
        if (extremities.Length == 0) return s_z1.NotAssessed("The forecasts allow no loss beyond their own VaR: there is nothing to hold Z1 against.", Mean(observed));
        var law = NullLaw.Simulated(extremities);
        return s_z1.Of(Mean(observed), -Mean(observed), law, $"{observed.Count} losses beyond VaR; {extremities.Length} of {drawn.Length} simulated series have one.");
    }

    private static StatisticalTest Z2(TailSum observed, TailSum[] drawn, double expected)
    {
        var law = NullLaw.Simulated([.. drawn.Select(d => -(d.Sum / expected) - 1)]);
        var statistic = (observed.Sum / expected) + 1;
        return s_z2.Of(statistic, -statistic, law, $"{drawn.Length} simulated series.");
    }

    private static double Mean(TailSum sum) => (sum.Sum / sum.Count) + 1;

    private static TailSum[] Draw(IReadOnlyList<ShortfallDay> days, int series)
    {
        var drawn = new TailSum[series];
        var most = days.Max(BeyondVar);
        if (most <= 0) return drawn;
        most = Math.Min(most, 1 - 1e-12); // a wait of one day has a logarithm still
        GeometricWaits.ForEach(series, days.Count, most, 2, (i, t, _, place) =>
        {
            var day = days[t - 1];
            var profit = day.Inverse(most * place);
            if (profit < -day.Var) drawn[i].Add(profit / day.Shortfall);
        });
        return drawn;
    }

    /// <summary>The probability that the forecast gives to a loss beyond its own VaR, a little from above.</summary>
    private static double BeyondVar(ShortfallDay day)
    {
        var (low, high) = (0.0, 1.0);
        for (var i = 0; i < Halvings && high - low > 1e-9 * high; i++)
        {
            var middle = (low + high) / 2;
            if (day.Inverse(middle) < -day.Var) low = middle; else high = middle;
        }
        return low == 0 ? 0 : high;
    }

    private static void RequireFinite(ShortfallDay day, int t)
    {
        if (!(double.IsFinite(day.Profit) && double.IsFinite(day.Var) && double.IsFinite(day.Shortfall)))
            throw new ArgumentException($"Day {t} has profit {day.Profit}, VaR {day.Var} and expected shortfall {day.Shortfall}; all must be finite.", nameof(day));
    }

    private struct TailSum
    {
        public double Sum { get; private set; }

        public int Count { get; private set; }

        public void Add(double ratio)
        {
            Sum += ratio;
            Count++;
        }
    }
}
