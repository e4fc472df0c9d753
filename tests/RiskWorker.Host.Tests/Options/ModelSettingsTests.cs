using System.Text;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

/// <summary>Models of every kind in the settings: their keys, the keys of other kinds, what stands beside the model of record.</summary>
public sealed class ModelSettingsTests
{
    private static readonly string[] s_keys =
        ["covariance", "lambda", "window", "drift", "drifts", "missingDays", "ageing", "degreesOfFreedom", "margins", "ageWeight", "volatility", "jumps", "model", "span"];

    private static readonly Dictionary<string, string[]> s_keysOf = new()
    {
        ["lognormal"] = ["covariance", "lambda", "window", "drift", "drifts", "missingDays", "ageing"],
        ["student-t"] = ["covariance", "lambda", "window", "drift", "drifts", "missingDays", "degreesOfFreedom", "margins"],
        ["historical"] = ["window", "ageWeight"],
        ["filtered-historical"] = ["window", "lambda", "volatility"],
        ["jump-diffusion"] = ["covariance", "lambda", "window", "drift", "drifts", "missingDays", "jumps"],
        ["stressed"] = ["model", "span"],
    };

    public static TheoryData<string, string> OthersKeys => [.. from kind in s_keysOf from key in s_keys.Except(kind.Value) select new TheoryDataRow<string, string>(kind.Key, key)];

    [Fact]
    public void Read_every_key_of_every_kind_sets_what_it_says()
    {
        var models = Read("""
            { "models": {
                "plain": { "kind": "lognormal", "covariance": "shrunk", "lambda": 0.97, "window": 300, "drift": "explicit", "drifts": { "A": 0.05 }, "missingDays": "complete", "ageing": "none" },
                "t": { "kind": "student-t", "covariance": "equal", "lambda": 0.9, "window": 400, "drift": "historical", "missingDays": "pairwise", "degreesOfFreedom": 4.5, "margins": "common" },
                "t-fitted": { "kind": "student-t", "degreesOfFreedom": null, "margins": "own" },
                "past": { "kind": "historical", "window": 250, "ageWeight": 0.99 },
                "filtered": { "kind": "filtered-historical", "window": 750, "lambda": 0.95, "volatility": "garch" },
                "jumps": { "kind": "jump-diffusion", "jumps": { "threshold": 3.5 } },
                "given": { "kind": "jump-diffusion", "covariance": "given", "jumps": {
                    "common": { "perYear": 6, "moves": { "A": { "mean": -0.05, "deviation": 0.02 } } },
                    "own": { "B": { "perYear": 12, "mean": 0.01, "deviation": 0 } } } },
                "stress": { "kind": "stressed", "model": "past", "span": 200 } },
              "record": "plain", "challengers": [ "t", "stress", "past", "given" ] }
            """);
        var m = models.Models;
        Assert.Equal((ModelKind.Lognormal, CovarianceEstimator.Shrunk, 0.97, 300, DriftKind.Explicit, MissingDays.Complete), (m["plain"].Kind, m["plain"].Covariance, m["plain"].Lambda, m["plain"].Window, m["plain"].Drift, m["plain"].MissingDays));
        Assert.Equal((ModelKind.StudentT, CovarianceEstimator.Equal, DriftKind.Historical, MissingDays.Pairwise, 4.5, StudentMargins.Common), (m["t"].Kind, m["t"].Covariance, m["t"].Drift, m["t"].MissingDays, m["t"].DegreesOfFreedom, m["t"].Margins));
        Assert.Equal((null, StudentMargins.Own), (m["t-fitted"].DegreesOfFreedom, m["t-fitted"].Margins));
        Assert.Equal((ModelKind.Historical, 250, 0.99), (m["past"].Kind, m["past"].Window, m["past"].AgeWeight));
        Assert.Equal((ModelKind.FilteredHistorical, 750, 0.95, VolatilityFilter.Garch), (m["filtered"].Kind, m["filtered"].Window, m["filtered"].Lambda, m["filtered"].Volatility));
        Assert.Equal((3.5, false), (m["jumps"].Jumps.Threshold, m["jumps"].Jumps.AreGiven));
        Assert.Equal((6.0, true), (m["given"].Jumps.CommonPerYear, m["given"].Jumps.AreGiven));
        Assert.Equal(new JumpSize(-0.05, 0.02), m["given"].Jumps.Common["A"]);
        Assert.Equal(new OwnJumps(12, new(0.01, 0)), m["given"].Jumps.Own["B"]);
        Assert.Equal((ModelKind.Stressed, 200, "past"), (m["stress"].Kind, m["stress"].Span, m["stress"].Stressed!.Name));
        Assert.Equal("plain", models.Run.Model.Name);
        Assert.Equal(["given", "past", "stress", "t"], models.Run.Challengers.Select(c => c.Name));
    }

    [Fact]
    public void Read_kind_alone_has_the_defaults()
    {
        foreach (var kind in s_keysOf.Keys.Where(k => k != "stressed"))
        {
            var model = Read($$"""{ "models": { "m": { "kind": "{{kind}}" } } }""").Run.Model;
            Assert.Equal(new ModelSettings { Name = "m", Kind = ModelKinds.ByName[kind], Drifts = model.Drifts, Jumps = model.Jumps }, model);
        }
    }

    [Theory]
    [MemberData(nameof(OthersKeys))]
    public void Read_key_of_another_kind_is_refused_by_name(string kind, string key)
    {
        var value = key switch { "drifts" or "jumps" => "{}", "lambda" or "ageWeight" => "0.9", "window" or "span" => "100", "degreesOfFreedom" => "5", _ => "\"x\"" };
        var needed = kind == "stressed" ? ", \"model\": \"base\"" : "";
        var faults = Faults($$"""{ "models": { "base": {}, "m": { "kind": "{{kind}}"{{needed}}, "{{key}}": {{value}} } }, "record": "base" }""");
        Assert.Contains(faults, f => f.StartsWith($"models.m.{key}: found ", StringComparison.Ordinal)
            && f.EndsWith($"expected no '{key}', which a model of kind '{kind}' does not use; it has kind, {string.Join(", ", s_keysOf[kind])}", StringComparison.Ordinal));
    }

    [Fact]
    public void Read_faults_of_several_models_come_in_one_answer() => Assert.Equal(
        [
            "models.a.kind: found \"garch\", expected one of lognormal, student-t, historical, filtered-historical, jump-diffusion, stressed",
            "models.b.degreesOfFreedom: found 2, expected a number from 2.05 to 1,000, or null to have it fitted",
            "models.b.margins: found \"each\", expected one of common, own",
            "models.c.jumps.threshold: found 2, expected a number of standard deviations from 2.5 to 20",
            "models.d.ageWeight: found 1, expected a number strictly between 0 and 1",
            "models.e.volatility: found \"arch\", expected one of ewma, garch",
            "models.f.covariance: found \"sample\", expected one of ewma, equal, shrunk, given",
            "models.f.missingDays: found \"drop\", expected one of complete, pairwise",
            "models.g.span: found 19, expected a whole number from 20 to 100,000",
            "models.g.model: found nothing, expected the name of the model to calibrate to the worst span",
        ],
        Faults("""
            { "models": {
                "a": { "kind": "garch" },
                "b": { "kind": "student-t", "degreesOfFreedom": 2, "margins": "each" },
                "c": { "kind": "jump-diffusion", "jumps": { "threshold": 2 } },
                "d": { "kind": "historical", "ageWeight": 1 },
                "e": { "kind": "filtered-historical", "volatility": "arch" },
                "f": { "covariance": "sample", "missingDays": "drop" },
                "g": { "kind": "stressed", "span": 19 } },
              "record": "a" }
            """));

    [Theory]
    [InlineData("""{ "common": { } }""", "models.m.jumps.common.perYear: found nothing", "models.m.jumps.common.moves: found nothing")]
    [InlineData("""{ "common": { "perYear": 0, "moves": {} } }""", "models.m.jumps.common.perYear: found 0, expected jumps a year, above 0 and at most 252")]
    [InlineData("""{ "own": { "A": { "perYear": 300, "mean": 3, "deviation": -1 } } }""",
        "models.m.jumps.own.A.perYear: found 300", "models.m.jumps.own.A.mean: found 3, expected a size from -2 to 2", "models.m.jumps.own.A.deviation: found -1, expected a number from 0 to 2")]
    [InlineData("""{ "own": { "A": { } } }""", "models.m.jumps.own.A.perYear: found nothing", "models.m.jumps.own.A.mean: found nothing", "models.m.jumps.own.A.deviation: found nothing")]
    [InlineData("""{ "threshold": 4, "own": { "A": { "perYear": 1, "mean": 0, "deviation": 0.1 } } }""", "models.m.jumps.threshold: found 4, expected no threshold where jumps are given")]
    [InlineData("""{ "size": 1 }""", "models.m.jumps.size: found an unknown key, expected one of threshold, common, own")]
    public void Read_jumps_with_faults_says_each(string jumps, params string[] expected)
    {
        var faults = Faults($$"""{ "models": { "m": { "kind": "jump-diffusion", "jumps": {{jumps}} } } }""");
        Assert.Equal(expected.Length, faults.Length);
        Assert.All(expected.Zip(faults), pair => Assert.StartsWith(pair.First, pair.Second, StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("""[ "c" ]""", "challengers[0]: found \"c\", expected the name of a model: a, b")]
    [InlineData("""[ "b", "b" ]""", "challengers[1]: found \"b\", expected each challenger once")]
    [InlineData("""[ "a" ]""", "challengers[0]: found \"a\", expected another model than the one of record")]
    [InlineData("\"b\"", "challengers: found \"b\", expected an array")]
    public void Read_challenger_that_is_none_is_a_fault(string challengers, string fault) =>
        Assert.Equal([fault], Faults($$"""{ "models": { "a": {}, "b": {} }, "record": "a", "challengers": {{challengers}} }"""));

    [Theory]
    [InlineData("nobody")]
    [InlineData("other")]
    [InlineData("fixed")]
    [InlineData("s")]
    public void Read_stressed_of_what_has_no_history_is_a_fault(string of)
    {
        var json = $$"""{ "models": { "base": {}, "fixed": { "covariance": "given" }, "other": { "kind": "stressed", "model": "base" }, "s": { "kind": "stressed", "model": "{{of}}" } }, "record": "base" }""";
        Assert.Equal([$"models.s.model: found \"{of}\", expected the name of a model that is calibrated to the history: base"], Faults(json));
    }

    [Fact]
    public void Read_stressed_alone_says_that_there_is_nothing_to_calibrate() =>
        Assert.Equal(["models.s.model: found \"x\", expected the name of a model that is calibrated to the history; there is none"], Faults("""{ "models": { "s": { "kind": "stressed", "model": "x" } } }"""));

    [Fact]
    public void Read_stressed_may_name_a_model_that_stands_after_it() =>
        Assert.Equal("z", Read("""{ "models": { "s": { "kind": "stressed", "model": "z" }, "z": {} }, "record": "s" }""").Run.Model.Stressed!.Name);

    private static Configuration Read(string json) => ConfigurationReader.Read(Encoding.UTF8.GetBytes(json), "riskworker.json");

    private static string[] Faults(string json) => [.. Assert.Throws<SettingsException>(() => Read(json)).Faults.Select(f => f.ToString())];
}
