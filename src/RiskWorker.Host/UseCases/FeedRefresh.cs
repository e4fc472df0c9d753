using RiskWorker.Storage.Feed;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Brings the store up to the feed.</summary>
public sealed class FeedRefresh(TimeProvider clock)
{
    /// <summary>Loads the feed of <paramref name="workspace"/> where its content is new.</summary>
    /// <exception cref="DataRefusedException">A file of the feed cannot be used; nothing of it is stored.</exception>
    public FeedOutcome Into(RiskStore store, Workspace workspace, IProgress<WorkProgress> progress, CancellationToken cancellation)
    {
        var outcome = FeedLoader.Load(workspace.FeedFolder, store, clock.GetUtcNow(), new FeedSteps(progress), cancellation);
        if (outcome.Faults.Count > 0) throw new DataRefusedException($"The feed was refused and nothing of it is stored:\n{string.Join('\n', outcome.Sentences())}");
        return outcome;
    }

    private sealed class FeedSteps(IProgress<WorkProgress> progress) : IProgress<FeedProgress>
    {
        public void Report(FeedProgress value) => progress.Report(new("load", 0, $"{value.File}: {value.Rows:N0} rows {(value.Storing ? "stored" : "checked")}"));
    }
}
