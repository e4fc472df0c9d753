using Microsoft.Extensions.DependencyInjection;
using Quartz;
using RiskWorker.Domain.Market;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.Jobs;

/// <summary>Hands the schedules of the settings to the scheduler.</summary>
public static class Scheduling
{
    /// <summary>Adds the scheduler with a job and a cron trigger for each schedule, both named after it.</summary>
    public static void Add(IServiceCollection services, IReadOnlyList<ScheduleOptions> schedules, IReadOnlyList<Holiday> holidays, TimeProvider clock)
    {
        services.AddQuartz(quartz =>
        {
            quartz.UseTimeProvider(clock);
            quartz.UseInMemoryStore();
            quartz.UseDefaultThreadPool(1); // one run at a time: each takes every core, and all write to one store
            foreach (var (name, calendar) in BusinessDays.For(schedules, holidays)) quartz.AddCalendar(name, _ => calendar, AddCalendarOptions.ReplacingAndUpdatingTriggers);
            foreach (var schedule in schedules) Add(quartz, schedule);
        });
        services.AddQuartzHostedService(hosted => hosted.WaitForJobsToComplete = true);
    }

    /// <summary>A fire that comes due while another run is on waits for it: one catch-up, however many were missed.</summary>
    private static void Add(IQuartzBuilder quartz, ScheduleOptions schedule) => quartz.ScheduleJob<MeasureJob>(
        trigger =>
        {
            trigger.WithIdentity(schedule.Name).WithCronSchedule(schedule.Cron, cron => cron
                .InTimeZone(schedule.TimeZone)
                .WithMisfireInstruction(CronTriggerMisfireInstruction.FireAndProceed));
            if (BusinessDays.NameFor(schedule) is { } calendar) trigger.WithCalendarName(calendar);
        },
        job => job.WithIdentity(schedule.Name));
}
