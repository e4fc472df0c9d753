using System.Collections.Concurrent;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Numerics.Kernels;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>How often each test rejects 500 seeded years of a right model: at most 5%, and with an exact law of few values as often as that law says.</summary>
public sealed class SizeTests
{
    private const int Rounds = 500;
    private const int Days = 250;
    private const int Series = 500; // of the law that is drawn anew for every year

    private static readonly NullLaws s_laws = new();
    private static readonly double[][] s_years = [.. Enumerable.Range(1, Rounds).Select(y => Uniforms((ulong)(1000 + y), Days))];

    // What several tests ask for is found once.
    private static readonly ConcurrentDictionary<(string Name, Confidence Confidence), Lazy<double>> s_rates = new();
    private static readonly ConcurrentDictionary<(double[] Year, Confidence Confidence), Lazy<(StatisticalTest Z1, StatisticalTest Z2)>> s_both = new();
    private static readonly string[] s_ofWholeDistribution = [StatisticalTestNames.KolmogorovSmirnov, StatisticalTestNames.AndersonDarling, StatisticalTestNames.Berkowitz];

    public static TheoryData<string> Names => [.. Tests.Keys];

    private static Dictionary<string, Func<double[], Confidence, StatisticalTest>> Tests { get; } = new(StringComparer.Ordinal)
    {
        [StatisticalTestNames.KupiecFailures] = (u, c) => KupiecTests.Failures(Exceptions(u, c), c, s_laws),
        [StatisticalTestNames.KupiecFirstFailure] = (u, c) => KupiecTests.FirstFailure(Exceptions(u, c), c, s_laws),
        [StatisticalTestNames.ChristoffersenIndependence] = (u, c) => ChristoffersenTests.Independence(Exceptions(u, c), s_laws),
        [StatisticalTestNames.ChristoffersenConditional] = (u, c) => ChristoffersenTests.Conditional(Exceptions(u, c), c, s_laws),
        [StatisticalTestNames.HaasMixed] = (u, c) => HaasTest.Of(Exceptions(u, c), c, s_laws),
        [StatisticalTestNames.Duration] = (u, c) => DurationTest.Of(Exceptions(u, c), s_laws),
        [StatisticalTestNames.AcerbiSzekelyZ1] = (u, c) => AcerbiSzekely(u, c).Z1,
        [StatisticalTestNames.AcerbiSzekelyZ2] = (u, c) => AcerbiSzekely(u, c).Z2,
        [StatisticalTestNames.CostanzinoCurran] = (u, c) => CostanzinoCurranTest.Of(u, c),
        [StatisticalTestNames.KolmogorovSmirnov] = (u, _) => DistributionTests.KolmogorovSmirnov(u),
        [StatisticalTestNames.AndersonDarling] = (u, _) => DistributionTests.AndersonDarling(u),
        [StatisticalTestNames.Berkowitz] = (u, _) => DistributionTests.Berkowitz(u),
        [StatisticalTestNames.BerkowitzTail] = (u, c) => BerkowitzTailTest.Of(u, c, s_laws),
    };

    [Theory]
    [MemberData(nameof(Names))]
    public void Right_model_is_rejected_in_at_most_one_year_of_twenty(string name)
    {
        Assert.InRange(Rate(name, C975), 0, 0.05 + (3 * Error(0.05)));
        Assert.InRange(Rate(name, C99), 0, 0.05 + (3 * Error(0.05)));
    }

    [Theory]
    [InlineData(0.975)]
    [InlineData(0.99)]
    public void Right_model_is_rejected_as_often_as_the_exact_law_says(double confidence)
    {
        var level = new Confidence((decimal)confidence);
        foreach (var (name, size) in AttainableSizes.Of(Days, level, s_laws)) Assert.Equal(size, Rate(name, level), 3 * Error(size));
    }

    [Fact]
    public void Test_of_a_law_without_steps_rejects_one_year_of_twenty()
    {
        string[] names = [StatisticalTestNames.AcerbiSzekelyZ2, StatisticalTestNames.CostanzinoCurran, StatisticalTestNames.KolmogorovSmirnov, StatisticalTestNames.AndersonDarling, StatisticalTestNames.Berkowitz, StatisticalTestNames.BerkowitzTail];
        Assert.All(names, n => Assert.Equal(0.05, Rate(n, C975), 3 * Error(0.05)));
    }

    private static double Rate(string name, Confidence confidence) => s_rates.GetOrAdd((name, s_ofWholeDistribution.Contains(name) ? C975 : confidence),
        key => new(() => s_years.Count(u => Tests[name](u, key.Confidence).Reject == true) / (double)Rounds)).Value;

    private static (StatisticalTest Z1, StatisticalTest Z2) AcerbiSzekely(double[] u, Confidence confidence) =>
        s_both.GetOrAdd((u, confidence), key => new(() => AcerbiSzekelyTests.Of(Shortfall(key.Year, key.Confidence), key.Confidence, Series))).Value;

    private static double Error(double rate) => Math.Sqrt(rate * (1 - rate) / Rounds);

    private static bool[] Exceptions(double[] u, Confidence c) => [.. u.Select(x => x < (double)(1 - c.Level))];

    private static ShortfallDay[] Shortfall(double[] u, Confidence c)
    {
        var p = (double)(1 - c.Level);
        var (var, shortfall) = (-InverseNormal.Of(p), NormalDensity.Of(InverseNormal.Of(p)) / p);
        return [.. u.Select(x => new ShortfallDay(InverseNormal.Of(x), var, shortfall, InverseNormal.Of))];
    }
}
