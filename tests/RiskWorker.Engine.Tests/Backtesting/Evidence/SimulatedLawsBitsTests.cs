using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Numerics.Kernels;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>Simulated p-values are pinned: a stored report must come out again, on any hardware.</summary>
public sealed class SimulatedLawsBitsTests
{
    [Fact]
    public void Simulated_p_values_are_the_recorded_ones()
    {
        var (laws, series) = (new NullLaws(), On(250, 10, 90, 91, 130, 131));
        double[] u = [.. Uniforms(61, 250).Select(x => x * x)];
        var (var, shortfall) = (-InverseNormal.Of(0.025), NormalDensity.Of(InverseNormal.Of(0.025)) / 0.025);
        var (z1, z2) = AcerbiSzekelyTests.Of([.. u.Select(x => new ShortfallDay(0.6 * InverseNormal.Of(x), var, shortfall, InverseNormal.Of))], C975);
        StatisticalTest[] tests = [HaasTest.Of(series, C99, laws), DurationTest.Of(series, laws), z1, z2, BerkowitzTailTest.Of([.. u.Select(x => Math.Sqrt(x))], C975, laws)];
        Assert.All(tests, t => Assert.Equal(PValueMethod.Simulated, t.Method));
        Assert.Equal([0.001999900005, 0.131286871313, 0.012016823553, 0.987402519496, 0.0170491475426], tests.Select(t => t.PValue!.Value));
    }
}
