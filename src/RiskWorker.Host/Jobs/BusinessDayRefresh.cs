using Microsoft.Extensions.Logging;
using Quartz;
using RiskWorker.Domain.Market;
using RiskWorker.Host.UseCases;

namespace RiskWorker.Host.Jobs;

/// <summary>Keeps the scheduler's calendars at the feed's holidays: a year's end brings new ones while the service runs.</summary>
public sealed class BusinessDayRefresh(ServiceRequest request, UseCaseSet useCases, IReadOnlyList<Holiday> atStart, ILogger<BusinessDayRefresh> logger)
{
    private IReadOnlyList<Holiday> _known = atStart;

    /// <summary>Reads the holidays again and replaces the calendars where they changed; a failure is logged and changes nothing.</summary>
    public async Task RunAsync(IScheduler scheduler, IProgress<WorkProgress> progress, CancellationToken cancellationToken)
    {
        try
        {
            var holidays = await useCases.Holidays(new(request.Workspace), progress, cancellationToken);
            if (holidays.ToHashSet().SetEquals(_known)) return;
            var calendars = BusinessDays.For(request.Configuration.Schedules, holidays);
            foreach (var (name, calendar) in calendars) await scheduler.AddCalendar(name, calendar, AddCalendarOptions.ReplacingAndUpdatingTriggers, cancellationToken);
            _known = holidays;
            ServiceLog.CalendarsReplaced(logger, calendars.Count);
        }
        catch (Exception failure) when (failure is not OperationCanceledException)
        {
            ServiceLog.CalendarsKept(logger, failure);
        }
    }
}
