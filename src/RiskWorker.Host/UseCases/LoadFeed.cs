using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

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
