using System.Diagnostics;
using System.Globalization;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Host.Options;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>One complete run: feed, snapshot, calculation, record, documents; or a span of past dates, kept without documents.</summary>
public sealed class MeasureRun(FeedRefresh refresh, Rehearsal rehearsal, TimeProvider clock)
{
    private const int BackfillScenarios = 20_000;

    // The steps of one past date would only flicker: the span reports dates.
    private static readonly Progress<WorkProgress> s_quiet = new();

    /// <summary>Runs.</summary>
    /// <exception cref="DataRefusedException">The feed was refused, or there is no date to run on.</exception>
    public Task<MeasureReport> RunAsync(MeasureRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) =>
        Task.Run(() => Run(request, progress, cancellationToken), cancellationToken);

    private MeasureReport Run(MeasureRequest request, IProgress<WorkProgress> progress, CancellationToken cancellation)
    {
        var started = clock.GetUtcNow();
        var watch = Stopwatch.StartNew();
        rehearsal.Start();
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        refresh.Into(store, request.Workspace, progress, cancellation);
        var work = new Work(request, store, new SnapshotReader(store), progress, cancellation);
        var load = watch.Elapsed.TotalSeconds;

        if (request.From is { } from && request.To is { } to) return Span(work, from, to);
        var asOf = request.AsOf ?? NewestDate(work.Reader);
        var filled = Fill(work, MissingDates(work, asOf));
        return Single(work, asOf, started, load, filled);
    }

    private sealed record Work(MeasureRequest Request, RiskStore Store, SnapshotReader Reader, IProgress<WorkProgress> Progress, CancellationToken Cancellation)
    {
        public RunSettings Settings => Request.Configuration.Run;
    }

    private static DateOnly NewestDate(SnapshotReader reader) =>
        reader.PositionDates.Count > 0 ? reader.PositionDates[^1] : throw new DataRefusedException("There are no positions in the store, so there is no date to run on. Give positions.csv at least one row.");

    private MeasureReport Single(Work work, DateOnly asOf, DateTimeOffset started, double load, int filled)
    {
        var (calculated, inputs) = Calculate(work, asOf, work.Settings, started, load);
        var stored = work.Store.Runs.AppendNext(calculated, inputs);
        var outcome = stored.Record;
        work.Progress.Report(new("report", 0));
        var written = RunDocuments.Write(stored, work.Request.Workspace.OutFolder);
        work.Store.Runs.AppendDocuments(outcome.Run, written.Hashes);
        return new MeasureReport
        {
            Record = outcome,
            Folder = written.Folder,
            Documents = written.Paths,
            Json = written.Json,
            ExitCode = ExitCodeOf(outcome),
            Backfilled = filled,
        };
    }

    private MeasureReport Span(Work work, DateOnly from, DateOnly to)
    {
        var dates = work.Reader.PositionDates.Where(d => d >= from && d <= to).ToList();
        if (dates.Count == 0) throw new DataRefusedException($"There are no positions from {from:yyyy-MM-dd} to {to:yyyy-MM-dd} in the store.");
        RunRecord? last = null;
        for (var i = 0; i < dates.Count; i++)
        {
            work.Progress.Report(new("backfill", (double)i / dates.Count, $"{dates[i]:yyyy-MM-dd}"));
            var (record, inputs) = Past(work, dates[i], work.Settings);
            last = work.Store.Runs.AppendNext(record, inputs).Record;
        }
        return new MeasureReport { Record = last!, Folder = null, Documents = [], Json = RunDocuments.JsonOf(last!), ExitCode = ExitCodeOf(last!), Backfilled = dates.Count };
    }

    // The newest past dates with positions that have no run of this model, oldest first.
    private static List<DateOnly> MissingDates(Work work, DateOnly asOf)
    {
        var wanted = work.Request.Configuration.BackfillDays;
        if (wanted == 0) return [];
        var model = work.Settings.Model.Name;
        var run = work.Store.Runs.List().Where(r => r.Model == model && r.Status != RunStatus.Failed).Select(r => r.AsOf).ToHashSet();
        return [.. work.Reader.PositionDates.Where(d => d < asOf).TakeLast(wanted).Where(d => !run.Contains(d))];
    }

    // A date that fails is asked for again with every run, since the feed may have been mended; what failed before on the same inputs is on record.
    private int Fill(Work work, List<DateOnly> dates)
    {
        var settings = work.Settings with { Simulation = work.Settings.Simulation with { Scenarios = BackfillScenarios, Looks = 1, Cap = BackfillScenarios, Precision = null } };
        var filled = 0;
        for (var i = 0; i < dates.Count; i++)
        {
            work.Progress.Report(new("backfill", (double)i / dates.Count, $"{dates[i]:yyyy-MM-dd}"));
            var (record, inputs) = Past(work, dates[i], settings);
            var hasFailed = record.Status == RunStatus.Failed;
            if (!hasFailed) filled++;
            if (!hasFailed || work.Store.Runs.AttemptsOf(record.Snapshot).Count == 0) work.Store.Runs.AppendNext(record, inputs);
        }
        return filled;
    }

    private (RunRecord Record, FrozenSnapshot Inputs) Past(Work work, DateOnly asOf, RunSettings settings)
    {
        var (record, inputs) = Calculate(work with { Progress = s_quiet }, asOf, settings, clock.GetUtcNow(), 0, isEvidence: true);
        return (record with { Evidence = EvidenceKind.Backfilled, Results = RunRecords.EvidenceAlone(record.Results) }, inputs);
    }

    private (RunRecord Record, FrozenSnapshot Inputs) Calculate(Work work, DateOnly asOf, RunSettings settings, DateTimeOffset started, double load, bool isEvidence = false)
    {
        var watch = Stopwatch.StartNew();
        var inputs = work.Reader.Freeze(asOf, settings, settings.Model.Name);
        var snapshot = inputs.Snapshot;
        load += watch.Elapsed.TotalSeconds;
        var calculator = new RunCalculator(snapshot, work.Request.Threads ?? Environment.ProcessorCount, new SimulationProgress(work.Progress), work.Cancellation) { IsEvidenceOnly = isEvidence };
        var results = calculator.Calculate();
        var previous = work.Store.Runs.PreviousRun(asOf, settings.Model.Name);
        var record = RunRecords.Of(snapshot, results, previous) with
        {
            Started = started,
            Finished = clock.GetUtcNow(),
            Evidence = work.Reader.ObservationDates[^1] > asOf ? EvidenceKind.Backfilled : EvidenceKind.Recorded,
            Command = CommandFor(work.Request, asOf, settings),
            Timings = calculator.Timings with { Load = load },
        };
        return (record, inputs);
    }

    private static string CommandFor(MeasureRequest request, DateOnly asOf, RunSettings settings) => ShellText.Of(
    [
        .. request.Command, "--as-of", asOf.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture), "--scenarios", settings.Simulation.Scenarios.ToString(CultureInfo.InvariantCulture),
        "--seed", settings.Simulation.Seed.ToString(CultureInfo.InvariantCulture), "--model", settings.Model.Name,
    ]);

    private static ExitCode ExitCodeOf(RunRecord record)
    {
        if (record.Status == RunStatus.Failed) return ExitCode.Blocked;
        if (record.Results.Limits.Any(l => l.Status == LimitStatus.Breached)) return ExitCode.Breach;
        return record.Results.Limits.Any(l => l.Status == LimitStatus.Inconclusive) ? ExitCode.Undecided : ExitCode.Done;
    }
}
