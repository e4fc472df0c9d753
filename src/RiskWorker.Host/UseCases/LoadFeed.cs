using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Loads the feed.</summary>
public sealed record LoadRequest(Workspace Workspace);

/// <summary>What loading did.</summary>
/// <param name="Files">Every file read, in order.</param>
/// <param name="Warnings">Unknown columns, ignored terms and the like.</param>
public sealed record LoadReport(IReadOnlyList<LoadedFile> Files, IReadOnlyList<Finding> Warnings);

/// <summary>One file of the feed.</summary>
/// <param name="File">Its name.</param>
/// <param name="Rows">Its rows.</param>
/// <param name="IsNew">False where the store held the same content already.</param>
public sealed record LoadedFile(string File, long Rows, bool IsNew);

/// <summary>Loads the feed into the store.</summary>
public sealed class LoadFeed(FeedRefresh refresh)
{
    /// <summary>Loads it; a refused file leaves the store as it was.</summary>
    public Task<LoadReport> RunAsync(LoadRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        var outcome = refresh.Into(store, request.Workspace, progress, cancellationToken);
        return new LoadReport([.. outcome.Files.Select(f => new LoadedFile(f.File, f.Read, f.Added + f.Changed + f.Removed > 0))], outcome.Warnings);
    }, cancellationToken);
}
