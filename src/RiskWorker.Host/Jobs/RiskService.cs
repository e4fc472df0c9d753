using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using Microsoft.Extensions.Logging.Console;
using RiskWorker.Domain.Market;
using RiskWorker.Host.Options;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Jobs;

/// <summary>The service: takes the store, checks its schedules, then runs by them until it is told to stop.</summary>
public static class RiskService
{
    /// <summary>What a stop takes beyond the run's grace: recording an interruption and closing down.</summary>
    private static readonly TimeSpan s_closing = TimeSpan.FromSeconds(15);

    /// <summary>Runs until <paramref name="cancellationToken"/> is cancelled, then stops gracefully and returns.</summary>
    /// <exception cref="SettingsException">A schedule cannot be kept, or another service has the store.</exception>
    public static async Task RunAsync(ServiceRequest request, UseCaseSet useCases, TimeProvider clock, CancellationToken cancellationToken)
    {
        Directory.CreateDirectory(Path.GetDirectoryName(request.Workspace.StoreFile)!);
        using var held = StoreLock.Take(request.Workspace.StoreFile, clock);
        var holidays = await HolidaysAsync(request, useCases, cancellationToken);
        var faults = ScheduleChecks.Faults(request.Configuration.Schedules, holidays, clock.GetUtcNow());
        if (faults.Count > 0) throw new SettingsException(Path.Combine(request.Workspace.ConfigFolder, ConfigurationReader.FileName), faults);
        using var host = Build(request, useCases, holidays, clock);
        await host.RunAsync(cancellationToken);
    }

    private static async Task<IReadOnlyList<Holiday>> HolidaysAsync(ServiceRequest request, UseCaseSet useCases, CancellationToken cancellationToken)
    {
        if (request.Configuration.Schedules.All(s => s.Calendar is null)) return [];
        return await useCases.Holidays(new(request.Workspace), new Progress<WorkProgress>(), cancellationToken);
    }

    private static IHost Build(ServiceRequest request, UseCaseSet useCases, IReadOnlyList<Holiday> holidays, TimeProvider clock)
    {
        // Without the defaults: settings come from riskworker.json alone, not from an appsettings.json or a variable that happens to be there.
        var builder = Microsoft.Extensions.Hosting.Host.CreateEmptyApplicationBuilder(new() { DisableDefaults = true, ApplicationName = "riskworker" });
        AddLogging(builder.Logging, request.IsVerbose);
        builder.Services.Configure<HostOptions>(o => o.ShutdownTimeout = request.StopTimeout + s_closing);
        builder.Services.AddSingleton<IHostLifetime, CallerLifetime>();
        builder.Services.AddSingleton(clock);
        builder.Services.AddSingleton(request);
        builder.Services.AddSingleton(useCases);
        builder.Services.AddSingleton(s => new StopGrace(s.GetRequiredService<IHostApplicationLifetime>(), clock, request.StopTimeout));
        builder.Services.AddSingleton(s => new BusinessDayRefresh(request, useCases, holidays, s.GetRequiredService<ILogger<BusinessDayRefresh>>()));
        Scheduling.Add(builder.Services, request.Configuration.Schedules, holidays, clock);
        builder.Services.AddHostedService<ScheduleAnnouncement>();
        return builder.Build();
    }

    private static void AddLogging(ILoggingBuilder logging, bool isVerbose)
    {
        logging.SetMinimumLevel(isVerbose ? LogLevel.Debug : LogLevel.Information);
        logging.AddFilter("Quartz", isVerbose ? LogLevel.Information : LogLevel.Warning);
        logging.AddFilter("Microsoft", LogLevel.Warning);
        logging.AddSimpleConsole(o =>
        {
            o.SingleLine = true;
            o.UseUtcTimestamp = true;
            o.TimestampFormat = "yyyy-MM-dd'T'HH:mm:ss'Z' ";
        });
        logging.Services.Configure<ConsoleLoggerOptions>(o => o.LogToStandardErrorThreshold = LogLevel.Trace);
    }
}
