using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class NearestKeyTests
{
    [Theory]
    [InlineData("simulaton", "simulation")]
    [InlineData("Simulation", "simulation")]
    [InlineData("simualtion", "simulation")]
    [InlineData("sede", "seed")]
    [InlineData("x", null)]
    [InlineData("notification", null)]
    public void Of_typed_key_finds_the_one_within_a_third(string typed, string? meant) => Assert.Equal(meant, NearestKey.Of(typed, ["seed", "simulation", "schedules"]));

    [Fact]
    public void Of_no_keys_finds_none() => Assert.Null(NearestKey.Of("x", []));
}
