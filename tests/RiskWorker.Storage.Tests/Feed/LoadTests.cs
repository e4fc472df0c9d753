using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Feed;

public sealed class LoadTests
{
    private static readonly DateOnly s_day = new(2026, 11, 6);

    [Fact]
    public void Load_bad_file_leaves_the_bytes_of_the_store_unchanged()
    {
        using var fixture = new FeedFixture();
        fixture.Load();
        var before = fixture.StoreBytes();
        fixture["observations.csv"] += "2026-11-09,ALPHA,120\n2026-11-09,USDEUR,1e400\n";
        fixture["positions.csv"] += "2026-11-09,EQ,ALPHA-S,1,,\n";

        using (var store = fixture.Open()) Assert.Single(fixture.Load(store).Faults);

        Assert.Equal(before, fixture.StoreBytes());
    }

    [Fact]
    public void Load_same_feed_twice_changes_no_byte_the_second_time()
    {
        using var fixture = new FeedFixture();
        Assert.True(fixture.Load().Changed);
        var before = fixture.StoreBytes();

        var second = fixture.Load();

        Assert.True(second.AlreadyLoaded);
        Assert.False(second.Changed);
        Assert.Equal(before, fixture.StoreBytes());
    }

    [Fact]
    public void Load_same_rows_in_another_order_and_notation_changes_nothing_and_corrects_nothing()
    {
        using var fixture = new FeedFixture();
        using var store = fixture.Open();
        fixture.Load(store);
        var hash = Hash(store);
        foreach (var file in new[] { "books.csv", "factors.csv", "observations.csv", "instruments.csv", "positions.csv", "limits.csv", "pnl.csv" })
        {
            var lines = fixture[file]!.TrimEnd('\n').Split('\n');
            fixture[file] = string.Join("\r\n", lines.Skip(1).Reverse().Prepend(lines[0]));
        }
        fixture["observations.csv"] = fixture["observations.csv"]!.Replace(".50", ".5", StringComparison.Ordinal);
        fixture["positions.csv"] = fixture["positions.csv"]!.Replace("12.50", "1.25e1", StringComparison.Ordinal);

        var outcome = fixture.Load(store, minute: 1);

        Assert.False(outcome.AlreadyLoaded);
        Assert.False(outcome.Changed);
        Assert.Equal(15, outcome.Files.Single(f => f.File == "observations.csv").Unchanged);
        Assert.Empty(store.Corrections);
        Assert.Equal(hash, Hash(store));
    }

    [Fact]
    public void Load_corrected_observation_keeps_the_old_value_the_new_one_and_when()
    {
        using var fixture = new FeedFixture();
        using var store = fixture.Open();
        fixture.Load(store);
        fixture["observations.csv"] = fixture["observations.csv"]!.Replace("2026-11-06,ALPHA,106.50", "2026-11-06,ALPHA,106.75", StringComparison.Ordinal);
        fixture["pnl.csv"] = "date,book,actual,hypothetical\n2026-11-06,ALL,,8.0\n2026-11-06,EQ,1,\n";

        var outcome = fixture.Load(store, minute: 5);

        var observations = outcome.Files.Single(f => f.File == "observations.csv");
        Assert.Equal((0, 1, 14), (observations.Added, observations.Changed, observations.Unchanged));
        Assert.Equal(
            [
                new("observations.csv", s_day, "ALPHA", "value", "106.50", "106.75", FeedFixture.Now.AddMinutes(5), fixture.Folder),
                new Correction("pnl.csv", s_day, "ALL", "actual", "7", null, FeedFixture.Now.AddMinutes(5), fixture.Folder),
            ],
            store.Corrections);
        var snapshot = new SnapshotReader(store).Take(s_day, new RunSettings(), "m");
        Assert.Equal(106.75, snapshot.Observations.Column(snapshot.Observations.ColumnOf("ALPHA"))[4]);
        Assert.Equal([("ALL", -12.5, null), ("ALL", null, 8.0), ("EQ", 1.0, null)], snapshot.ProfitAndLoss.Select(p => (p.Book, p.Actual, p.Hypothetical)));
    }

    [Fact]
    public void Load_new_file_replaces_its_table_but_adds_to_instruments_observations_and_other_dates_of_positions()
    {
        using var fixture = new FeedFixture();
        using var store = fixture.Open();
        fixture.Load(store);
        fixture["limits.csv"] = "limit,book,measure,confidence,horizon_days,amount\nfirm-var,ALL,var,0.99,1,260000\n";
        fixture["instruments.csv"] = "instrument,kind,currency,factor\nALPHA-S,spot,EUR,ALPHA\nBETA-S,spot,EUR,BETA\n";
        fixture["observations.csv"] = "date,factor,value\n2026-11-09,ALPHA,1\n";
        fixture["positions.csv"] = "as_of,book,instrument,quantity\n2026-11-06,EQ,BETA-S,5\n2026-11-09,EQ,BETA-S,6\n";
        fixture["pnl.csv"] = null;

        var outcome = fixture.Load(store, minute: 1);

        Assert.Equal((0, 1, 1), Counts(outcome, "limits.csv"));
        Assert.Equal((1, 0, 0), Counts(outcome, "instruments.csv"));
        Assert.Equal((1, 1, 3), Counts(outcome, "positions.csv"));
        var reader = new SnapshotReader(store);
        var snapshot = reader.Take(new(2026, 11, 9), new RunSettings(), "m");
        Assert.Equal([new(2026, 11, 5), s_day, new(2026, 11, 9)], reader.PositionDates);
        Assert.Equal(["ALPHA-C", "ALPHA-S", "BETA-S", "USD"], snapshot.Instruments.Keys.Order(StringComparer.Ordinal));
        Assert.Equal([260000.0], snapshot.Limits.Select(l => l.Amount));
        Assert.Equal([5.0], snapshot.Previous!.Positions.Select(p => p.Quantity));
        Assert.Equal(6, reader.ObservationDates.Count);
        Assert.Equal(2, snapshot.ProfitAndLoss.Count);
    }

    [Fact]
    public void Load_cancelled_midway_stores_nothing()
    {
        using var fixture = new FeedFixture();
        FeedGenerator.Write(fixture.Folder, factors: 50, days: 400, positions: 50, positionDays: 400);
        using var store = fixture.Open();
        using var cancel = new CancellationTokenSource();
        var whenStoring = new Callback(progress =>
        {
            if (progress is { Storing: true, File: "positions.csv" }) cancel.Cancel();
        });

        Assert.Throws<OperationCanceledException>(() => FeedLoader.Load(fixture.Folder, store, FeedFixture.Now, whenStoring, cancel.Token));

        Assert.Empty(new SnapshotReader(store).PositionDates);
        Assert.Empty(new SnapshotReader(store).ObservationDates);
    }

    [Fact]
    public void Load_file_that_changes_while_it_is_read_is_refused_whole()
    {
        using var fixture = new FeedFixture();
        FeedGenerator.Write(fixture.Folder, factors: 50, days: 400, positions: 50, positionDays: 400);
        using var store = fixture.Open();
        var path = Path.Combine(fixture.Folder, "positions.csv");
        var whenStoring = new Callback(progress =>
        {
            if (progress is not { Storing: true, File: "observations.csv" }) return;
            using var other = new FileStream(path, FileMode.Open, FileAccess.ReadWrite, FileShare.ReadWrite | FileShare.Delete);
            other.Position = other.Length - 3;
            other.WriteByte((byte)'7');
        });

        var outcome = FeedLoader.Load(fixture.Folder, store, FeedFixture.Now, whenStoring, CancellationToken.None);

        Assert.Equal("positions.csv", Assert.Single(outcome.Faults).File);
        Assert.Empty(new SnapshotReader(store).PositionDates);
    }

    private static (long, long, long) Counts(FeedOutcome outcome, string file)
    {
        var counts = outcome.Files.Single(f => f.File == file);
        return (counts.Added, counts.Changed, counts.Removed);
    }

    private static string Hash(RiskStore store) => new SnapshotReader(store).Take(s_day, new RunSettings(), "m").Hash.Root;

    private sealed class Callback(Action<FeedProgress> action) : IProgress<FeedProgress>
    {
        public void Report(FeedProgress value) => action(value);
    }
}
