using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting;

/// <summary>What a stored run said of the profit of the next day, from its own measures and quantiles.</summary>
public static class RecordedForecasts
{
    private static readonly Horizon s_oneDay = new(1);

    /// <summary>The forecast of a run; a measure that it did not have is not a number.</summary>
    /// <param name="asOf">The run's date.</param>
    /// <param name="next">The day of the profit.</param>
    /// <param name="results">What it computed.</param>
    public static DayForecast Of(DateOnly asOf, DateOnly next, RunResults results)
    {
        ArgumentNullException.ThrowIfNull(results);
        return new(asOf, next, results.Simulation?.Scenarios, [.. results.Nodes.Select(Of)]);
    }

    /// <summary>
    /// The probability of a profit at or below <paramref name="profit"/>, linear between the quantiles kept; beyond them half of what is
    /// left. Null without quantiles.
    /// </summary>
    public static double? ProbabilityOf(IReadOnlyList<Quantile> quantiles, double profit)
    {
        ArgumentNullException.ThrowIfNull(quantiles);
        if (quantiles.Count < 2) return null;
        if (profit < quantiles[0].Profit) return quantiles[0].Probability / 2;
        if (profit >= quantiles[^1].Profit) return (1 + quantiles[^1].Probability) / 2;
        var above = 1;
        while (quantiles[above].Profit <= profit) above++;
        var (low, high) = (quantiles[above - 1], quantiles[above]);
        return low.Probability + ((high.Probability - low.Probability) * ((profit - low.Profit) / (high.Profit - low.Profit)));
    }

    private static BookForecast Of(NodeResult node)
    {
        var daily = node.Measures.Where(m => m.Spec.Horizon == s_oneDay).ToList();
        return new()
        {
            Book = node.Book,
            Levels = [.. daily.Select(m => m.Spec.Confidence).Distinct().Order().Select(c => new LevelForecast(c, Value(daily, MeasureKind.Var, c), Value(daily, MeasureKind.Es, c)))],
            Tail = node.Distributions.FirstOrDefault(d => d.Horizon == s_oneDay)?.Quantiles ?? [],
        };
    }

    private static double Value(List<MeasureResult> measures, MeasureKind kind, Confidence confidence) =>
        measures.Find(m => m.Spec.Kind == kind && m.Spec.Confidence == confidence)?.Value ?? double.NaN;
}
