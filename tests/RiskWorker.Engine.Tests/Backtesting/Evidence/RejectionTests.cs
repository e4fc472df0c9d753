using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Numerics.Kernels;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>That the tests see what they are for: seeded series of 500 days under models that are wrong in one way.</summary>
public sealed class RejectionTests
{
    private const int Days = 500;
    private static readonly NullLaws s_laws = new();

    [Fact]
    public void Half_the_volatility_is_seen_by_count_shortfall_and_distribution()
    {
        var profits = Uniforms(51, Days).Select(u => 2 * InverseNormal.Of(u));
        var rejected = Rejected(profits);
        string[] expected =
        [
            StatisticalTestNames.KupiecFailures, StatisticalTestNames.ChristoffersenConditional, StatisticalTestNames.HaasMixed, StatisticalTestNames.AcerbiSzekelyZ1,
            StatisticalTestNames.AcerbiSzekelyZ2, StatisticalTestNames.CostanzinoCurran, StatisticalTestNames.KolmogorovSmirnov, StatisticalTestNames.AndersonDarling,
            StatisticalTestNames.Berkowitz, StatisticalTestNames.BerkowitzTail,
        ];
        Assert.Subset(rejected, expected.ToHashSet());
    }

    [Fact]
    public void Twice_the_volatility_is_seen_by_the_tests_of_both_sides_and_not_by_those_of_too_much_loss()
    {
        var rejected = Rejected(Uniforms(52, Days).Select(u => 0.5 * InverseNormal.Of(u)));
        Assert.Subset(rejected, new HashSet<string> { StatisticalTestNames.KupiecFailures, StatisticalTestNames.AndersonDarling, StatisticalTestNames.Berkowitz, StatisticalTestNames.BerkowitzTail });
        Assert.DoesNotContain(StatisticalTestNames.AcerbiSzekelyZ2, rejected);
        Assert.DoesNotContain(StatisticalTestNames.CostanzinoCurran, rejected);
    }

    [Fact]
    public void Volatility_that_comes_in_spells_is_seen_by_independence_or_duration()
    {
        // One quarter of the days at twice the volatility, in spells of 25.
        var profits = Uniforms(53, Days).Select((u, t) => (t / 25 % 4 == 0 ? 2.5 : 0.7) * InverseNormal.Of(u));
        Assert.Contains(StatisticalTestNames.Duration, Rejected(profits));
    }

    private static HashSet<string> Rejected(IEnumerable<double> profits)
    {
        var (var, shortfall) = (-InverseNormal.Of(0.025), NormalDensity.Of(InverseNormal.Of(0.025)) / 0.025);
        double[] all = [.. profits];
        var tests = BacktestTests.Of(
            new()
            {
                Confidence = C975,
                Exceptions = [.. all.Select(x => x < -var)],
                Shortfall = [.. all.Select(x => new ShortfallDay(x, var, shortfall, InverseNormal.Of))],
                Transforms = [.. all.Select(NormalCdf.Of)],
            },
            s_laws);
        return [.. tests.Where(t => t.Reject == true).Select(t => t.Name)];
    }
}
