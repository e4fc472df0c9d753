using System.Collections.Concurrent;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Feed;

public sealed class KeptRowsTests
{
    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Store_of_rows_kept_and_of_rows_read_again_is_the_same(bool kept)
    {
        using var fixture = new FeedFixture();
        using var store = fixture.Open();
        store.Write(connection =>
        {
            connection.Run("INSERT INTO feed_load (loaded_at, folder) VALUES ('2026-11-06T20:00:00Z', '')");
            foreach (var table in FeedTables.ForOneLoad().Where(t => File.Exists(Path.Combine(fixture.Folder, t.Format.File))))
            {
                using var file = File.OpenRead(Path.Combine(fixture.Folder, table.Format.File));
                var faults = new FaultLog(table.Format.File);
                table.Check(file, kept, faults, new(table.Format.File), null, TestContext.Current.CancellationToken);
                Assert.Empty(faults.First);
                table.Store(file, connection, 1, null, TestContext.Current.CancellationToken);
            }
            return 0;
        });
        using var other = new FeedFixture();
        using var loaded = other.Open();
        other.Load(loaded);

        Assert.Equal(Hash(loaded), Hash(store));
    }

    [Fact]
    public void Each_answers_in_the_order_of_the_files_and_tells_progress_one_report_at_a_time()
    {
        var (inside, most) = (0, 0);
        var told = new ConcurrentQueue<string>();
        var progress = new Callback(value =>
        {
            most = Math.Max(most, Interlocked.Increment(ref inside));
            told.Enqueue(value.File);
            Interlocked.Decrement(ref inside);
        });

        var answers = SideBySide.Each(Enumerable.Range(0, 64).ToArray(), (file, serial) =>
        {
            serial!.Report(new($"{file}", false, 0));
            return 2 * file;
        }, progress, TestContext.Current.CancellationToken);

        Assert.Equal(Enumerable.Range(0, 64).Select(i => 2 * i), answers);
        Assert.Equal((64, 1), (told.Count, most));
    }

    [Fact]
    public void Each_passes_on_what_a_file_throws_as_it_is() => Assert.Throws<IOException>(() =>
        SideBySide.Each<int, int>([1, 2, 3], (file, _) => file == 2 ? throw new IOException("gone") : file, null, TestContext.Current.CancellationToken));

    private static string Hash(RiskStore store) => new SnapshotReader(store).Take(new(2026, 11, 6), new RunSettings(), "m").Hash.Root;

    private sealed class Callback(Action<FeedProgress> action) : IProgress<FeedProgress>
    {
        public void Report(FeedProgress value) => action(value);
    }
}
