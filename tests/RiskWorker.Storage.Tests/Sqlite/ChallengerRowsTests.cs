using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

/// <summary>The one-day VaR of models beside the one of record: stored in rows of their own, held to the record, counted by later runs.</summary>
public sealed class ChallengerRowsTests : IDisposable
{
    private static readonly DateOnly s_day = new(2026, 11, 5);
    private static readonly Confidence s_99 = new(0.99m);

    private readonly FeedFixture _fixture = new();
    private readonly RiskStore _store;

    public ChallengerRowsTests()
    {
        _store = _fixture.Open();
        Assert.Empty(_fixture.Load(_store).Faults);
    }

    public void Dispose()
    {
        _store.Dispose();
        _fixture.Dispose();
    }

    [Fact]
    public void Append_stores_the_one_day_var_of_each_challenger_and_nothing_else()
    {
        _store.Runs.Append(Record());
        Assert.Equal(["past|ALL|0.99|1.5", "past|FX|0.99|2.5", "t|ALL|0.99|3.5"], Rows());
    }

    [Fact]
    public void Find_gives_challengers_and_their_backtests_back_to_the_bit()
    {
        var record = Record();
        _store.Runs.Append(record);
        BitEqual.Assert(record, _store.Runs.Find(record.Run)!.Record);
        Assert.Null(_store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken));
    }

    [Theory]
    [InlineData("UPDATE run_challenger_var SET value = 0")]
    [InlineData("DELETE FROM run_challenger_var")]
    [InlineData("INSERT OR REPLACE INTO run_challenger_var SELECT * FROM run_challenger_var")]
    public void Stored_row_can_be_neither_changed_nor_removed(string sql)
    {
        _store.Runs.Append(Record());
        Assert.Contains("append-only", Assert.Throws<SqliteException>(() => Raw("PRAGMA recursive_triggers = ON", sql)).Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("UPDATE run_challenger_var SET value = value * 1.0000000000000002 WHERE book = 'FX'")]
    [InlineData("UPDATE run_challenger_var SET model = 'u' WHERE model = 't'")]
    [InlineData("DELETE FROM run_challenger_var WHERE model = 't'")]
    [InlineData("INSERT INTO run_challenger_var SELECT run, 'more', book, confidence, value FROM run_challenger_var WHERE model = 't'")]
    public void FirstBreak_finds_a_row_that_was_altered_round_the_triggers(string sql)
    {
        _store.Runs.Append(Record());
        Raw("DROP TRIGGER run_challenger_var_stays", "DROP TRIGGER run_challenger_var_holds", sql);
        Assert.Contains("differs from the record", _store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken), StringComparison.Ordinal);
    }

    [Fact]
    public void Take_counts_the_challengers_of_earlier_runs_of_the_same_model()
    {
        _store.Runs.Append(Record());
        var settings = new RunSettings { Challengers = [new() { Name = "t" }] };
        var counted = Assert.Single(new SnapshotReader(_store).Take(s_day.AddDays(1), settings, "lognormal").CountedRuns);
        Assert.Equal([new("past", "ALL", s_99, 1.5), new("past", "FX", s_99, 2.5), new ChallengerVar("t", "ALL", s_99, 3.5)], counted.Challengers);
    }

    [Fact]
    public void Snapshot_read_back_from_the_archive_has_the_counted_challengers()
    {
        _store.Runs.Append(Record());
        var settings = new RunSettings { Challengers = [new() { Name = "t", Kind = ModelKind.StudentT, DegreesOfFreedom = 5 }] };
        var frozen = new SnapshotReader(_store).Freeze(s_day.AddDays(1), settings, "lognormal");
        var record = RunRecords.Of(s_day.AddDays(1), snapshot: frozen.Snapshot.Hash.Root) with { Parts = frozen.Snapshot.Hash.Files };
        _store.Runs.Append(record, frozen);
        var archived = _store.Snapshots.Read(record);
        BitEqual.Assert(frozen.Snapshot.CountedRuns, archived.Snapshot!.CountedRuns);
        BitEqual.Assert(frozen.Snapshot.Settings, archived.Snapshot.Settings);
    }

    private static RunRecord Record()
    {
        var record = RunRecords.Of(s_day);
        var tenDays = new MeasureSpec(MeasureKind.Var, s_99, new(10));
        return record with
        {
            Results = record.Results with
            {
                Models =
                [
                    new() { Name = "t", Kind = ModelKind.StudentT, Calibration = record.Results.Calibration, Simulation = record.Results.Simulation, Nodes = [Node("ALL", Measure(RunRecords.OneDayVar, 3.5), Measure(new(MeasureKind.Es, s_99, new(1)), 4)), Node("FX", Measure(RunRecords.OneDayVar, double.NaN))] },
                    new() { Name = "past", Kind = ModelKind.Historical, Nodes = [Node("FX", Measure(RunRecords.OneDayVar, 2.5), Measure(tenDays, 9)), Node("ALL", Measure(RunRecords.OneDayVar, 1.5) with { Sample = new(1, null) })] },
                    new() { Name = "failed", Kind = ModelKind.Stressed },
                ],
                ModelBacktests = [new() { Model = "t", Book = "ALL", Confidence = s_99, Window = 250, Days = 200, Exceptions = 3, Zone = BacktestZone.Yellow, Coverage = new(1.0 / 3, 0.1), Independence = null, Conditional = new(2, 0.5) }],
            },
        };
    }

    private static ModelNode Node(string book, params MeasureResult[] measures) => new(book, "EUR", measures);

    private static MeasureResult Measure(MeasureSpec spec, double value) => new(spec, value, value, value, 0.95);

    private List<string> Rows()
    {
        using var connection = new SqliteConnection($"Data Source={_fixture.StorePath};Pooling=False");
        connection.Open();
        using var command = connection.CreateCommand();
        command.CommandText = "SELECT model || '|' || book || '|' || confidence || '|' || value FROM run_challenger_var ORDER BY 1";
        using var rows = command.ExecuteReader();
        var found = new List<string>();
        while (rows.Read()) found.Add(rows.GetString(0));
        return found;
    }

    private void Raw(params string[] statements)
    {
        using var connection = new SqliteConnection($"Data Source={_fixture.StorePath};Pooling=False");
        connection.Open();
        foreach (var sql in statements)
        {
            using var command = connection.CreateCommand();
#pragma warning disable CA2100 // The statements are the test's own.
            command.CommandText = sql;
#pragma warning restore CA2100
            command.ExecuteNonQuery();
        }
    }
}
