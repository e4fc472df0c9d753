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
}
