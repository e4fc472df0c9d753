using System.Text.Json.Nodes;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class RunJournalTests : IDisposable
{
    private static readonly DateOnly s_day = new(2026, 11, 27);
    private readonly FeedFixture _fixture = new(withFiles: false);
    private readonly RiskStore _store;

    public RunJournalTests() => _store = _fixture.Open();

    public void Dispose()
    {
        _store.Dispose();
        _fixture.Dispose();
    }

    [Theory]
    [InlineData(RunStatus.Degraded)]
    [InlineData(RunStatus.Failed)]
    public void Find_after_append_returns_every_field_to_the_bit(RunStatus status)
    {
        var record = RunRecords.Of(s_day, profitFrom: s_day.AddDays(-1), status: status);

        var head = _store.Runs.Append(record);
        var stored = _store.Runs.Find(record.Run)!;

        Assert.Equal(head, stored.Head);
        BitEqual.Assert(record, stored.Record);
    }

    [Fact]
    public void Find_figure_that_is_no_number_comes_back_as_such()
    {
        var record = RunRecords.Of(s_day, var: double.NaN);

        _store.Runs.Append(record);

        BitEqual.Assert(record, _store.Runs.Find(record.Run)!.Record);
        Assert.Null(_store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken));
    }

    [Fact]
    public void Read_record_of_an_older_version_gives_later_fields_their_defaults()
    {
        var record = RunRecords.Of(s_day);
        var json = JsonNode.Parse(RecordJson.Write(record))!;
        json["results"]!.AsObject().Remove("adjustments");
        json["results"]!.AsObject().Remove("holdings");
        json["results"]!.AsObject().Remove("sensitivities");
        json["results"]!.AsObject().Remove("methods");
        json["settings"]!["checks"]!.AsObject().Remove("staleDays");
        json["settings"]!.AsObject().Remove("curveInterpolation");

        var read = RecordJson.Read(System.Text.Encoding.UTF8.GetBytes(json.ToJsonString()));

        Assert.Empty(read.Results.Adjustments);
        Assert.Empty(read.Results.Holdings.Unpriced);
        Assert.Empty(read.Results.Sensitivities);
        Assert.Empty(read.Results.Methods);
        Assert.Equal(Domain.Market.CurveInterpolation.LinearZero, read.Settings.CurveInterpolation);
        Assert.Equal(3, read.Settings.Checks.StaleDays);
    }

    [Fact]
    public void Find_takes_any_prefix_of_only_one_run()
    {
        var runs = Enumerable.Range(0, 40).Select(i => RunRecords.Of(s_day.AddDays(i))).ToArray();
        foreach (var run in runs) _store.Runs.Append(run);

        Assert.Equal(runs[7].Run, _store.Runs.Find(runs[7].Run[..8])!.Record.Run);
        Assert.Null(_store.Runs.Find("%"));
        Assert.Null(_store.Runs.Find("0123456789abcdef"));
        var shared = runs.GroupBy(r => r.Run[0]).First(g => g.Count() > 1).Key.ToString();
        Assert.Contains("Give more digits", Assert.Throws<StoreException>(() => _store.Runs.Find(shared)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Append_same_run_twice_is_refused()
    {
        _store.Runs.Append(RunRecords.Of(s_day));

        Assert.Equal(StoreFault.Refused, Assert.Throws<StoreException>(() => _store.Runs.Append(RunRecords.Of(s_day))).Fault);
        Assert.Single(_store.Runs.List());
        Assert.Single(_store.Runs.ReadChain());
    }

    [Fact]
    public void AppendNext_gives_each_attempt_at_the_same_inputs_its_number_and_id()
    {
        var record = RunRecords.Of(s_day);
        var stored = Enumerable.Range(0, 3).Select(_ => _store.Runs.AppendNext(record)).ToList();
        Assert.Equal([1, 2, 3], stored.Select(s => s.Record.Attempt));
        Assert.Equal(stored.Select(s => RunIdentity.Of(record.Snapshot, s.Record.Attempt)), stored.Select(s => s.Record.Run));
        Assert.Equal(stored.Select(s => s.Head), stored.Select(s => _store.Runs.Find(s.Record.Run)!.Head));
        Assert.Null(_store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken));
    }

    [Fact]
    public void AttemptsOf_lists_the_runs_of_the_same_inputs_in_order()
    {
        var snapshot = SnapshotHash.OfText("same");
        _store.Runs.Append(RunRecords.Of(s_day, 1, snapshot));
        _store.Runs.Append(RunRecords.Of(s_day, 2, snapshot));
        _store.Runs.Append(RunRecords.Of(s_day));

        Assert.Equal([1, 2], _store.Runs.AttemptsOf(snapshot).Select(r => r.Attempt));
    }

    [Fact]
    public void List_shows_what_the_record_says_and_the_head_of_its_entry()
    {
        var record = RunRecords.Of(s_day, evidence: EvidenceKind.Backfilled);
        var head = _store.Runs.Append(record);

        Assert.Equal(
            new RunSummary(record.Run, 1, s_day, RunStatus.Degraded, EvidenceKind.Backfilled, "lognormal", 200_000, record.Started, record.Finished, record.Snapshot, record.Figures, head, ulong.MaxValue, 0),
            Assert.Single(_store.Runs.List()));
    }

    [Fact]
    public void AppendDocuments_chains_their_hashes_behind_the_results()
    {
        var record = RunRecords.Of(s_day);
        var head = _store.Runs.Append(record);
        DocumentHash[] documents = [new("limits.pdf", SnapshotHash.OfText("pdf")), new("results.json", SnapshotHash.OfText("json"))];

        var second = _store.Runs.AppendDocuments(record.Run, documents);

        var chain = _store.Runs.ReadChain();
        Assert.Equal([ChainEntryKind.Results, ChainEntryKind.Documents], chain.Select(e => e.Kind));
        Assert.Equal([head, second], chain.Select(e => e.Hash));
        Assert.Equal(documents, _store.Runs.DocumentsOf(record.Run));
        Assert.Equal(head, _store.Runs.Find(record.Run)!.Head);
        Assert.Equal(StoreFault.Refused, Assert.Throws<StoreException>(() => _store.Runs.AppendDocuments("000000000000", documents)).Fault);
        Assert.Null(_store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken));
    }

    [Fact]
    public void PreviousRun_is_the_newest_run_of_the_latest_earlier_date_that_did_not_fail()
    {
        _store.Runs.Append(RunRecords.Of(s_day.AddDays(-3)));
        var wanted = RunRecords.Of(s_day.AddDays(-2), attempt: 2);
        _store.Runs.Append(RunRecords.Of(s_day.AddDays(-2)));
        _store.Runs.Append(wanted);
        _store.Runs.Append(RunRecords.Of(s_day.AddDays(-1), status: RunStatus.Failed));
        _store.Runs.Append(RunRecords.Of(s_day.AddDays(-1), model: "other", snapshot: SnapshotHash.OfText("o")));
        _store.Runs.Append(RunRecords.Of(s_day));
        _store.Runs.Append(RunRecords.Of(s_day.AddDays(1)));

        var previous = _store.Runs.PreviousRun(s_day, "lognormal")!;

        Assert.Equal((wanted.Run, s_day.AddDays(-2), 200_000), (previous.Run, previous.AsOf, previous.Scenarios));
        Assert.Equal(["ALL", "FX"], previous.Nodes.Select(n => n.Book));
        Assert.Equal([("firm-var", 0.5, LimitStatus.Within, s_day.AddDays(-5)), ("fx-es", null, LimitStatus.Inconclusive, s_day.AddDays(-2))],
            previous.Limits.Select(l => (l.Limit, l.Used, l.Status, l.StatusSince)));
    }

    [Fact]
    public void PreviousRun_without_an_earlier_date_is_the_newest_run_of_the_same_date()
    {
        var snapshot = SnapshotHash.OfText("same");
        _store.Runs.Append(RunRecords.Of(s_day, 1, snapshot));
        _store.Runs.Append(RunRecords.Of(s_day, 2, snapshot));
        _store.Runs.Append(RunRecords.Of(s_day.AddDays(1)));

        Assert.Equal(RunIdentity.Of(snapshot, 2), _store.Runs.PreviousRun(s_day, "lognormal")!.Run);
        Assert.Null(_store.Runs.PreviousRun(s_day.AddDays(-1), "lognormal"));
    }

    [Theory]
    [InlineData("UPDATE run SET as_of = '2020-01-01'")]
    [InlineData("DELETE FROM run")]
    [InlineData("UPDATE chain SET run = run")]
    [InlineData("DELETE FROM chain")]
    [InlineData("DELETE FROM run_var")]
    [InlineData("UPDATE run_profit SET amount = 0")]
    [InlineData("DELETE FROM document")]
    [InlineData("INSERT OR REPLACE INTO chain SELECT * FROM chain")]
    public void Stored_run_can_be_neither_changed_nor_removed(string sql)
    {
        Fill();

        Assert.Contains("append-only", Assert.Throws<SqliteException>(() => Raw("PRAGMA recursive_triggers = ON", sql)).Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("DELETE FROM chain WHERE sequence = 2", "Entry 2 of the record is missing")]
    [InlineData("DELETE FROM chain WHERE sequence = 6", "was removed")]
    [InlineData("UPDATE chain SET content = (SELECT content FROM chain WHERE sequence = 1) WHERE sequence = 3", "was altered")]
    [InlineData("UPDATE chain SET sequence = CASE sequence WHEN 3 THEN -3 WHEN 4 THEN 3 END WHERE sequence IN (3, 4); UPDATE chain SET sequence = 4 WHERE sequence = -3", "does not follow")]
    [InlineData("UPDATE chain SET kind = 'other' WHERE sequence = 2", "was altered")]
    [InlineData("UPDATE run SET record = (SELECT record FROM run WHERE sequence = 1) WHERE sequence = 2", "was altered")]
    [InlineData("UPDATE run SET record = x'00112233' WHERE sequence = 2", "was altered")]
    [InlineData("DELETE FROM run WHERE sequence = 2", "is missing")]
    [InlineData("UPDATE run SET evidence = 'backfilled' WHERE sequence = 3", "differs from the record")]
    [InlineData("UPDATE run_var SET value = value * 1.0000000000000002", "differs from the record")]
    [InlineData("DELETE FROM run_profit WHERE book = 'FX'", "differs from the record")]
    [InlineData("UPDATE document SET sha256 = 'x'", "document hashes")]
    public void FirstBreak_names_what_was_removed_altered_or_reordered_round_the_triggers(string sql, string expected)
    {
        Fill();
        Assert.Null(_store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken));

        Raw(["PRAGMA foreign_keys = OFF", .. Triggers().Select(t => $"DROP TRIGGER {t}"), sql]);

        Assert.Contains(expected, _store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken), StringComparison.Ordinal);
    }

    [Fact]
    public void Append_from_two_stores_at_once_does_not_fork_the_chain()
    {
        using var other = _fixture.Open();

        Parallel.ForEach(Enumerable.Range(0, 60), new ParallelOptions { MaxDegreeOfParallelism = 6 }, i =>
        {
            var record = RunRecords.Of(s_day.AddDays(i));
            var runs = (i % 2 == 0 ? _store : other).Runs;
            runs.Append(record);
            runs.AppendDocuments(record.Run, [new("limits.pdf", record.Figures)]);
        });

        Assert.Equal(120, _store.Runs.ReadChain().Count);
        Assert.Null(_store.Runs.FirstBreak(cancellation: TestContext.Current.CancellationToken));
    }

    private void Fill()
    {
        foreach (var i in Enumerable.Range(0, 3))
        {
            var record = RunRecords.Of(s_day.AddDays(i), profitFrom: s_day.AddDays(i - 1));
            _store.Runs.Append(record);
            _store.Runs.AppendDocuments(record.Run, [new("limits.pdf", record.Figures)]);
        }
    }

    private List<string> Triggers()
    {
        using var connection = new SqliteConnection($"Data Source={_fixture.StorePath};Pooling=False");
        connection.Open();
        using var command = connection.CreateCommand();
        command.CommandText = "SELECT name FROM sqlite_master WHERE type = 'trigger'";
        using var rows = command.ExecuteReader();
        var names = new List<string>();
        while (rows.Read()) names.Add(rows.GetString(0));
        return names;
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
