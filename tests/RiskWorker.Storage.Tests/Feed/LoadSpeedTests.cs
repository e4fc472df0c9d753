using System.Diagnostics;
using System.Globalization;

namespace RiskWorker.Storage.Tests.Feed;

public sealed class LoadSpeedTests(ITestOutputHelper output)
{
    // Run by name when the machine is free: 1,000,000 positions and 200,000 observations.
    [Fact(Explicit = true)]
    public void Load_of_a_million_positions_takes_in_150_000_rows_a_second_in_flat_memory()
    {
        using var fixture = new FeedFixture(withFiles: false);
        FeedGenerator.Write(fixture.Folder, factors: 200, days: 1000, positions: 1000, positionDays: 1000);
        using var store = fixture.Open();
        GC.Collect();
        var before = Process.GetCurrentProcess().WorkingSet64;
        var (watch, cpu) = (Stopwatch.StartNew(), Environment.CpuUsage.TotalTime);

        fixture.Check();
        var (checkedIn, checkedCpu) = (watch.Elapsed.TotalSeconds, (Environment.CpuUsage.TotalTime - cpu).TotalSeconds);
        watch.Restart();
        cpu = Environment.CpuUsage.TotalTime;
        var outcome = fixture.Load(store);

        var (seconds, cpuSeconds) = (watch.Elapsed.TotalSeconds, (Environment.CpuUsage.TotalTime - cpu).TotalSeconds);
        Assert.Empty(outcome.Faults);
        var rows = outcome.Files.Sum(f => f.Added);
        using var process = Process.GetCurrentProcess();
        output.WriteLine(string.Create(CultureInfo.InvariantCulture,
            $"checked in {checkedIn:F2} s ({checkedCpu:F2} s of processor); {rows} rows loaded in {seconds:F2} s ({cpuSeconds:F2} s of processor): {rows / seconds:F0} rows/s; working set {before >> 20} MB before, {process.PeakWorkingSet64 >> 20} MB at its peak; store {new FileInfo(fixture.StorePath).Length >> 20} MB"));
        watch.Restart();
        fixture["limits.csv"] = "limit,book,measure,confidence,horizon_days,amount\n";
        Assert.False(fixture.Load(store, minute: 1).Changed);
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"once more with one new file beside: {watch.Elapsed.TotalSeconds:F2} s"));
        Assert.True(rows / seconds > 150_000);
    }
}
