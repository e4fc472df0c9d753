using System.Text;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class AgeingSettingsTests
{
    [Theory]
    [InlineData("""{ "models": { "m": {} } }""", false)]
    [InlineData("""{ "models": { "m": { "ageing": "none" } } }""", false)]
    [InlineData("""{ "models": { "m": { "ageing": "horizon" } } }""", true)]
    [InlineData("""{ "models": { "m": { "ageing": "horizon" }, "worst": { "kind": "stressed", "model": "m" } }, "record": "worst" }""", true)]
    public void Read_says_whether_the_valuation_date_moves(string json, bool ages) => Assert.Equal(ages, Read(json).Run.Model.Ages);

    // Inside a horizon only the log-normal model knows where its factors are.
    [Theory]
    [InlineData("student-t")]
    [InlineData("historical")]
    [InlineData("filtered-historical")]
    [InlineData("jump-diffusion")]
    public void Read_refuses_ageing_of_other_kinds(string kind)
    {
        var faults = Assert.Throws<SettingsException>(() => Read($$"""{ "models": { "m": { "kind": "{{kind}}", "ageing": "horizon" } } }""")).Faults;
        Assert.Contains($"no 'ageing', which a model of kind '{kind}' does not use", Assert.Single(faults).ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Read_word_that_is_neither_is_a_fault() =>
        Assert.Equal("models.m.ageing: found \"daily\", expected one of none, horizon", Assert.Single(Assert.Throws<SettingsException>(() => Read("""{ "models": { "m": { "ageing": "daily" } } }""")).Faults).ToString());

    private static Configuration Read(string json) => ConfigurationReader.Read(Encoding.UTF8.GetBytes(json), "riskworker.json");
}
