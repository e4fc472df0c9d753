using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Exceptions at all levels of the tail at once, each weighted by how far into it the day lies: S = Σ (1 - u/p)⁺ with u the forecast
/// probability of a day's profit. N. Costanzino and M. Curran, Backtesting general spectral risk measures with application to expected
/// shortfall (Risk, 2015); A simple traffic light approach to backtesting expected shortfall (Risks, 2018).
/// </summary>
/// <remarks>The statistic is S less its mean, over its standard deviation; only a large one rejects. The p-value is exact: <see cref="WeightedBreachLaw"/>.</remarks>
public static class CostanzinoCurranTest
{
    private const double Yellow = 0.95;
    private const double Red = 0.9999;

    private static readonly Judgement s_judgement = new(StatisticalTestNames.CostanzinoCurran, "Costanzino and Curran (2015), expected shortfall coverage");

    /// <summary>The test of forecast probabilities of each day's profit, each in (0, 1).</summary>
    public static StatisticalTest Of(IReadOnlyList<double> transforms, Confidence confidence)
    {
        ForecastProbabilities.Require(transforms);
        if (transforms.Count == 0) return s_judgement.NotAssessed("No day with profit and forecast.");
        var law = new WeightedBreachLaw(transforms.Count, confidence);
        var sum = Sum(transforms, confidence);
        var standardised = (sum - law.Mean) / Math.Sqrt(law.Variance);
        var tail = law.AtLeast(sum);
        var zone = 1 - tail >= Red ? "red" : 1 - tail >= Yellow ? "yellow" : "green";
        return s_judgement.Of(standardised, tail, law.IsExact ? PValueMethod.Exact : PValueMethod.Asymptotic,
            $"Sum of weighted breaches {Judgement.Text(sum)}, {Judgement.Text(law.Mean)} expected: {zone} by the cumulative probabilities 95% and 99.99%.");
    }

    /// <summary>The sum of weighted breaches.</summary>
    public static double Sum(IReadOnlyList<double> transforms, Confidence confidence)
    {
        var (sum, p) = (0.0, (double)(1 - confidence.Level));
        foreach (var u in transforms) sum += Math.Max(1 - (u / p), 0);
        return sum;
    }
}
