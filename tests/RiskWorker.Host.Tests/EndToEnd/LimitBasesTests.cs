using System.Globalization;
using System.Text.Json;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>Limits of every basis from feed to exit code. Two books hold one share in different amounts, so both lose the same fraction.</summary>
public sealed class LimitBasesTests : IDisposable
{
    private const string Header = "limit,book,measure,confidence,horizon_days,amount,basis,reference_book\n";
    private readonly RunFolder _folder = new();

    public LimitBasesTests()
    {
        _folder.WriteTinyFeed();
        _folder.WriteFeed("books.csv", "book,parent,name,currency\nFIRM,,The firm,EUR\nBIG,FIRM,,EUR\nSMALL,FIRM,,EUR\nSHORT,FIRM,,EUR\n");
        _folder.WriteFeed("positions.csv", "as_of,book,instrument,quantity\n2026-11-27,BIG,AAA share,1000\n2026-11-27,SMALL,AAA share,30\n2026-11-27,SHORT,AAA share,-7\n");
        _folder.WriteSettings("""{ "simulation": { "scenarios": 2000, "looks": 3, "cap": 8000 } }""");
    }

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Nav_limit_is_a_fraction_of_the_book_s_value()
    {
        _folder.WriteFeed("limits.csv", Header + "low,BIG,var,0.99,1,0.01,nav,\nhigh,BIG,var,0.99,1,0.2,nav,\n");
        var results = await _folder.MeasureAsync(1);
        var (big, low, high) = (Node(results, "BIG"), Limit(results, "low"), Limit(results, "high"));
        Assert.Equal("breached", low.GetProperty("status").GetString());
        Assert.Equal("within", high.GetProperty("status").GetString());
        Assert.Equal(Number(low, "value") / (0.01 * Number(big, "value")), Number(low, "used"), 1e-12);
        Assert.Equal(Number(low, "used") / 20, Number(high, "used"), 1e-12);
    }

    [Fact]
    public async Task Book_limit_compares_with_the_reference_per_unit_of_value()
    {
        _folder.WriteFeed("limits.csv", Header + "half,SMALL,var,0.99,1,0.5,book,BIG\nfour,SMALL,es,0.975,1,4,book,BIG\n");
        var results = await _folder.MeasureAsync(1);
        Assert.Equal(("breached", "within"), (Status(results, "half"), Status(results, "four")));
        Assert.Equal(2, Number(Limit(results, "half"), "used"), 1e-9);
        Assert.Equal(0.25, Number(Limit(results, "four"), "used"), 1e-9);
    }

    [Fact]
    public async Task Limits_relative_to_a_negative_value_stay_undecided_with_a_finding()
    {
        _folder.WriteFeed("limits.csv", Header + "nav,SHORT,var,0.99,1,0.01,nav,\nbook,BIG,var,0.99,1,2,book,SHORT\n");
        var results = await _folder.MeasureAsync(6);
        Assert.All(results.GetProperty("limits").EnumerateArray(), l => Assert.Equal((JsonValueKind.Null, "inconclusive"), (l.GetProperty("used").ValueKind, l.GetProperty("status").GetString())));
        Assert.Contains(results.GetProperty("findings").EnumerateArray(), f => f.GetProperty("code").GetString() == "limit-undecidable");
        Assert.Equal(1, results.GetProperty("looks").GetInt32()); // no number of scenarios would decide them
    }

    /// <summary>A limit at the sample's own VaR lies inside its interval whatever was drawn.</summary>
    [Fact]
    public async Task Limit_undecided_at_the_cap_ends_in_6_and_a_breach_beside_it_in_1()
    {
        var var = Number(Node(await _folder.MeasureAsync(0, "--scenarios", "8000"), "BIG").GetProperty("measures")[0], "value").ToString("R", CultureInfo.InvariantCulture);

        _folder.WriteFeed("limits.csv", Header + $"at,BIG,var,0.99,1,{var},amount,\n");
        var undecided = await _folder.MeasureAsync(6);
        Assert.Equal((8_000, 3, 3), (undecided.GetProperty("scenarios").GetInt32(), undecided.GetProperty("looks").GetInt32(), undecided.GetProperty("looksPlanned").GetInt32()));
        Assert.Equal(1 - (0.05 / 3), Number(undecided, "level"), 1e-15);

        _folder.WriteFeed("limits.csv", Header + $"at,BIG,var,0.99,1,{var},amount,\nover,SMALL,var,0.99,1,1,amount,\n");
        var ending = await _folder.RunAsync("measure");
        Assert.Equal(1, ending.Code);
        Assert.Contains("8,000 scenarios, look 3 of 3", ending.Output, StringComparison.Ordinal);
        Assert.Contains("1 of 2 limits is breached; 1 lies within simulation error and is undecided.", ending.Output, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Decided_limits_end_the_run_at_the_first_look()
    {
        _folder.WriteFeed("limits.csv", Header + "wide,BIG,var,0.99,1,1000000,amount,\n");
        var ending = await _folder.RunAsync("measure");
        Assert.Equal(0, ending.Code);
        Assert.Contains("2,000 scenarios, look 1 of 3", ending.Output, StringComparison.Ordinal);
    }

    private static JsonElement Node(JsonElement results, string book) => results.GetProperty("nodes").EnumerateArray().Single(n => n.GetProperty("book").GetString() == book);

    private static JsonElement Limit(JsonElement results, string name) => results.GetProperty("limits").EnumerateArray().Single(l => l.GetProperty("limit").GetString() == name);

    private static string? Status(JsonElement results, string limit) => Limit(results, limit).GetProperty("status").GetString();

    private static double Number(JsonElement element, string name) => element.GetProperty(name).GetDouble();
}
