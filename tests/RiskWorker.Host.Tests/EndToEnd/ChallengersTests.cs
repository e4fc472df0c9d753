using System.Globalization;
using System.Text;
using System.Text.Json;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>Five models side by side on a small feed: from CSV to results.json, counted over filled days, and computed again by <c>verify</c>.</summary>
public sealed class ChallengersTests : IDisposable
{
    private const int Priced = 160, Filled = 20;
    private static readonly string[] s_challengers = ["filtered", "jumps", "past", "t"];
    private readonly RunFolder _folder = new();

    public ChallengersTests()
    {
        _folder.WriteTinyFeed();
        _folder.WriteSettings("""
            { "models": { "plain": { "window": 120 }, "t": { "kind": "student-t", "covariance": "equal", "window": 120 }, "past": { "kind": "historical", "window": 120, "ageWeight": 0.99 },
                          "filtered": { "kind": "filtered-historical", "window": 120, "volatility": "garch" },
                          "jumps": { "kind": "jump-diffusion", "window": 120, "jumps": { "own": { "AAA": { "perYear": 20, "mean": -0.05, "deviation": 0.02 } } } } },
              "record": "plain", "challengers": [ "t", "past", "filtered", "jumps" ], "backfill": 20,
              "measures": [ { "measure": "var", "confidence": 0.99 }, { "measure": "es", "confidence": 0.975 } ],
              "simulation": { "scenarios": 4000, "looks": 1, "cap": 100000 } }
            """);
        WritePrices();
    }

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Measure_gives_each_challengers_figures_and_counts_and_verify_finds_them_equal()
    {
        var results = await _folder.MeasureAsync(0);

        Assert.Equal("plain", results.GetProperty("model").GetString());
        var models = results.GetProperty("models").EnumerateArray().ToList();
        Assert.Equal(s_challengers, models.Select(m => m.GetProperty("name").GetString()));
        Assert.Equal(["filtered-historical", "jump-diffusion", "historical", "student-t"], models.Select(m => m.GetProperty("kind").GetString()));
        Assert.Equal([4_000, 4_000, 120, 4_000], models.Select(m => m.GetProperty("scenarios").GetInt32()));
        var vars = models.Append(results).Select(m => m.GetProperty("nodes")[0].GetProperty("measures")[0].GetProperty("value").GetDouble()).ToList();
        Assert.Equal(5, vars.Distinct().Count());
        Assert.All(vars, v => Assert.InRange(v, 500, 15_000)); // of a position of some 100,000
        var past = models[2].GetProperty("nodes")[0].GetProperty("measures")[0];
        Assert.Equal(past.GetProperty("value").GetDouble(), past.GetProperty("high").GetDouble());

        var backtests = results.GetProperty("modelBacktests").EnumerateArray().ToList();
        Assert.Equal(new[] { "plain" }.Concat(s_challengers).SelectMany(m => new[] { (m, 250), (m, 500) }), backtests.Select(b => (b.GetProperty("model").GetString()!, b.GetProperty("window").GetInt32())));
        Assert.All(backtests, b => Assert.Equal(Filled, b.GetProperty("days").GetInt32()));
        Assert.All(backtests, b => Assert.Equal(JsonValueKind.Null, b.GetProperty("zone").ValueKind));
        Assert.All(backtests, b => Assert.InRange(b.GetProperty("coverage").GetProperty("pValue").GetDouble(), 0, 1));

        var verified = await _folder.RunAsync("verify", results.GetProperty("run").GetString()!);
        Assert.True(verified.Code == 0, verified.Output + verified.Error);
    }

    // The model of record's figures do not hang on what runs beside it.
    [Fact]
    public async Task Figures_of_the_record_are_those_of_a_run_without_challengers()
    {
        var beside = await _folder.MeasureAsync(0, "--as-of", Day(Priced - 2));
        _folder.WriteSettings("""
            { "models": { "plain": { "window": 120 } }, "backfill": 20,
              "measures": [ { "measure": "var", "confidence": 0.99 }, { "measure": "es", "confidence": 0.975 } ],
              "simulation": { "scenarios": 4000, "looks": 1, "cap": 100000 } }
            """);
        var alone = await _folder.MeasureAsync(0, "--as-of", Day(Priced - 2));
        Assert.Equal(beside.GetProperty("nodes").GetRawText(), alone.GetProperty("nodes").GetRawText());
        Assert.Empty(alone.GetProperty("models").EnumerateArray());
    }

    [Fact]
    public async Task Measure_with_a_challenger_that_cannot_be_calibrated_is_degraded_and_says_why()
    {
        _folder.WriteSettings("""
            { "models": { "plain": { "window": 120 }, "stress": { "kind": "stressed", "model": "plain" } }, "record": "plain", "challengers": [ "stress" ],
              "simulation": { "scenarios": 2000, "looks": 1, "cap": 100000 } }
            """);
        var results = await _folder.MeasureAsync(0);
        Assert.Equal("degraded", results.GetProperty("status").GetString());
        var finding = Assert.Single(results.GetProperty("findings").EnumerateArray(), f => f.GetProperty("code").GetString() == "model-failed");
        Assert.Contains("span of 250 days", finding.GetProperty("message").GetString(), StringComparison.Ordinal);
        Assert.Empty(results.GetProperty("models")[0].GetProperty("nodes").EnumerateArray());
        Assert.Equal(0, (await _folder.RunAsync("verify", results.GetProperty("run").GetString()!)).Code);
    }

    [Fact]
    public async Task Measure_with_a_record_that_cannot_be_calibrated_stops_with_a_finding()
    {
        _folder.WriteSettings("""{ "models": { "plain": {}, "stress": { "kind": "stressed", "model": "plain" } }, "record": "stress", "simulation": { "scenarios": 2000, "looks": 1, "cap": 100000 } }""");
        var results = await _folder.MeasureAsync(2);
        Assert.Equal("failed", results.GetProperty("status").GetString());
        Assert.Contains("model-unusable", results.GetProperty("findings").EnumerateArray().Select(f => f.GetProperty("code").GetString()));
    }

    private static string Day(int i) => Days()[i].ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static DateOnly[] Days() =>
        [.. Enumerable.Range(0, 2 * Priced).Select(back => TinyFeed.AsOf.AddDays(-back)).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).Take(Priced).Reverse()];

    private void WritePrices()
    {
        var (prices, positions, price, random) = (new StringBuilder("date,factor,value\n"), new StringBuilder("as_of,book,instrument,quantity\n"), 100.0, new Random(8));
        foreach (var date in Days())
        {
            price *= 1 + (0.02 * (random.NextDouble() + random.NextDouble() - 1));
            prices.Append(CultureInfo.InvariantCulture, $"{date:yyyy-MM-dd},AAA,{price:0.0000}\n");
        }
        foreach (var date in Days().TakeLast(Filled + 1)) positions.Append(CultureInfo.InvariantCulture, $"{date:yyyy-MM-dd},FIRM,AAA share,1000\n");
        _folder.WriteFeed("observations.csv", prices.ToString());
        _folder.WriteFeed("positions.csv", positions.ToString());
    }
}
