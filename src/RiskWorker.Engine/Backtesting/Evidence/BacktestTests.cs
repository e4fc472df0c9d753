using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>What is known of one book and confidence. What is null is not assessed, and the tests that need it say so.</summary>
public sealed record EvidenceSeries
{
    /// <summary>Confidence of VaR, expected shortfall and tail.</summary>
    public required Confidence Confidence { get; init; }

    /// <summary>Whether each day was an exception, oldest first.</summary>
    public required IReadOnlyList<bool> Exceptions { get; init; }

    /// <summary>Days with profit, VaR, expected shortfall and forecast distribution.</summary>
    public IReadOnlyList<ShortfallDay>? Shortfall { get; init; }

    /// <summary>Forecast probabilities of each day's profit, each in (0, 1), oldest first.</summary>
    public IReadOnlyList<double>? Transforms { get; init; }

    /// <summary>The firm's own hypothetical profit of the attribution days.</summary>
    public IReadOnlyList<double>? Hypothetical { get; init; }

    /// <summary>Risk-theoretical profit of the same days.</summary>
    public IReadOnlyList<double>? RiskTheoretical { get; init; }
}

/// <summary>All tests of one book and confidence.</summary>
public static class BacktestTests
{
    /// <summary>One result for each of <see cref="StatisticalTestNames.All"/>, in that order.</summary>
    /// <param name="series">What is known.</param>
    /// <param name="laws">Laws under the model, shared by all books.</param>
    public static IReadOnlyList<StatisticalTest> Of(EvidenceSeries series, NullLaws laws)
    {
        var (exceptions, confidence) = (series.Exceptions, series.Confidence);
        var (z1, z2) = AcerbiSzekelyTests.Of(series.Shortfall ?? [], confidence);
        var transforms = series.Transforms ?? [];
        var attribution = ProfitAttribution.Of(series.Hypothetical, series.RiskTheoretical);
        return
        [
            KupiecTests.Failures(exceptions, confidence, laws),
            KupiecTests.FirstFailure(exceptions, confidence, laws),
            ChristoffersenTests.Independence(exceptions, laws),
            ChristoffersenTests.Conditional(exceptions, confidence, laws),
            HaasTest.Of(exceptions, confidence, laws),
            DurationTest.Of(exceptions, laws),
            z1,
            z2,
            CostanzinoCurranTest.Of(transforms, confidence),
            DistributionTests.KolmogorovSmirnov(transforms),
            DistributionTests.AndersonDarling(transforms),
            DistributionTests.Berkowitz(transforms),
            BerkowitzTailTest.Of(transforms, confidence, laws),
            attribution.Spearman,
            attribution.KolmogorovSmirnov,
        ];
    }
}
