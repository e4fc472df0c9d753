using System.Diagnostics;
using Microsoft.Data.Sqlite;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary>A process that ends without notice: the next plain run finds a whole store.</summary>
public sealed class KilledProcessTests : IDisposable
{
    private readonly RunFolder _folder = new();

    public KilledProcessTests() => _folder.WriteTinyFeed();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Measure_killed_while_it_stores_the_feed_leaves_a_store_that_the_next_run_takes()
    {
        var rows = Enumerable.Range(0, 100_000).Select(i => $"2026-11-27,FIRM,AAA share,{i % 7}\n"); // storing them takes a while
        _folder.WriteFeed("positions.csv", "as_of,book,instrument,quantity\n" + string.Concat(rows));
        using (var process = Start())
        {
            await StoringAsync(process);
            await KillAsync(process);
        }
        await AssertNextRunSucceedsAsync();
    }

    [Fact]
    public async Task Measure_killed_while_it_simulates_leaves_a_store_that_the_next_run_takes()
    {
        using (var process = Start())
        {
            await LineAsync(process, "simulate");
            await KillAsync(process);
        }
        await AssertNextRunSucceedsAsync();
    }

    private Process Start() => RiskworkerProcess.Start(["measure", "--scenarios", "100000000", "--config", _folder.Config, "--out", _folder.Out]);

    private static async Task KillAsync(Process process)
    {
        process.Kill();
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
        Assert.NotEqual(0, process.ExitCode);
    }

    private async Task AssertNextRunSucceedsAsync()
    {
        Assert.Empty(_folder.Runs);
        Assert.Equal("ok", await IntegrityAsync());
        await _folder.MeasureAsync(0, "--scenarios", "1000");
        Assert.Equal(["limit-report.pdf", "results.csv", "results.json", "sensitivities.csv"], Directory.GetFiles(_folder.Runs.Single()).Select(Path.GetFileName).Order(StringComparer.Ordinal));
        Assert.Equal("ok", await IntegrityAsync());
    }

    /// <summary>Reads progress until a line holds <paramref name="text"/>.</summary>
    private static async Task LineAsync(Process process, string text)
    {
        while (await process.StandardError.ReadLineAsync(TestContext.Current.CancellationToken) is { } line)
        {
            if (line.Contains(text, StringComparison.Ordinal)) return;
        }
        Assert.Fail($"The process ended before '{text}'.");
    }

    /// <summary>Waits until a transaction has begun to spill into the log beside the store.</summary>
    private async Task StoringAsync(Process process)
    {
        var log = new FileInfo(_folder.Store + "-wal");
        const long schemaAlone = 1 << 20;
        using var poll = new PeriodicTimer(TimeSpan.FromMilliseconds(5));
        while (!process.HasExited && await poll.WaitForNextTickAsync(TestContext.Current.CancellationToken))
        {
            log.Refresh();
            if (log.Exists && log.Length > schemaAlone) return;
        }
        Assert.Fail("The process ended before it stored anything.");
    }

    private async Task<string> IntegrityAsync()
    {
        await using var store = new SqliteConnection($"Data Source={_folder.Store};Pooling=False");
        await store.OpenAsync(TestContext.Current.CancellationToken);
        await using var command = store.CreateCommand();
        command.CommandText = "PRAGMA integrity_check";
        return (string)(await command.ExecuteScalarAsync(TestContext.Current.CancellationToken))!;
    }
}
