using RiskWorker.Host.UseCases;

namespace RiskWorker.Host;

/// <summary>The one place where use cases are put together from the parts that they need.</summary>
public static class Composition
{
    /// <summary>The use cases of this process.</summary>
    /// <param name="clock">Gives the times that go on record.</param>
    public static UseCaseSet UseCases(TimeProvider clock)
    {
        var refresh = new FeedRefresh(clock);
        return new()
        {
            Load = new LoadFeed(refresh).RunAsync,
            Measure = new MeasureRun(refresh, new Rehearsal(), clock).RunAsync,
            Backtest = new BacktestRun(refresh, clock).RunAsync,
            Explain = new KeepExplanation(clock).RunAsync,
            ListRuns = StoredRuns.ListAsync,
            ShowRun = StoredRuns.ShowAsync,
            Verify = VerifyRun.RunAsync,
            Holidays = new ServiceRecords(refresh).HolidaysAsync,
            RecordInterrupted = ServiceRecords.RecordInterruptedAsync,
        };
    }
}
