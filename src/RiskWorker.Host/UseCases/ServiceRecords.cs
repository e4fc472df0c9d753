using RiskWorker.Domain.Market;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Asks for the holidays that schedules keep to: the feed's where it has a file of them, else the store's.</summary>
public sealed record HolidaysRequest(Workspace Workspace);

/// <summary>Records that a scheduled run was stopped before its end.</summary>
/// <param name="Workspace">Where to record it.</param>
/// <param name="Schedule">The schedule that asked for the run.</param>
/// <param name="ScheduledFor">When it was due, UTC.</param>
/// <param name="Started">When it began, UTC.</param>
/// <param name="Interrupted">When it was stopped, UTC.</param>
public sealed record InterruptedRun(Workspace Workspace, string Schedule, DateTimeOffset ScheduledFor, DateTimeOffset Started, DateTimeOffset Interrupted);

/// <summary>What the service reads and records beside its runs.</summary>
public sealed class ServiceRecords(FeedRefresh refresh)
{
    /// <summary>Holidays of the feed; where it cannot be loaded, those that the store knows.</summary>
    public Task<IReadOnlyList<Holiday>> HolidaysAsync(HolidaysRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        try
        {
            refresh.Into(store, request.Workspace, progress, cancellationToken);
        }
        catch (DataRefusedException)
        {
            // The scheduled run will meet the same feed and report it; the calendars stay as they were last stored.
        }
        return new SnapshotReader(store).Holidays;
    }, cancellationToken);

    /// <summary>Records an interrupted run.</summary>
    public static Task<bool> RecordInterruptedAsync(InterruptedRun run, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(run.Workspace.StoreFile);
        store.Interruptions.Append(new(run.Schedule, run.ScheduledFor, run.Started, run.Interrupted));
        return true;
    }, cancellationToken);
}
