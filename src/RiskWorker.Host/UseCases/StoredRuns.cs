using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Reads what the store keeps.</summary>
public sealed class StoredRuns(RunDocuments documents)
{
    /// <summary>Stored runs, newest first.</summary>
    public Task<IReadOnlyList<RunSummary>> ListAsync(ListRunsRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        IReadOnlyList<RunSummary> runs = [.. store.Runs.List().Reverse().Select(r => new RunSummary(r.Run, r.AsOf, r.Status, r.Evidence, r.Model, r.Scenarios, r.Seed, r.Finished, r.Breached))];
        return runs;
    }, cancellationToken);

    /// <summary>One stored run; renders its report again where a file is named.</summary>
    /// <exception cref="NotStoredException">There is no such run.</exception>
    public Task<ShowRunReport> ShowAsync(ShowRunRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        var run = store.Runs.Find(request.Run) ?? throw new NotStoredException($"There is no run '{request.Run}' in the store; 'riskworker runs' lists those there are.");
        if (request.Pdf is { } file) WriteWhole(file, documents.LimitReportOf(run));
        return new ShowRunReport(run.Record, documents.JsonOf(run.Record));
    }, cancellationToken);

    private static void WriteWhole(string file, byte[] content)
    {
        var beside = file + ".partial";
        File.WriteAllBytes(beside, content);
        File.Move(beside, file, overwrite: true);
    }
}
