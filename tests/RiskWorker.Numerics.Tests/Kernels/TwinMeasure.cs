using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Tests.Kernels;

public sealed class TwinMeasure
{
    [Fact]
    public void All()
    {
        var mo = new MovedOptionTerms(100, 104, true);
        MarketBlock.AssertLanesEqualTwin(100, (in MarketSpans m, double q, double b, Span<double> p) => MovedOption.AccumulateValue(mo, m, q, b, p), (in MarketPoint m, double q, double b, double p) => MovedOption.Profit(mo, m, q, b, p));
    }
}
