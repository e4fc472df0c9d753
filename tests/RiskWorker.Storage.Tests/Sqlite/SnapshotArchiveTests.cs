using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Storage.Tests.Sqlite;

public sealed class SnapshotArchiveTests : IDisposable
{
    private static readonly DateOnly s_day = new(2026, 11, 6);
    private static readonly RunSettings s_settings = new()
    {
        Model = new() { Covariance = CovarianceEstimator.Given, Drift = DriftKind.Explicit, Drifts = new SortedDictionary<string, double>(StringComparer.Ordinal) { ["ALPHA"] = 0.05, ["ALPHA-B"] = -0.0 }, Ageing = AgeingKind.Horizon },
        Measures = [RunRecords.OneDayVar, new(MeasureKind.Es, new(0.975m), new(10))],
        Simulation = new() { Seed = ulong.MaxValue, Precision = 0.005 },
        Checks = new() { Severity = new SortedDictionary<string, FindingSeverity>(StringComparer.Ordinal) { ["PRICE-STALE"] = FindingSeverity.Blocking } },
        TimeEffectsIncluded = true,
    };

    private readonly FeedFixture _fixture = new();
    private readonly RiskStore _store;
    private readonly SnapshotReader _reader;

    public SnapshotArchiveTests()
    {
        // 'ALPHA' and 'ALPHA-B' sort differently as names and as rows of text; the last letters of two books do in UTF-8 and in UTF-16.
        _fixture["books.csv"] = "book,parent,name,currency\nALL,,The firm,EUR\nEQ,ALL,Equities,EUR\nFX,ALL,,\nEQ\U0001F600,ALL,\"Tab\there, \\0\",EUR\nEQ\uFF21,ALL,,EUR\n";
        _fixture["factors.csv"] = "factor,class,shock,currency,curve,tenor_years,calendar,liquidity_days,proxy,beta\nALPHA,equity,lognormal,EUR,,,TARGET,10,ALPHA-B,1.5\nALPHA-B,equity,lognormal,EUR,,,,,,\nUSDEUR,fx,lognormal,USD,,,,,,\nEUR-1Y,rate,normal,EUR,EUR,1,,,,\n";
        _fixture["observations.csv"] += "2026-11-03,ALPHA-B,7\n2026-11-06,NOBODY,1\n";
        _fixture["instruments.csv"] += "ALPHA,forward,EUR,ALPHA,100,2027-03-19,,,,EUR,,\n";
        _fixture["positions.csv"] = "as_of,book,instrument,quantity,trade,market_value,note\n"
            + string.Concat(Enumerable.Range(2, 5).Select(d => $"2026-11-{d:00},EQ,ALPHA-S,{d},,,x\n2026-11-{d:00},EQ,ALPHA,-{d},T\\1,{d}.25,\n"));
        _fixture["limits.csv"] = "limit,book,measure,confidence,horizon_days,amount,basis,reference_book,warn_at,valid_from,valid_to,approver,reason\n"
            + "firm,ALL,var,0.990,1,250000,,,,,,,\nfirm-var,FX,es,0.975,10,1.5,book,ALL,0.7,2026-01-01,2026-12-31,A. Approver,\"Yearly\nreview\"\n";
        _fixture["holidays.csv"] = "calendar,date\nTARGET,2026-12-25\n";
        _fixture["adjustments.csv"] = "factor,date,ratio,reason\nALPHA,2026-11-03,2,split\nALPHA-B,2026-11-03,2,\nALPHA,2026-11-07,2.5,later\n";
        _fixture["covariance.csv"] = "factor,other,value\nALPHA,ALPHA,0.0001\nALPHA-B,ALPHA,0.00005\n";
        _store = _fixture.Open();
        Assert.Empty(_fixture.Load(_store).Faults);
        _reader = new(_store);
        // Profit is held from 2 to 3; it is not from 3 to 4, 4 to 5, and 5 to the as-of date is the run's own.
        Count(2);
        Count(3, profitFrom: 2);
        Count(4);
        Count(5, profitFrom: 3);
    }

    public void Dispose()
    {
        _store.Dispose();
        _fixture.Dispose();
    }

    [Fact]
    public void Read_gives_the_snapshot_back_to_the_bit()
    {
        var frozen = _reader.Freeze(s_day, s_settings, "lognormal");

        var archived = _store.Snapshots.Read(Append(frozen));

        Assert.Equal((frozen.Leaves.Count, 0), (archived.Parts, archived.Faults.Count));
        AssertEqual(frozen.Snapshot, archived.Snapshot!);
        // That nothing of this is empty is what makes it a test.
        var snapshot = archived.Snapshot!;
        Assert.Equal((4, 2, 5, 2, 2, 2), (snapshot.CountedRuns.Count, snapshot.EarlierPositions.Count, snapshot.Observations.Count, snapshot.Adjustments.Count, snapshot.Covariance.Count, snapshot.Limits.Count));
        Assert.Equal((2, 2, 1, 5, 4), (snapshot.Positions.Count, snapshot.ProfitAndLoss.Count, snapshot.Holidays.Count, snapshot.Books.Count, snapshot.Instruments.Count));
        Assert.NotEmpty(snapshot.FeedWarnings);
        Assert.NotNull(snapshot.Previous);
    }

    [Fact]
    public void Read_date_without_anything_gives_an_empty_snapshot_back()
    {
        var frozen = _reader.Freeze(new(2020, 1, 1), new(), "lognormal");

        AssertEqual(frozen.Snapshot, _store.Snapshots.Read(Append(frozen)).Snapshot!);
    }

    [Fact]
    public void Read_after_the_feed_has_changed_gives_what_the_run_read()
    {
        var frozen = _reader.Freeze(s_day, s_settings, "lognormal");
        var record = Append(frozen);
        _fixture["observations.csv"] = _fixture["observations.csv"]!.Replace("2026-11-04,ALPHA,", "2026-11-04,ALPHA,9", StringComparison.Ordinal);
        _fixture["books.csv"] = _fixture["books.csv"]!.Replace("Equities", "Shares", StringComparison.Ordinal);

        Assert.True(_fixture.Load(_store, minute: 1).Changed);

        AssertEqual(frozen.Snapshot, _store.Snapshots.Read(record).Snapshot!);
        Assert.NotEqual(frozen.Snapshot.Hash.Root, _reader.Take(s_day, s_settings, "lognormal").Hash.Root);
    }

    [Fact]
    public void Append_stores_what_runs_have_in_common_once()
    {
        Append(_reader.Freeze(Day(5), s_settings, "lognormal"));
        var before = Count("snapshot_part");
        var frozen = _reader.Freeze(s_day, s_settings, "lognormal");

        Append(frozen);
        Append(frozen, attempt: 2);

        // The as-of dates, and the observations, profit and positions of the day; the run that is counted in addition.
        Assert.Equal(before + 5, Count("snapshot_part"));
        Assert.Equal(2, Count("snapshot"));
    }

    [Fact]
    public void Append_from_two_stores_in_turn_keeps_every_part_once()
    {
        using var other = _fixture.Open();
        var records = Enumerable.Range(2, 5).Select(d => Append(_reader.Freeze(Day(d), new(), "m"), store: d % 2 == 0 ? _store : other)).ToArray();

        Assert.All(records, record => Assert.Empty(other.Snapshots.Read(record).Faults));
        Assert.Equal(Count("snapshot_part"), Convert.ToInt64(Raw("SELECT count(DISTINCT hash) FROM snapshot_part"), System.Globalization.CultureInfo.InvariantCulture));
    }

    [Fact]
    public void Append_that_was_undone_leaves_no_part_that_a_later_run_relies_on()
    {
        var frozen = _reader.Freeze(s_day, s_settings, "lognormal");
        Raw("CREATE TRIGGER full BEFORE INSERT ON run BEGIN SELECT RAISE (ABORT, 'the disk is full'); END");
        Assert.Throws<StoreException>(() => Append(frozen));
        Assert.Equal(0, Count("snapshot_part"));
        Raw("DROP TRIGGER full");

        Assert.Empty(_store.Snapshots.Read(Append(frozen)).Faults);
    }

    [Fact]
    public void Append_with_the_inputs_of_another_run_is_refused()
    {
        var record = RunRecords.Of(s_day, snapshot: SnapshotHash.OfText("other"));

        Assert.Throws<ArgumentException>(() => _store.Runs.Append(record, _reader.Freeze(s_day, s_settings, "lognormal")));
    }

    [Theory]
    [InlineData("UPDATE snapshot_part SET content = x'00'")]
    [InlineData("DELETE FROM snapshot_part")]
    [InlineData("UPDATE snapshot SET root = 'x'")]
    [InlineData("DELETE FROM snapshot")]
    public void Kept_snapshot_can_be_neither_changed_nor_removed(string sql)
    {
        Append(_reader.Freeze(s_day, s_settings, "lognormal"));

        Assert.Contains("append-only", Assert.Throws<SqliteException>(() => Raw(sql)).Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("DELETE FROM snapshot_part WHERE hash = '{0}'", "The part observations/2026-11-04 is gone.")]
    [InlineData("UPDATE snapshot_part SET content = x'00112233' WHERE hash = '{0}'", "The part observations/2026-11-04 was altered: it cannot be read.")]
    [InlineData("UPDATE snapshot_part SET content = (SELECT content FROM snapshot_part LIMIT 1) WHERE hash = '{0}'", "The part observations/2026-11-04 was altered: it hashes to")]
    [InlineData("UPDATE snapshot_part SET hash = 'x' WHERE hash = '{0}'", "The part observations/2026-11-04 was altered: it hashes to")]
    [InlineData("DELETE FROM snapshot", "Its list of parts is not in the store.")]
    [InlineData("UPDATE snapshot SET parts = x'00112233'", "Its list of parts was altered")]
    [InlineData("DELETE FROM run WHERE as_of = '2026-11-04'", "Run {1} of 2026-11-04, whose VaR it counts, is not stored as it was counted.")]
    public void Read_names_what_is_gone_or_altered(string sql, string expected)
    {
        var frozen = _reader.Freeze(s_day, s_settings, "lognormal");
        var record = Append(frozen);
        var part = frozen.Leaves.Single(l => l.Part.Path == "observations/2026-11-04").Part.Hash;
        var run = frozen.Snapshot.CountedRuns.Single(c => c.AsOf == Day(4)).Run;

        Tamper(string.Format(System.Globalization.CultureInfo.InvariantCulture, sql, part));

        var archived = _store.Snapshots.Read(record);
        Assert.StartsWith(string.Format(System.Globalization.CultureInfo.InvariantCulture, expected, part, run), Assert.Single(archived.Faults), StringComparison.Ordinal);
        Assert.Null(archived.Snapshot);
    }

    [Fact]
    public void Read_part_replaced_together_with_its_hash_names_the_file()
    {
        var frozen = _reader.Freeze(s_day, s_settings, "lognormal");
        var record = Append(frozen);
        var part = frozen.Leaves.Single(l => l.Part.Path == "observations/2026-11-04").Part.Hash;
        var forged = SnapshotLeaf.Of("", "ALPHA\t4059000000000000\t");

        Tamper($"UPDATE snapshot_part SET hash = '{forged.Part.Hash}', content = x'{Convert.ToHexString(Zlib.Pack(forged.Text))}' WHERE hash = '{part}'");

        Assert.StartsWith("The parts of observations hash to", Assert.Single(_store.Snapshots.Read(record).Faults), StringComparison.Ordinal);
    }

    private static void AssertEqual(Snapshot expected, Snapshot actual)
    {
        foreach (var property in typeof(Snapshot).GetProperties().Where(p => p.PropertyType != typeof(ObservationHistory)))
            BitEqual.Assert(property.GetValue(expected), property.GetValue(actual), property.Name);
        Assert.Equal(expected.Observations.Dates.ToArray(), actual.Observations.Dates.ToArray());
        Assert.Equal(expected.Observations.Factors, actual.Observations.Factors);
        for (var j = 0; j < expected.Observations.Factors.Count; j++) BitEqual.Assert(expected.Observations.Column(j).ToArray(), actual.Observations.Column(j).ToArray(), expected.Observations.Factors[j]);
    }

    private static DateOnly Day(int day) => new(2026, 11, day);

    // A version that did not price them took such rows as they were.
    [Fact]
    public void Read_instrument_that_only_an_earlier_version_took_is_kept_unmodelled_in_store_and_archive()
    {
        Raw("""UPDATE instrument SET kind = 'bond', terms = '{"coupon":"0.02","notional":"1000","maturity":"2031-03-15"}' WHERE instrument = 'ALPHA-S'""");

        var frozen = new SnapshotReader(_store).Freeze(s_day, s_settings, "lognormal");
        var archived = _store.Snapshots.Read(Append(frozen));

        Assert.Empty(archived.Faults);
        Assert.All([frozen.Snapshot, archived.Snapshot!], snapshot =>
        {
            var kept = Assert.IsType<UnmodelledInstrument>(snapshot.Instruments["ALPHA-S"]);
            Assert.Equal(("bond", "1000"), (kept.Kind, kept.Terms["notional"]));
            Assert.StartsWith("its frequency is missing, expected 0 (no coupons), 1, 2, 4 or 12", kept.Fault, StringComparison.Ordinal);
            Assert.IsType<Forward>(snapshot.Instruments["ALPHA"]);
        });
    }

    private void Count(int day, int? profitFrom = null) =>
        _store.Runs.Append(RunRecords.Of(Day(day), profitFrom: profitFrom is { } from ? Day(from) : null, evidence: day % 2 == 0 ? EvidenceKind.Recorded : EvidenceKind.Backfilled));

    private RunRecord Append(FrozenSnapshot frozen, int attempt = 1, RiskStore? store = null)
    {
        var hash = frozen.Snapshot.Hash;
        var record = RunRecords.Of(frozen.Snapshot.AsOf, attempt, hash.Root, model: "other") with { Parts = hash.Files };
        (store ?? _store).Runs.Append(record, frozen);
        return record;
    }

    private long Count(string table) => (long)Raw($"SELECT count(*) FROM {table}")!;

    private void Tamper(string sql)
    {
        Raw("DROP TRIGGER snapshot_part_stays; DROP TRIGGER snapshot_part_holds; DROP TRIGGER snapshot_stays; DROP TRIGGER snapshot_holds; DROP TRIGGER run_stays");
        Raw("PRAGMA foreign_keys = OFF; " + sql);
    }

    private object? Raw(string sql)
    {
        using var connection = new SqliteConnection($"Data Source={_fixture.StorePath};Pooling=False");
        connection.Open();
        using var command = connection.CreateCommand();
#pragma warning disable CA2100 // The statements are the test's own.
        command.CommandText = sql;
#pragma warning restore CA2100
        return command.ExecuteScalar();
    }
}
