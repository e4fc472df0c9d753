using System.Globalization;
using System.Text;
using System.Text.Json;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>
/// The exception count through <c>measure --from --to</c>: one share whose daily losses stay well below its VaR, and a profit of nothing
/// on every day, so that each exception is one that a test put there.
/// </summary>
public sealed class BacktestSpanTests : IDisposable
{
    private const int Priced = 240;
    private static readonly DateOnly[] s_days = [.. Weekdays(Priced)];
    private readonly RunFolder _folder = new();

    public BacktestSpanTests()
    {
        _folder.WriteTinyFeed();
        _folder.WriteSettings("""{ "simulation": { "scenarios": 2000 }, "models": { "m": { "kind": "lognormal", "window": 60 } }, "record": "m" }""");
        WriteDays(Priced, without: null);
    }

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Measure_span_below_125_days_has_counts_but_no_zone()
    {
        await FillAsync(124, 1);
        var count = Count(await _folder.MeasureAsync(0));
        Assert.Equal((124, 124, 0), (Whole(count, "days"), Whole(count, "backfilled"), Whole(count, "exceptions")));
        Assert.Equal(JsonValueKind.Null, count.GetProperty("zone").ValueKind);
    }

    [Fact]
    public async Task Measure_span_of_125_days_has_a_zone_and_past_dates_are_backfilled()
    {
        await FillAsync(125, 1);
        var count = Count(await _folder.MeasureAsync(0));
        Assert.Equal((125, 0, "green"), (Whole(count, "days"), Whole(count, "exceptions"), count.GetProperty("zone").GetString()));

        var runs = JsonSerializer.Deserialize<JsonElement>((await _folder.RunAsync("runs", "--json")).Output).EnumerateArray().ToList();
        Assert.Equal(126, runs.Count);
        Assert.Equal("recorded", runs[0].GetProperty("evidence").GetString());
        Assert.All(runs.Skip(1), r => Assert.Equal("backfilled", r.GetProperty("evidence").GetString()));
        Assert.Single(_folder.Runs); // past dates have no documents
    }

    [Fact]
    public async Task Measure_day_without_its_row_of_profit_is_an_exception()
    {
        WriteDays(Priced, without: s_days[^10]);
        await FillAsync(40, 1);
        var count = Count(await _folder.MeasureAsync(0));
        Assert.Equal((40, 1, 1, 0), (Whole(count, "days"), Whole(count, "exceptions"), Whole(count, "actual"), Whole(count, "hypothetical")));
    }

    [Fact]
    public async Task Measure_day_after_a_gap_is_an_exception_on_both_counts()
    {
        await FillAsync(40, 21);
        await FillAsync(19, 1); // the close 20 days back has no run
        var count = Count(await _folder.MeasureAsync(0));
        Assert.Equal((40, 1, 1, 1, 1), (Whole(count, "days"), Whole(count, "missingVar"), Whole(count, "exceptions"), Whole(count, "actual"), Whole(count, "hypothetical")));
        Assert.Equal(s_days[^20], MissingDay(count));
    }

    [Fact]
    public async Task Measure_counts_the_recorded_run_of_a_date_whether_a_backfilled_one_comes_before_or_after()
    {
        WriteDays(Priced - 1, without: null);
        await _folder.RunAsync("measure", "--from", Iso(s_days[^2]), "--to", Iso(s_days[^2]), "--scenarios", "1000");
        var recorded = await _folder.MeasureAsync(0);
        Assert.Equal("recorded", recorded.GetProperty("evidence").GetString());
        await _folder.RunAsync("measure", "--from", Iso(s_days[^2]), "--to", Iso(s_days[^2]), "--scenarios", "4000");

        WriteDays(Priced, without: null);
        var day = Count(await _folder.MeasureAsync(0)).GetProperty("series").EnumerateArray().Single();
        Assert.Equal("recorded", day.GetProperty("evidence").GetString());
        Assert.Equal(recorded.GetProperty("nodes")[0].GetProperty("measures")[0].GetProperty("value").GetDouble(), day.GetProperty("var").GetDouble());
    }

    /// <summary>Backfills the closes from <paramref name="first"/> to <paramref name="last"/> days before the newest.</summary>
    private async Task FillAsync(int first, int last)
    {
        var ending = await _folder.RunAsync("measure", "--from", Iso(s_days[^(first + 1)]), "--to", Iso(s_days[^(last + 1)]));
        Assert.True(ending.Code == 0, ending.Error);
    }

    private void WriteDays(int days, DateOnly? without)
    {
        var (prices, positions, profits) = (new StringBuilder("date,factor,value\n"), new StringBuilder("as_of,book,instrument,quantity\n"), new StringBuilder("date,book,actual\n"));
        var price = 100.0;
        for (var t = 0; t < days; t++)
        {
            price *= 1 + ((t % 2 == 0 ? 0.01 : -0.01) * (1 + (t % 3)));
            prices.Append(CultureInfo.InvariantCulture, $"{Iso(s_days[t])},AAA,{price:0.0000}\n");
            if (t < Priced - 130) continue;
            positions.Append(CultureInfo.InvariantCulture, $"{Iso(s_days[t])},FIRM,AAA share,1000\n");
            if (s_days[t] != without) profits.Append(CultureInfo.InvariantCulture, $"{Iso(s_days[t])},FIRM,0\n");
        }
        _folder.WriteFeed("observations.csv", prices.ToString());
        _folder.WriteFeed("positions.csv", positions.ToString());
        _folder.WriteFeed("pnl.csv", profits.ToString());
    }

    private static IEnumerable<DateOnly> Weekdays(int count) => Enumerable.Range(0, 2 * count).Select(back => TinyFeed.AsOf.AddDays(-back))
        .Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday)).Take(count).Reverse();

    private static JsonElement Count(JsonElement results) => results.GetProperty("backtest").EnumerateArray().Single();

    private static int Whole(JsonElement count, string name) => count.GetProperty(name).GetInt32();

    private static DateOnly MissingDay(JsonElement count) =>
        DateOnly.Parse(count.GetProperty("series").EnumerateArray().Single(d => d.GetProperty("var").ValueKind == JsonValueKind.Null).GetProperty("date").GetString()!, CultureInfo.InvariantCulture);

    private static string Iso(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}
