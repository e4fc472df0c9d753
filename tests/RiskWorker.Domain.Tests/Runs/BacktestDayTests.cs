using RiskWorker.Domain.Runs;

namespace RiskWorker.Domain.Tests.Runs;

public sealed class BacktestDayTests
{
    // A loss strictly greater than VaR; whatever is missing is an exception.
    [Theory]
    [InlineData(100.0, -100.0, false)]
    [InlineData(100.0, -100.00000000000001, true)] // the next double
    [InlineData(100.0, 250.0, false)]
    [InlineData(-5.0, 4.0, true)]
    [InlineData(null, 0.0, true)]
    [InlineData(100.0, null, true)]
    [InlineData(null, null, true)]
    public void IsException_is_a_loss_strictly_beyond_VaR_or_a_gap(double? var, double? profit, bool expected) =>
        Assert.Equal(expected, BacktestDay.IsException(var, profit));
}
