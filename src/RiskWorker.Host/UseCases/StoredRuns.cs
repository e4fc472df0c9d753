using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Asks for the list of stored runs.</summary>
public sealed record ListRunsRequest(Workspace Workspace);

/// <summary>A stored run in a line.</summary>
public sealed record RunSummary(
    string Run, DateOnly AsOf, RunStatus Status, EvidenceKind Evidence, string Model, int? Scenarios, ulong Seed, DateTimeOffset Finished, int Breached);

/// <summary>Asks for one stored run.</summary>
/// <param name="Workspace">Where it is stored.</param>
/// <param name="Run">Its id.</param>
/// <param name="Pdf">File to render its report to, as an absolute path; null for none.</param>
public sealed record ShowRunRequest(Workspace Workspace, string Run, string? Pdf);

/// <summary>A stored run.</summary>
/// <param name="Record">The record.</param>
/// <param name="Json">The text of its <c>results.json</c>.</param>
public sealed record ShowRunReport(RunRecord Record, string Json);

/// <summary>Reads what the store keeps.</summary>
public static class StoredRuns
{
    /// <summary>Stored runs, newest first.</summary>
    public static Task<IReadOnlyList<RunSummary>> ListAsync(ListRunsRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        IReadOnlyList<RunSummary> runs = [.. store.Runs.List().Reverse().Select(r => new RunSummary(r.Run, r.AsOf, r.Status, r.Evidence, r.Model, r.Scenarios, r.Seed, r.Finished, r.Breached))];
        return runs;
    }, cancellationToken);

    /// <summary>One stored run; renders its report again where a file is named.</summary>
    /// <exception cref="NotStoredException">There is no such run.</exception>
    public static Task<ShowRunReport> ShowAsync(ShowRunRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        var run = store.Runs.Find(request.Run) ?? throw new NotStoredException($"There is no run '{request.Run}' in the store; 'riskworker runs' lists those there are.");
        if (request.Pdf is { } file) WriteWhole(file, RunDocuments.LimitReportOf(run));
        return new ShowRunReport(run.Record, RunDocuments.JsonOf(run.Record));
    }, cancellationToken);

    private static void WriteWhole(string file, byte[] content)
    {
        var beside = file + ".partial";
        try
        {
            File.WriteAllBytes(beside, content);
            File.Move(beside, file, overwrite: true);
        }
        catch
        {
            File.Delete(beside);
            throw;
        }
    }
}
