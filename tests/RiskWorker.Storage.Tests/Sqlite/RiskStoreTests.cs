using Microsoft.Data.Sqlite;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class RiskStoreTests
{
    [Fact]
    public void Open_creates_file_and_folder_in_write_ahead_mode()
    {
        using var fixture = new FeedFixture();
        using var store = fixture.Open();

        Assert.True(File.Exists(fixture.StorePath));
        Assert.Equal("wal", Scalar(fixture.StorePath, "PRAGMA journal_mode"));
        Assert.Equal((long)Schema.Newest, Scalar(fixture.StorePath, "PRAGMA user_version"));
    }

    [Fact]
    public void Open_store_of_a_newer_schema_is_refused_and_left_alone()
    {
        using var fixture = new FeedFixture();
        fixture.Open().Dispose();
        Scalar(fixture.StorePath, "PRAGMA user_version = 99");
        var before = fixture.StoreBytes();

        var error = Assert.Throws<StoreException>(fixture.Open);

        Assert.Equal(StoreFault.Newer, error.Fault);
        Assert.Equal($"The store '{fixture.StorePath}' has schema 99; this version of the program knows schemas up to {Schema.Newest}. Use the newer version that wrote it.", error.Message);
        Assert.Equal(before, fixture.StoreBytes());
    }

    [Fact]
    public void Open_database_of_another_program_is_refused_and_left_alone()
    {
        using var fixture = new FeedFixture();
        Directory.CreateDirectory(Path.GetDirectoryName(fixture.StorePath)!);
        Scalar(fixture.StorePath, "CREATE TABLE theirs (x)");
        var before = fixture.StoreBytes();

        Assert.Equal(StoreFault.Refused, Assert.Throws<StoreException>(fixture.Open).Fault);

        Assert.Equal(before, fixture.StoreBytes());
    }

    [Fact]
    public void Open_file_that_is_no_database_is_refused()
    {
        using var fixture = new FeedFixture();
        Directory.CreateDirectory(Path.GetDirectoryName(fixture.StorePath)!);
        File.WriteAllText(fixture.StorePath, string.Concat(Enumerable.Repeat("date,factor,value\n", 100)));

        var error = Assert.Throws<StoreException>(fixture.Open);

        Assert.Equal(StoreFault.Corrupt, error.Fault);
        Assert.Contains("is not a SQLite database", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Open_under_a_file_instead_of_a_folder_is_refused()
    {
        using var fixture = new FeedFixture();

        Assert.Equal(StoreFault.Unreachable, Assert.Throws<StoreException>(() => RiskStore.Open(Path.Combine(fixture.Folder, "books.csv", "riskworker.db"))).Fault);
    }

    [Fact]
    public void Use_damaged_store_says_so()
    {
        using var fixture = new FeedFixture();
        FeedGeneratorFill(fixture);
        using (var file = File.OpenWrite(fixture.StorePath))
        {
            file.Position = 8192;
            file.Write(Enumerable.Repeat((byte)0xA5, (int)file.Length - 8192).ToArray());
        }
        using var store = fixture.Open();

        var error = Assert.Throws<StoreException>(() => new SnapshotReader(store).PositionDates);

        Assert.Equal(StoreFault.Corrupt, error.Fault);
        Assert.Contains("restore a backup", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Load_into_a_store_that_another_process_holds_gives_up_after_its_patience()
    {
        using var fixture = new FeedFixture();
        using var store = RiskStore.Open(fixture.StorePath, TimeSpan.FromMilliseconds(200));
        using var other = new SqliteConnection($"Data Source={fixture.StorePath};Pooling=False");
        other.Open();
        using var held = other.BeginTransaction(deferred: false);

        var error = Assert.Throws<StoreException>(() => fixture.Load(store));

        Assert.True(error.IsTransient);
        Assert.Contains("locked by another process", error.Message, StringComparison.Ordinal);
    }

    // Codes of https://sqlite.org/rescode.html
    [Theory]
    [InlineData(8, StoreFault.ReadOnly, "write permission")]
    [InlineData(13, StoreFault.Full, "the disk is full")]
    [InlineData(10, StoreFault.Unreachable, "Check the drive")]
    [InlineData(14, StoreFault.Unreachable, "cannot be opened")]
    public void From_code_of_SQLite_says_what_is_wrong_and_how_to_mend_it(int code, StoreFault fault, string expected)
    {
        var error = StoreException.From(new SqliteException("message", code), "/data/riskworker.db");

        Assert.Equal(fault, error.Fault);
        Assert.StartsWith("The store '/data/riskworker.db' ", error.Message, StringComparison.Ordinal);
        Assert.Contains(expected, error.Message, StringComparison.Ordinal);
    }

    private static void FeedGeneratorFill(FeedFixture fixture)
    {
        Feed.FeedGenerator.Write(fixture.Folder, factors: 20, days: 100, positions: 20, positionDays: 20);
        fixture["limits.csv"] = fixture["pnl.csv"] = null;
        fixture.Load();
    }

    private static object? Scalar(string path, string sql)
    {
        using var connection = new SqliteConnection($"Data Source={path};Pooling=False");
        connection.Open();
        return connection.Scalar(sql);
    }
}
