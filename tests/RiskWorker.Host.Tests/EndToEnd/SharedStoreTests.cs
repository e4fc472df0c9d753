using System.Text.Json;
using Microsoft.Data.Sqlite;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>One store under several hands.</summary>
public sealed class SharedStoreTests : IDisposable
{
    private readonly RunFolder _folder = new();

    public SharedStoreTests() => _folder.WriteTinyFeed();

    public void Dispose() => _folder.Dispose();

    /// <summary>A person measures by hand while the service does: every run is kept, as an attempt of its own with the same figures.</summary>
    [Fact]
    public async Task Measure_the_same_inputs_at_the_same_time_keeps_every_run()
    {
        var results = await Task.WhenAll(Enumerable.Range(0, 4).Select(_ => _folder.MeasureAsync(0, "--scenarios", "1000")));
        Assert.Equal([1, 2, 3, 4], results.Select(r => r.GetProperty("attempt").GetInt32()).Order());
        Assert.Single(results.Select(r => r.GetProperty("figures").GetString()).Distinct());
        Assert.Equal(results.Select(r => r.GetProperty("run").GetString()).Order(StringComparer.Ordinal), _folder.Runs.Select(Path.GetFileName));
    }

    [Fact]
    public async Task Measure_waits_for_a_store_that_another_process_writes_to()
    {
        await _folder.RunAsync("load");
        await using var other = new SqliteConnection($"Data Source={_folder.Store};Pooling=False");
        await other.OpenAsync(TestContext.Current.CancellationToken);
        var transaction = other.BeginTransaction(deferred: false);
        var measured = _folder.MeasureAsync(0, "--scenarios", "1000");
        await Task.WhenAny(measured, Task.Delay(TimeSpan.FromSeconds(1), TestContext.Current.CancellationToken)); // the other's work takes a second
        Assert.False(measured.IsCompleted);
        await transaction.RollbackAsync(TestContext.Current.CancellationToken);
        Assert.Equal(1, (await measured).GetProperty("attempt").GetInt32());
    }

    [Theory]
    [InlineData("runs")]
    [InlineData("runs", "show", "abc")]
    public async Task Runs_of_a_folder_without_store_are_refused_and_none_is_made(params string[] args)
    {
        var ending = await _folder.RunAsync(args);
        Assert.Equal(3, ending.Code);
        Assert.Contains($"There is no store '{_folder.Store}'", ending.Error, StringComparison.Ordinal);
        Assert.Empty(Directory.GetFileSystemEntries(_folder.Out));
    }

    [Theory]
    [InlineData("abc")]
    [InlineData("")]
    [InlineData("%")]
    public async Task Show_run_that_is_not_stored_is_refused(string id)
    {
        await _folder.RunAsync("load");
        var ending = await _folder.RunAsync("runs", "show", id);
        Assert.Equal(3, ending.Code);
        Assert.Contains($"There is no run '{id}'", ending.Error, StringComparison.Ordinal);
    }

    /// <summary>The first of the past dates have too little history: they fail once on record, not again with every run, and count as not filled.</summary>
    [Fact]
    public async Task Measure_past_dates_that_cannot_be_filled_are_recorded_once()
    {
        var dates = _folder.ReadFeed("observations.csv").TrimEnd('\n').Split('\n').Skip(1).Select(row => row[..10]).ToList();
        _folder.WriteFeed("positions.csv", "as_of,book,instrument,quantity\n" + string.Concat(dates.Skip(55).Select(d => $"{d},FIRM,AAA share,1000\n")));
        _folder.WriteSettings("""{ "simulation": { "scenarios": 1000 }, "backfill": 44 }""");
        var first = await _folder.RunAsync("measure");
        Assert.Contains("39 past dates filled", first.Output, StringComparison.Ordinal); // 61 prices are the least that give 60 shocks
        var second = await _folder.RunAsync("measure");
        Assert.DoesNotContain("filled", second.Output, StringComparison.Ordinal);

        var runs = JsonSerializer.Deserialize<JsonElement>((await _folder.RunAsync("runs", "--json")).Output).EnumerateArray().ToList();
        Assert.Equal(5, runs.Count(r => r.GetProperty("status").GetString() == "failed"));
        Assert.Equal(44 + 2, runs.Count);
    }
}
