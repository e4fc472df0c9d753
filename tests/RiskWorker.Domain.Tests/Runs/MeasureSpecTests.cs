using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class MeasureSpecTests
{
    [Fact]
    public void CompareTo_orders_by_horizon_then_kind_then_confidence()
    {
        MeasureSpec[] expected =
        [
            new(MeasureKind.Var, new(0.95m), new(1)), new(MeasureKind.Var, new(0.99m), new(1)), new(MeasureKind.Es, new(0.9m), new(1)),
            new(MeasureKind.Var, new(0.5m), new(10)), new(MeasureKind.Es, new(0.5m), new(10)),
        ];
        Assert.Equal(expected, expected.Reverse().Order());
    }

    [Fact]
    public void ToString_reads_as_a_report_prints_it()
    {
        Assert.Equal("VaR 99%, 1 day", new MeasureSpec(MeasureKind.Var, new(0.99m), new(1)).ToString());
        Assert.Equal("ES 97.5%, 10 days", new MeasureSpec(MeasureKind.Es, new(0.975m), new(10)).ToString());
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-1)]
    public void Horizon_below_one_day_is_refused(int days) => Assert.Throws<ArgumentOutOfRangeException>(() => new Horizon(days));
}
