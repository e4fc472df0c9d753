namespace RiskWorker.Domain.Tests;

public sealed class PlaceTests
{
    [Fact]
    public void True_is_true() => Assert.True(true);
}
