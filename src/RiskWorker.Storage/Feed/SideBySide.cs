using System.Collections.Concurrent;
using System.Runtime.ExceptionServices;

namespace RiskWorker.Storage.Feed;

/// <summary>The files of a feed, read over all cores: none knows of another, so the answer is that of one after the other.</summary>
internal static class SideBySide
{
    /// <summary>What <paramref name="work"/> makes of each file, in the order of the files; it is lent a progress that is told one report at a time.</summary>
    public static TResult[] Each<TFile, TResult>(
        IReadOnlyList<TFile> files, Func<TFile, IProgress<FeedProgress>?, TResult> work, IProgress<FeedProgress>? progress, CancellationToken cancellation)
    {
        var results = new TResult[files.Count];
        var serial = progress is null ? null : new OneAtATime(progress);
        try
        {
            // One file at a time each: a range of them could leave the two longest to one core.
            var places = Partitioner.Create(Enumerable.Range(0, files.Count), EnumerablePartitionerOptions.NoBuffering);
            Parallel.ForEach(places, new() { CancellationToken = cancellation }, i => results[i] = work(files[i], serial));
        }
        catch (AggregateException several)
        {
            ExceptionDispatchInfo.Throw(several.InnerExceptions[0]);
        }
        return results;
    }

    private sealed class OneAtATime(IProgress<FeedProgress> progress) : IProgress<FeedProgress>
    {
        private readonly Lock _gate = new();

        public void Report(FeedProgress value)
        {
            lock (_gate) progress.Report(value);
        }
    }
}
