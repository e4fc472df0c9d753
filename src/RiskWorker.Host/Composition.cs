using RiskWorker.Host.UseCases;

namespace RiskWorker.Host;

/// <summary>The one place where use cases are put together from the parts that they need.</summary>
public static class Composition
{
    /// <summary>The use cases of this process.</summary>
    public static UseCaseSet UseCases()
    {
        return new()
        {
            Load = Pending<LoadRequest, LoadReport>,
            Measure = Pending<MeasureRequest, MeasureReport>,
            ListRuns = Pending<ListRunsRequest, IReadOnlyList<RunSummary>>,
            ShowRun = Pending<ShowRunRequest, ShowRunReport>,
            Holidays = Pending<HolidaysRequest, IReadOnlyList<Domain.Market.Holiday>>,
            RecordInterrupted = Pending<InterruptedRun, bool>,
        };
    }

    private static Task<TReport> Pending<TRequest, TReport>(TRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) =>
        throw new NotSupportedException($"No use case takes a {typeof(TRequest).Name} yet.");
}
