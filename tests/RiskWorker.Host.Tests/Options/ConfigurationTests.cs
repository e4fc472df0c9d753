using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class ConfigurationTests
{
    [Fact]
    public void With_nothing_changes_nothing()
    {
        var configuration = new Configuration();
        Assert.Equal(configuration.Run, configuration.With(new()).Run);
    }

    [Fact]
    public void With_scenarios_seed_and_model_replaces_them()
    {
        var other = new ModelSettings { Name = "other", Lambda = 0.8 };
        var configuration = new Configuration { Models = new Dictionary<string, ModelSettings> { ["lognormal"] = new(), ["other"] = other } };
        var run = configuration.With(new(Scenarios: 2_000, Seed: 9, Model: "other")).Run;
        Assert.Equal((2_000, 9UL, other, 1_600_000), (run.Simulation.Scenarios, run.Simulation.Seed, run.Model, run.Simulation.Cap));
    }

    [Fact]
    public void With_a_challenger_for_the_record_leaves_the_others_beside_it()
    {
        ModelSettings a = new() { Name = "a" }, b = new() { Name = "b" }, c = new() { Name = "c" };
        var configuration = new Configuration { Models = new Dictionary<string, ModelSettings> { ["a"] = a, ["b"] = b, ["c"] = c }, Written = new() { Model = a, Challengers = [b, c] } };
        var run = configuration.With(new(Model: "c")).Run;
        Assert.Equal(c, run.Model);
        Assert.Equal([b], run.Challengers);
    }

    [Fact]
    public void With_more_scenarios_than_the_cap_raises_the_cap() => Assert.Equal(4_000_000, new Configuration().With(new(Scenarios: 4_000_000)).Run.Simulation.Cap);

    [Fact]
    public void With_wrong_values_names_all_of_them()
    {
        var refusal = Assert.Throws<SettingsException>(() => new Configuration().With(new(Scenarios: 999, Model: "x")));
        Assert.Equal(
            "command line: 2 faults\n" +
            "  --scenarios: found 999, expected a whole number from 1,000 to 100,000,000\n" +
            "  --model: found 'x', expected the name of a model of the settings: lognormal", refusal.Message);
    }
}
