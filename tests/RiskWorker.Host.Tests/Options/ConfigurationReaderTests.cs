using System.Text;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Tests.Options;

public sealed class ConfigurationReaderTests
{
    [Fact]
    public async Task ReadAsync_folder_without_file_gives_the_defaults()
    {
        using var folder = new TemporaryFolder();
        var configuration = await ConfigurationReader.ReadAsync(folder.Path, TestContext.Current.CancellationToken);
        Assert.Equal(CovarianceEstimator.Ewma, configuration.Run.Model.Covariance);
        Assert.Equal((0.94, 500, DriftKind.Zero), (configuration.Run.Model.Lambda, configuration.Run.Model.Window, configuration.Run.Model.Drift));
        Assert.Equal((100_000, 1UL, 5, 1_600_000, null),
            (configuration.Run.Simulation.Scenarios, configuration.Run.Simulation.Seed, configuration.Run.Simulation.Looks, configuration.Run.Simulation.Cap, configuration.Run.Simulation.Precision));
        Assert.Equal(["VaR 99%, 1 day", "ES 97.5%, 1 day"], configuration.Run.Measures.Select(m => m.ToString()));
        Assert.Equal(("riskworker.db", 0, 0), (configuration.StorePath, configuration.BackfillDays, configuration.Schedules.Count));
    }

    [Fact]
    public void Read_empty_object_equals_the_defaults()
    {
        var (read, defaults) = (Read("{}"), new Configuration());
        Assert.Equal(defaults.Models.Keys, read.Models.Keys);
        Assert.Equal(defaults.Run.Measures, read.Run.Measures);
        Assert.Equal(defaults.Run.Simulation, read.Run.Simulation);
        Assert.Equal((defaults.StorePath, defaults.BackfillDays, defaults.Run.TimeEffectsIncluded), (read.StorePath, read.BackfillDays, read.Run.TimeEffectsIncluded));
    }

    [Fact]
    public void Read_every_key_sets_what_it_says()
    {
        var read = Read("""
            {
              "store": { "path": "data/risk.db" },
              "timeEffects": "included",
              "models": {
                "fast": { "kind": "lognormal", "covariance": "ewma", "lambda": 0.9, "window": 250, "drift": "historical", "ageing": "horizon" },
                "slow": { "covariance": "equal", "window": 1000, "drift": "explicit", "drifts": { "AAA": 0.05, "BBB": -0.01 } }
              },
              "record": "slow",
              "challengers": [],
              "measures": [ { "measure": "es", "confidence": 0.975, "horizonDays": 10 }, { "measure": "var", "confidence": 0.99 } ],
              "simulation": { "scenarios": 50000, "seed": 18446744073709551615, "looks": 3, "cap": 200000, "precision": 0.01, "revaluation": "surface", "surfaceError": 1e-7, "exactTail": true },
              "backfill": 250,
              "checks": { "staleDays": 4, "jumpSigmas": 6.5, "minimumHistory": 30, "valueTolerance": 0, "grossChange": 0.25, "severity": { "price-stale": "blocking" } },
              "schedules": { "daily": { "cron": "0 30 6 ? * MON-FRI", "timeZone": "Europe/Oslo", "calendar": "OSLO", "verb": "measure", "deadline": "07:30" } },
              "delivery": {},
              "page": {}
            }
            """);
        Assert.Equal(["fast", "slow"], read.Models.Keys);
        Assert.Equal(("fast", 0.9, 250, DriftKind.Historical), (read.Models["fast"].Name, read.Models["fast"].Lambda, read.Models["fast"].Window, read.Models["fast"].Drift));
        Assert.Equal((AgeingKind.Horizon, AgeingKind.None), (read.Models["fast"].Ageing, read.Models["slow"].Ageing));
        Assert.Equal(("slow", CovarianceEstimator.Equal, 1000), (read.Run.Model.Name, read.Run.Model.Covariance, read.Run.Model.Window));
        Assert.Equal([new("AAA", 0.05), new("BBB", -0.01)], read.Run.Model.Drifts);
        Assert.Equal(["VaR 99%, 1 day", "ES 97.5%, 10 days"], read.Run.Measures.Select(m => m.ToString()));
        Assert.Equal(new SimulationSettings { Scenarios = 50_000, Seed = ulong.MaxValue, Looks = 3, Cap = 200_000, Precision = 0.01 }, read.Run.Simulation);
        Assert.Equal((4, 6.5, 30, 0.0, 0.25), (read.Run.Checks.StaleDays, read.Run.Checks.JumpSigmas, read.Run.Checks.MinimumHistory, read.Run.Checks.ValueTolerance, read.Run.Checks.GrossChange));
        Assert.Equal([new("price-stale", FindingSeverity.Blocking)], read.Run.Checks.Severity);
        Assert.True(read.Run.TimeEffectsIncluded);
        Assert.Equal(("data/risk.db", 250), (read.StorePath, read.BackfillDays));
        Assert.Equal([new ScheduleOptions("daily", "0 30 6 ? * MON-FRI", TimeZoneInfo.FindSystemTimeZoneById("Europe/Oslo"), "OSLO", "measure", new TimeOnly(7, 30))], read.Schedules);
    }

    [Theory]
    [InlineData("{}", CurveInterpolation.LinearZero)]
    [InlineData("""{ "curves": {} }""", CurveInterpolation.LinearZero)]
    [InlineData("""{ "curves": { "interpolation": "linear-zero" } }""", CurveInterpolation.LinearZero)]
    [InlineData("""{ "curves": { "interpolation": "log-linear-discount" } }""", CurveInterpolation.LogLinearDiscount)]
    public void Read_curves_sets_their_interpolation(string json, CurveInterpolation expected) => Assert.Equal(expected, Read(json).Run.CurveInterpolation);

    [Theory]
    [InlineData("""{ "curves": { "interpolation": "cubic", "extrapolation": "flat" } }""", "curves.extrapolation", "curves.interpolation", "one of linear-zero, log-linear-discount")]
    [InlineData("""{ "curves": "linear-zero" }""", "curves", "an object")]
    public void Read_curves_with_faults_says_all_of_them(string json, params string[] parts)
    {
        var message = Assert.Throws<SettingsException>(() => Read(json)).Message;
        Assert.All(parts, part => Assert.Contains(part, message, StringComparison.Ordinal));
    }

    [Fact]
    public void Read_faults_of_every_section_come_in_one_message()
    {
        var refusal = Assert.Throws<SettingsException>(() => Read("""
            {
              "store": { "path": "../risk.db" },
              "simulaton": {},
              "models": { "a b": { "lambda": 1, "window": 1 } },
              "measures": [ { "measure": "VaR", "confidence": 99 } ],
              "simulation": { "scenarios": 999, "looks": 0, "looks": 2, "cap": 10 },
              "schedules": { "daily": { "cron": "30 6 * * *", "timeZone": "Oslo" } },
              "page": { "port": 80 }
            }
            """));
        Assert.Equal("""
            riskworker.json: 13 faults
              simulaton: found an unknown key, expected one of store, timeEffects, models, record, challengers, measures, rules, simulation, curves, backfill, checks, schedules, evidence, delivery, page; did you mean 'simulation'?
              models["a b"].lambda: found 1, expected a number strictly between 0 and 1
              models["a b"].window: found 1, expected a whole number from 2 to 100,000
              page.port: found an unknown key, expected no key here
              store.path: found "../risk.db", expected a path below the out folder, such as 'riskworker.db'
              schedules.daily.cron: found "30 6 * * *", expected a cron expression 'second minute hour day-of-month month day-of-week [year]', such as '0 30 6 ? * MON-FRI'
              schedules.daily.timeZone: found "Oslo", expected an IANA time zone known on this machine, such as 'Europe/Oslo'
              measures[0].measure: found "VaR", expected one of var, es, les
              measures[0].confidence: found 99, expected a number strictly between 0 and 1
              simulation.looks: found the key a second time, expected each key once
              simulation.scenarios: found 999, expected a whole number from 1,000 to 100,000,000
              simulation.looks: found 0, expected a whole number from 1 to 20
              simulation.cap: found 10, expected a whole number from 100,000 to 100,000,000
            """.ReplaceLineEndings("\n"), WithoutReasons(refusal.Message));
    }

    [Theory]
    [InlineData("""{ "models": { "m": { "kind": "student" } } }""", "models.m.kind: found \"student\", expected one of lognormal, student-t, historical, filtered-historical, jump-diffusion, stressed")]
    [InlineData("""{ "models": { "m": { "covariance": "sample" } } }""", "models.m.covariance: found \"sample\", expected one of ewma, equal, shrunk, given")]
    [InlineData("""{ "models": { "m": { "ageing": "daily" } } }""", "models.m.ageing: found \"daily\", expected one of none, horizon")]
    [InlineData("""{ "models": { "m": {} }, "record": "n" }""", "record: found \"n\", expected the name of a model: m")]
    [InlineData("""{ "models": { "m": {}, "n": {} } }""", "record: found nothing, expected the name of a model: m, n")]
    [InlineData("""{ "models": { "m": { "drift": "explicit" } } }""", "models.m.drifts: found nothing, expected returns per year by factor, which drift 'explicit' needs")]
    [InlineData("""{ "models": { "m": { "drifts": { "A": 0.1 } } } }""", "models.m.drifts: found an object, expected no drifts, which only drift 'explicit' uses")]
    [InlineData("""{ "challengers": [ "m" ] }""", "challengers[0]: found \"m\", expected the name of a model: lognormal")]
    [InlineData("""{ "measures": [] }""", "measures: found an empty array, expected an array of at least one measure")]
    [InlineData("""{ "measures": [ { "measure": "es", "confidence": 0.975 }, { "measure": "es", "confidence": 0.9750, "horizonDays": 1 } ] }""", "measures[1]: found an object, expected each measure once; ES 97.5%, 1 day is there already")]
    [InlineData("""{ "simulation": { "scenarios": 1e3 } }""", "simulation.scenarios: found 1e3, expected a whole number from 1,000 to 100,000,000")]
    [InlineData("""{ "simulation": { "precision": 1e400 } }""", "simulation.precision: found 1e400, expected null or a number strictly between 0 and 1")]
    [InlineData("""{ "simulation": { "seed": -1 } }""", "simulation.seed: found -1, expected a whole number from 0 to 18446744073709551615")]
    [InlineData("""{ "checks": { "severity": { "price-jump": "info" } } }""", "checks.severity.price-jump: found \"info\", expected one of blocking, warning")]
    [InlineData("""{ "checks": { "severity": { "price-jumb": "warning" } } }""", "checks.severity.price-jumb: found \"warning\", expected a code from the README's table of findings; did you mean 'price-jump'?")]
    [InlineData("""{ "checks": { "severity": { "book-tree": "warning" } } }""", "checks.severity.book-tree: found \"warning\", expected nothing here: nothing can be computed past this finding, so it always blocks")]
    [InlineData("""{ "checks": { "jumpSigma": 3 } }""", "checks.jumpSigma: found an unknown key, expected one of staleDays, jumpSigmas, minimumHistory, valueTolerance, grossChange, severity; did you mean 'jumpSigmas'?")]
    [InlineData("""{ "schedules": { "d": { "cron": "0 0 6 * * ?", "timeZone": "UTC", "verb": "tail", "deadline": "7:30" } } }""",
        "schedules.d.verb: found \"tail\", expected one of measure; 'tail' is not available in this version", "schedules.d.deadline: found \"7:30\", expected a time of day as HH:mm")]
    [InlineData("""{ "\u001b[31m": 1 }""", "[\"?[31m\"]: found an unknown key, expected one of store, timeEffects, models, record, challengers, measures, rules, simulation, curves, backfill, checks, schedules, evidence, delivery, page")]
    [InlineData("[]", "$: found an empty array, expected an object")]
    [InlineData("null", "$: found null, expected an object")]
    public void Read_fault_names_path_found_and_expected(string json, params string[] faults) =>
        Assert.Equal(faults, Assert.Throws<SettingsException>(() => Read(json)).Faults.Select(f => f.ToString()));

    [Theory]
    [InlineData("0 99 6 * * ?")] // the parser's own mark for '*': it would fire every minute of the hour
    [InlineData("0 5,99 6 * * ?")]
    [InlineData("0 98 6 * * ?")]
    [InlineData("0 0 099 * * ?")]
    [InlineData("0 60 6 * * ?")]
    [InlineData("0 0 24 * * ?")]
    [InlineData("0 0 6 ? * 8")]
    [InlineData("0 6 * * *")]
    public void Read_cron_out_of_range_is_a_fault(string cron) =>
        Assert.Equal("schedules.d.cron", Assert.Single(Assert.Throws<SettingsException>(() => Read(Schedule(cron))).Faults).Path);

    [Theory]
    [InlineData("0 30 6 ? * MON-FRI")]
    [InlineData("0/5 * * * * ?")]
    [InlineData("59 59 23 L * ? 2099")]
    public void Read_cron_in_range_is_kept(string cron) => Assert.Equal(cron, Assert.Single(Read(Schedule(cron)).Schedules).Cron);

    [Theory]
    [InlineData("", "line 1, byte 1")]
    [InlineData("{ // no\n}", "line 1, byte 3")]
    [InlineData("{ \"backfill\": 1, }", "line 1, byte 18")]
    [InlineData("{\n  \"backfill\": 1\n", "line 3, byte 1")]
    [InlineData("{ \"record\": \"x", "line 1, byte 15")]
    [InlineData("{}\n{}", "line 2, byte 1")]
    [InlineData("{\n \"store\": { \"path\": \"\\ud800\" } }", "line 2, byte 21")]
    public void Read_broken_json_names_the_place(string json, string place) =>
        Assert.Equal(place, Assert.Single(Assert.Throws<SettingsException>(() => Read(json)).Faults).Path);

    [Fact]
    public void Read_bytes_that_are_no_utf8_are_refused() =>
        Assert.Equal("bytes that are not UTF-8", Assert.Single(Assert.Throws<SettingsException>(() => ConfigurationReader.Read(new byte[] { (byte)'"', 0xff, (byte)'"' }, "x")).Faults).Found);

    [Fact]
    public void Read_byte_order_mark_is_let_pass() => Assert.Equal(7, ConfigurationReader.Read((byte[])[0xef, 0xbb, 0xbf, .. "{ \"backfill\": 7 }"u8], "x").BackfillDays);

    [Fact]
    public void Read_deep_nesting_is_a_fault_and_no_crash() => Assert.Throws<SettingsException>(() => Read(new string('[', 100_000)));

    [Fact]
    public void Read_cap_that_is_not_given_is_never_below_the_scenarios() => Assert.Equal(5_000_000, Read("""{ "simulation": { "scenarios": 5000000 } }""").Run.Simulation.Cap);

    [Fact]
    public async Task ReadAsync_folder_that_is_not_there_is_a_fault()
    {
        using var folder = new TemporaryFolder();
        var missing = Path.Combine(folder.Path, "missing");
        var refusal = await Assert.ThrowsAsync<SettingsException>(() => ConfigurationReader.ReadAsync(missing, TestContext.Current.CancellationToken));
        Assert.Equal($"--config: found '{missing}', expected a folder that exists", Assert.Single(refusal.Faults).ToString());
    }

    [Fact]
    public async Task ReadAsync_folder_in_the_files_place_is_a_fault()
    {
        using var folder = new TemporaryFolder();
        Directory.CreateDirectory(Path.Combine(folder.Path, "riskworker.json"));
        await Assert.ThrowsAsync<SettingsException>(() => ConfigurationReader.ReadAsync(folder.Path, TestContext.Current.CancellationToken));
    }

    private static string Schedule(string cron) => $$"""{ "schedules": { "d": { "cron": "{{cron}}", "timeZone": "UTC" } } }""";

    private static Configuration Read(string json) => ConfigurationReader.Read(Encoding.UTF8.GetBytes(json), "riskworker.json");

    /// <summary>The scheduler library's own words stand in brackets behind ours; they are not ours to hold.</summary>
    private static string WithoutReasons(string message) => System.Text.RegularExpressions.Regex.Replace(message, @"(MON-FRI') \(.*\)", "$1");
}
