using System.Diagnostics;
using System.Globalization;
using System.Text.Json;
using RiskWorker.Host.Verbs;

namespace RiskWorker.Host.Tests.Jobs;

/// <summary><c>riskworker serve</c> as a process of its own.</summary>
public sealed class ServeProcessTests : IDisposable
{
    private static readonly TimeSpan s_patience = TimeSpan.FromSeconds(90);
    private readonly TemporaryFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Serve_second_process_on_one_store_is_refused_and_names_the_first()
    {
        WriteSettings("0 0 0 1 1 ?");
        using var first = Start();
        try
        {
            await LineAsync(first, "Schedule daily (measure) next at");
            using var second = Start();
            var error = await second.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken).WaitAsync(s_patience, TestContext.Current.CancellationToken);
            await second.WaitForExitAsync(TestContext.Current.CancellationToken);
            Assert.Equal(3, second.ExitCode);
            Assert.Contains($"process {first.Id}, since", error, StringComparison.Ordinal);
        }
        finally
        {
            await StopAsync(first);
        }
        Assert.Equal(0, first.ExitCode);
    }

    [Fact]
    public async Task Serve_faults_of_its_settings_come_before_anything_starts()
    {
        _folder.Write("riskworker.json", """{ "schedules": { "daily": { "cron": "x", "timeZone": "y" } }, "recrod": "z" }""");
        using var process = Start();
        var error = await process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken).WaitAsync(s_patience, TestContext.Current.CancellationToken);
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
        Assert.Equal(3, process.ExitCode);
        Assert.Contains("riskworker.json: 3 faults", error, StringComparison.Ordinal);
        Assert.False(Directory.Exists(Path.Combine(_folder.Path, "out")));
    }

    [Fact]
    public async Task Serve_schedule_that_comes_due_writes_its_report()
    {
        WriteSettings("0/5 * * * * ?");
        TinyFeed.Write(_folder);
        using var service = Start();
        try
        {
            await LineAsync(service, "[2002]");
        }
        finally
        {
            await StopAsync(service);
        }
        Assert.Equal(0, service.ExitCode);
        var day = Path.Combine(_folder.Path, "out", Figures.Date(TinyFeed.AsOf));
        var run = Directory.GetDirectories(day).Order(StringComparer.Ordinal).First();
        using var results = JsonDocument.Parse(await File.ReadAllBytesAsync(Path.Combine(run, "results.json"), TestContext.Current.CancellationToken));
        Assert.Equal("FIRM", results.RootElement.GetProperty("nodes")[0].GetProperty("book").GetString());
        Assert.NotEmpty(Directory.GetFiles(run, "*.pdf"));
    }

    /// <summary>Settings with one schedule.</summary>
    private void WriteSettings(string cron) => _folder.Write("riskworker.json", JsonSerializer.Serialize(new
    {
        simulation = new { scenarios = 2_000 },
        schedules = new { daily = new { cron, timeZone = "UTC" } },
    }));

    private Process Start()
    {
        var start = new ProcessStartInfo(Path.Combine(AppContext.BaseDirectory, OperatingSystem.IsWindows() ? "riskworker.exe" : "riskworker"))
        {
            ArgumentList = { "serve", "--config", _folder.Path, "--out", Path.Combine(_folder.Path, "out") },
            RedirectStandardError = true,
            RedirectStandardOutput = true,
        };
        return Process.Start(start)!;
    }

    /// <summary>Reads the log until a line holds <paramref name="text"/>.</summary>
    private static async Task LineAsync(Process process, string text)
    {
        using var timeout = new CancellationTokenSource(s_patience);
        while (await process.StandardError.ReadLineAsync(timeout.Token) is { } line)
        {
            if (line.Contains(text, StringComparison.Ordinal)) return;
        }
        Assert.Fail($"The service ended without the line '{text}'.");
    }

    /// <summary>Asks the process to stop as a service manager would, and waits until it has.</summary>
    private static async Task StopAsync(Process process)
    {
        using var kill = Process.Start("kill", ["-TERM", process.Id.ToString(CultureInfo.InvariantCulture)]);
        using var timeout = new CancellationTokenSource(s_patience);
        await process.StandardError.ReadToEndAsync(timeout.Token);
        await process.WaitForExitAsync(timeout.Token);
    }
}
