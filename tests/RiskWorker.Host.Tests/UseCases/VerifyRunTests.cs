using System.Globalization;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.UseCases;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.Tests.UseCases;

public sealed class VerifyRunTests(MeasuredRuns runs) : IClassFixture<MeasuredRuns>, IDisposable
{
    private readonly TemporaryFolder _folder = runs.Copy();

    private string Documents => Path.Combine(_folder.Path, "out", "2026-11-27", runs.Recorded);

    public void Dispose() => _folder.Dispose();

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(null)]
    public async Task RunAsync_recorded_run_is_equal_on_any_number_of_threads(int? threads)
    {
        var report = await VerifyAsync(runs.Recorded, threads);

        Assert.Equal(ExitCode.Done, report.ExitCode);
        Assert.Equal(Enum.GetValues<VerifiedThing>().Select(t => (t, VerifyOutcome.Equal)), report.Checks.Select(c => (c.Thing, c.Outcome)));
        Assert.Empty(report.Differences);
        Assert.Equal(RunStatus.Degraded, report.Record!.Status);
        Assert.Equal(3, report.Record.Results.Backtest[0].Series.Count);
        Assert.NotEmpty(report.Record.Results.Sensitivities);
    }

    [Fact]
    public async Task RunAsync_backfilled_run_is_equal_though_its_record_holds_counts_alone()
    {
        var report = await VerifyAsync(runs.Backfilled[..10]);

        Assert.Equal(ExitCode.Done, report.ExitCode);
        Assert.Equal((EvidenceKind.Backfilled, 2, 0), (report.Record!.Evidence, report.Record.Results.Backtest[0].Days, report.Record.Results.Backtest[0].Series.Count));
        Assert.Empty(report.Record.Results.Sensitivities);
        Assert.Equal(["None were written."], Check(report, VerifiedThing.Documents).Findings);
        Assert.Equal(VerifyOutcome.Equal, Check(report, VerifiedThing.Figures).Outcome);
    }

    [Fact]
    public async Task RunAsync_writes_nothing()
    {
        var before = Hashes();

        await VerifyAsync(runs.Recorded);

        Assert.Equal(before, Hashes());
    }

    [Theory]
    [InlineData("no-such-run")]
    [InlineData("")]
    public async Task RunAsync_unknown_run_is_not_stored(string run) => await Assert.ThrowsAsync<NotStoredException>(() => VerifyAsync(run));

    [Fact]
    public async Task RunAsync_without_a_store_makes_none()
    {
        File.Delete(MeasuredRuns.WorkspaceIn(_folder).StoreFile);

        await Assert.ThrowsAsync<NotStoredException>(() => VerifyAsync(runs.Recorded));

        Assert.False(File.Exists(MeasuredRuns.WorkspaceIn(_folder).StoreFile));
    }

    [Theory]
    [InlineData("DELETE FROM chain WHERE sequence = 2", "Entry 2 of the record is missing")]
    [InlineData("UPDATE chain SET sequence = CASE sequence WHEN 2 THEN -2 WHEN 3 THEN 2 END WHERE sequence IN (2, 3); UPDATE chain SET sequence = 3 WHERE sequence = -2", "does not follow the entry before it")]
    [InlineData("UPDATE chain SET content = (SELECT content FROM chain WHERE sequence = 1) WHERE sequence = 2", "Entry 2")]
    [InlineData("UPDATE run SET record = x'00' WHERE sequence = 1", "was altered")]
    [InlineData("UPDATE run_var SET value = value + 1", "differs from the record")]
    [InlineData("UPDATE document SET sha256 = 'x' WHERE name = 'limit-report.pdf'", "document hashes")]
    public async Task RunAsync_break_of_the_chain_is_named(string sql, string expected)
    {
        MeasuredRuns.Tamper(_folder, sql);

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Chain, expected);
    }

    [Fact]
    public async Task RunAsync_altered_record_is_named_with_the_figure_that_was_altered()
    {
        var value = Stored(runs.Recorded).Results.Nodes[1].Measures[0].Value;
        var (old, altered) = (value.ToString("R", CultureInfo.InvariantCulture), Math.BitIncrement(value).ToString("R", CultureInfo.InvariantCulture));
        var text = MeasuredRuns.RecordText(_folder, runs.Recorded);
        Assert.Contains($"\"value\":{old}", text, StringComparison.Ordinal);
        MeasuredRuns.Tamper(_folder, $"UPDATE run SET record = {MeasuredRuns.Packed(text.Replace($"\"value\":{old}", $"\"value\":{altered}", StringComparison.Ordinal))} WHERE run = '{runs.Recorded}'");

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Record, $"The record of run {runs.Recorded} was altered");
        Assert.Equal(VerifyOutcome.Equal, Check(report, VerifiedThing.Snapshot).Outcome);
        var first = report.Differences[0];
        Assert.Equal(("nodes[DESK].measures[var 0.95 1].value", altered, old), (first.Path, first.Recorded, first.Computed));
        Assert.Equal((Bits(Math.BitIncrement(value)), Bits(value)), (first.RecordedBits, first.ComputedBits));
        AssertDifferent(report, VerifiedThing.Figures, $"recorded {altered} (bits {Bits(Math.BitIncrement(value))}), computed {old} (bits {Bits(value)})");
    }

    [Fact]
    public async Task RunAsync_record_altered_beyond_reading_is_named()
    {
        MeasuredRuns.Tamper(_folder, $"UPDATE run SET record = x'00' WHERE run = '{runs.Recorded}'");

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Record, "was altered");
        Assert.Equal(VerifyOutcome.NotChecked, Check(report, VerifiedThing.Figures).Outcome);
    }

    [Theory]
    [InlineData("DELETE FROM run WHERE run = '{0}'", "The record of run {0} is missing")]
    [InlineData("DELETE FROM chain WHERE run = '{0}'", "The results of run {0} are stored without an entry")]
    public async Task RunAsync_removed_run_is_tampering_and_not_unknown(string sql, string expected)
    {
        MeasuredRuns.Tamper(_folder, string.Format(CultureInfo.InvariantCulture, sql, runs.Recorded));

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Record, string.Format(CultureInfo.InvariantCulture, expected, runs.Recorded));
        AssertDifferent(report, VerifiedThing.Chain, runs.Recorded);
    }

    [Theory]
    [InlineData("DELETE FROM snapshot_part WHERE hash = '{0}'", "The part as-of is gone.")]
    [InlineData("UPDATE snapshot_part SET content = (SELECT content FROM snapshot_part WHERE hash <> '{0}' LIMIT 1) WHERE hash = '{0}'", "The part as-of was altered")]
    [InlineData("DELETE FROM snapshot", "Its list of parts is not in the store.")]
    public async Task RunAsync_snapshot_that_is_not_whole_is_named_and_not_computed_from(string sql, string expected)
    {
        MeasuredRuns.Tamper(_folder, string.Format(CultureInfo.InvariantCulture, sql, SnapshotHash.OfText("2026-11-27\n2026-11-26\n")));

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Snapshot, expected);
        Assert.Equal(VerifyOutcome.NotChecked, Check(report, VerifiedThing.Figures).Outcome);
        Assert.Equal(VerifyOutcome.Equal, Check(report, VerifiedThing.Chain).Outcome);
    }

    [Theory]
    [InlineData("limit-report.pdf")]
    [InlineData("results.json")]
    [InlineData("results.csv")]
    [InlineData("sensitivities.csv")]
    public async Task RunAsync_altered_file_is_named(string name)
    {
        var bytes = await File.ReadAllBytesAsync(Path.Combine(Documents, name), TestContext.Current.CancellationToken);
        bytes[^2] ^= 1;
        await File.WriteAllBytesAsync(Path.Combine(Documents, name), bytes, TestContext.Current.CancellationToken);

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Documents, $"{name} was altered");
        Assert.Equal(VerifyOutcome.Equal, Check(report, VerifiedThing.Figures).Outcome);
    }

    [Fact]
    public async Task RunAsync_every_missing_file_is_named()
    {
        Directory.Delete(Documents, recursive: true);

        var report = await VerifyAsync(runs.Recorded);

        AssertDifferent(report, VerifiedThing.Documents, "limit-report.pdf is missing");
        Assert.Equal(4, Check(report, VerifiedThing.Documents).Findings.Count);
    }

    [Fact]
    public async Task RunAsync_other_figures_of_another_epoch_are_no_tampering()
    {
        var run = AppendOfEpoch(0, value => value * (1 + 1e-12));

        var report = await VerifyAsync(run);

        Assert.Equal(ExitCode.Done, report.ExitCode);
        var figures = Check(report, VerifiedThing.Figures);
        Assert.Equal(VerifyOutcome.OtherEpoch, figures.Outcome);
        Assert.Contains("epoch 0", figures.Findings[1], StringComparison.Ordinal);
        Assert.Equal(["nodes[FIRM].value", "figures"], report.Differences.Select(d => d.Path));
        Assert.Equal("The largest difference is 1.0e-12 of its value.", figures.Findings[^1]);
    }

    [Fact]
    public async Task RunAsync_equal_figures_of_another_epoch_are_equal()
    {
        var report = await VerifyAsync(AppendOfEpoch(0, value => value));

        Assert.Equal(VerifyOutcome.Equal, Check(report, VerifiedThing.Figures).Outcome);
    }

    [Fact]
    public async Task RunAsync_other_figures_of_this_epoch_are_a_difference_though_chain_and_record_are_whole()
    {
        var report = await VerifyAsync(AppendOfEpoch(Numerics.NumericsEpoch.Current, Math.BitDecrement));

        AssertDifferent(report, VerifiedThing.Figures, "The first: nodes[FIRM].value: recorded ");
        Assert.Equal((VerifyOutcome.Equal, VerifyOutcome.Equal), (Check(report, VerifiedThing.Chain).Outcome, Check(report, VerifiedThing.Record).Outcome));
    }

    // A version before it had none; a later one may say it better. Neither is tampering.
    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public async Task RunAsync_other_words_on_the_methods_are_no_difference(bool hasWords)
    {
        Assert.NotEmpty(Stored(runs.Recorded).Results.Methods);
        ValuationMethod[] methods = hasWords ? [new("spot", "a price", "S", "a rule", "a caution", 7)] : [];

        var report = await VerifyAsync(Append(Numerics.NumericsEpoch.Current, results => results with { Methods = methods }));

        Assert.Equal(VerifyOutcome.Equal, Check(report, VerifiedThing.Figures).Outcome);
    }

    /// <summary>Stores the recorded run once more, under another epoch and with another value of the firm, properly chained.</summary>
    private string AppendOfEpoch(int epoch, Func<double, double> value) =>
        Append(epoch, results => results with { Nodes = [.. results.Nodes.Select((node, i) => i == 0 ? node with { Value = value(node.Value) } : node)] });

    private string Append(int epoch, Func<RunResults, RunResults> change)
    {
        var record = Stored(runs.Recorded);
        var results = change(record.Results);
        record = record with { Run = RunIdentity.Of(record.Snapshot, 2), Attempt = 2, Epoch = epoch, Results = results, Figures = FiguresHash.Of(results) };
        using var store = RiskStore.Open(MeasuredRuns.WorkspaceIn(_folder).StoreFile);
        store.Runs.Append(record);
        return record.Run;
    }

    private RunRecord Stored(string run)
    {
        using var store = RiskStore.Open(MeasuredRuns.WorkspaceIn(_folder).StoreFile);
        return store.Runs.Find(run)!.Record;
    }

    private Task<VerifyReport> VerifyAsync(string run, int? threads = 2) =>
        VerifyRun.RunAsync(new(MeasuredRuns.WorkspaceIn(_folder), run, threads), new Progress<WorkProgress>(), TestContext.Current.CancellationToken);

    private static VerifyCheck Check(VerifyReport report, VerifiedThing thing) => report.Checks.Single(c => c.Thing == thing);

    private static void AssertDifferent(VerifyReport report, VerifiedThing thing, string expected)
    {
        Assert.Equal(ExitCode.Difference, report.ExitCode);
        Assert.Equal(VerifyOutcome.Different, Check(report, thing).Outcome);
        Assert.Contains(Check(report, thing).Findings, sentence => sentence.Contains(expected, StringComparison.Ordinal));
    }

    private static string Bits(double value) => BitConverter.DoubleToUInt64Bits(value).ToString("x16", CultureInfo.InvariantCulture);

    private List<string> Hashes() => [.. Directory.EnumerateFiles(_folder.Path, "*", SearchOption.AllDirectories).Order(StringComparer.Ordinal).Select(f => f + SnapshotHash.OfBytes(File.ReadAllBytes(f)))];
}
