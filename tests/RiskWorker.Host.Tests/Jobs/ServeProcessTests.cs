using System.Diagnostics;
using System.Globalization;
using System.Text.Json;

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
        WriteSettings(DateTime.UtcNow.AddHours(2));
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

    /// <summary>Settings with one schedule due at <paramref name="due"/>, every day at that second.</summary>
    private void WriteSettings(DateTime due) => _folder.Write("riskworker.json", JsonSerializer.Serialize(new
    {
        schedules = new { daily = new { cron = string.Create(CultureInfo.InvariantCulture, $"{due.Second} {due.Minute} {due.Hour} * * ?"), timeZone = "UTC" } },
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
