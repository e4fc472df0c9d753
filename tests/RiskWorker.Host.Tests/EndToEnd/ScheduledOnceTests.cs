using System.Globalization;
using System.Text.Json;

namespace RiskWorker.Host.Tests.EndToEnd;

/// <summary><c>riskworker serve</c> with a schedule that comes due once, soon.</summary>
public sealed class ScheduledOnceTests : IDisposable
{
    private readonly RunFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Serve_schedule_ahead_is_met_once_on_its_second_and_the_stop_is_graceful()
    {
        _folder.WriteTinyFeed();
        var due = DateTime.UtcNow.AddSeconds(20); // a start on a busy machine takes some of it
        due = due.AddTicks(-(due.Ticks % TimeSpan.TicksPerSecond));
        _folder.WriteSettings(JsonSerializer.Serialize(new
        {
            simulation = new { scenarios = 2_000 },
            schedules = new { daily = new { cron = string.Create(CultureInfo.InvariantCulture, $"{due.Second} {due.Minute} {due.Hour} {due.Day} {due.Month} ?"), timeZone = "UTC" } },
        }));

        using var service = RiskworkerProcess.Start(["serve", "--config", _folder.Config, "--out", _folder.Out]);
        var log = new List<string>();
        while (await service.StandardError.ReadLineAsync(TestContext.Current.CancellationToken) is { } line)
        {
            log.Add(line);
            if (line.Contains("[2002]", StringComparison.Ordinal)) break;
        }
        using (var stop = RiskworkerProcess.Start("kill", ["-TERM", service.Id.ToString(CultureInfo.InvariantCulture)], null)) await RiskworkerProcess.EndAsync(stop);
        var ending = await RiskworkerProcess.EndAsync(service);

        Assert.Equal(0, ending.Code);
        Assert.Contains(log, line => line.Contains($"next at {due:yyyy-MM-dd HH:mm:ss}", StringComparison.Ordinal));
        Assert.Contains("[1003]", ending.Error, StringComparison.Ordinal);
        using var results = JsonDocument.Parse(await File.ReadAllBytesAsync(Path.Combine(_folder.Runs.Single(), "results.json"), TestContext.Current.CancellationToken));
        var started = results.RootElement.GetProperty("started").GetDateTime();
        Assert.InRange(started, due, due.AddSeconds(15));
    }
}
