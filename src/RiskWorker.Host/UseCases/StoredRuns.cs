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
    /// <summary>Opens a store to be read: who only reads should not find a new, empty one in a folder whose name was mistyped.</summary>
    /// <exception cref="NotStoredException">There is no store.</exception>
    internal static RiskStore Open(Workspace workspace) => File.Exists(workspace.StoreFile)
        ? RiskStore.Open(workspace.StoreFile)
        : throw new NotStoredException($"There is no store '{workspace.StoreFile}'; 'riskworker load' and 'riskworker measure' make one.");

    /// <summary>Stored runs, newest first.</summary>
    /// <exception cref="NotStoredException">There is no store.</exception>
    public static Task<IReadOnlyList<RunSummary>> ListAsync(ListRunsRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = Open(request.Workspace);
        IReadOnlyList<RunSummary> runs = [.. store.Runs.List().Reverse().Select(r => new RunSummary(r.Run, r.AsOf, r.Status, r.Evidence, r.Model, r.Scenarios, r.Seed, r.Finished, r.Breached))];
        return runs;
    }, cancellationToken);

    /// <summary>One stored run; renders its report again where a file is named.</summary>
    /// <exception cref="NotStoredException">There is no store, or no such run in it.</exception>
    public static Task<ShowRunReport> ShowAsync(ShowRunRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = Open(request.Workspace);
        var run = (request.Run.Length > 0 ? store.Runs.Find(request.Run) : null) ?? throw new NotStoredException($"There is no run '{request.Run}' in the store; 'riskworker runs' lists those there are.");
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
