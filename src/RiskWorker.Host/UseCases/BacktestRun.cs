using System.Reflection;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Numerics;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>Evidence over a span of days, and its documents.</summary>
public sealed class BacktestRun(FeedRefresh refresh, TimeProvider clock)
{
    private const int UsualDays = 500;

    private static readonly string s_version = typeof(BacktestRun).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()!.InformationalVersion;

    /// <summary>Runs.</summary>
    /// <exception cref="DataRefusedException">The feed was refused, or there is nothing in the span.</exception>
    /// <exception cref="NotStoredException">There are no runs of the kind, or no such book.</exception>
    public Task<BacktestReport> RunAsync(BacktestRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) =>
        Task.Run(() => Run(request, progress, cancellationToken), cancellationToken);

    private BacktestReport Run(BacktestRequest request, IProgress<WorkProgress> progress, CancellationToken cancellation)
    {
        using var store = RiskStore.Open(request.Workspace.StoreFile);
        refresh.Into(store, request.Workspace, progress, cancellation);
        var reader = new SnapshotReader(store);
        var work = Work.Open(request, store, reader, progress, cancellation);
        var evidence = request.Kind == BacktestKind.WalkForward ? Walked(work) : Counted(work);
        progress.Report(new("report", 0));
        var written = EvidenceDocuments.Write(evidence, request.Workspace.OutFolder, request.Configuration.Signing?.In(request.Workspace.ConfigFolder));
        return new(evidence, written.Folder, written.Paths, written.Json);
    }

    private sealed record Work(
        BacktestRequest Request, RiskStore Store, SnapshotReader Reader, BookTree Tree, IReadOnlyList<DateOnly> Dates, IReadOnlyList<Confidence> Confidences, IProgress<WorkProgress> Progress, CancellationToken Cancellation)
    {
        public RunSettings Settings => Request.Configuration.Run;

        public int Threads => Request.Threads ?? Environment.ProcessorCount;

        /// <summary>The span of days that the request asks for.</summary>
        public static Work Open(BacktestRequest request, RiskStore store, SnapshotReader reader, IProgress<WorkProgress> progress, CancellationToken cancellation)
        {
            var settings = request.Configuration.Run;
            if (reader.ObservationDates.Count == 0 || reader.PositionDates.Count == 0) throw new DataRefusedException("There are no observations or no positions in the store, so there is nothing to hold figures against.");
            var newest = reader.TakeSpan(reader.ObservationDates[0], reader.ObservationDates[^1], settings, []);
            var (tree, _) = BookTree.Build(newest.Books);
            if (tree is null) throw new DataRefusedException("The books form no tree; `measure` says why.");
            if (request.Book is { } book && tree.IndexOf(book) < 0) throw new NotStoredException($"There is no book '{book}'; there are {string.Join(", ", tree.Books.Select(b => b.Name))}.");
            // A run has the VaR that it was asked for; a walk-forward finds VaR and expected shortfall at every confidence.
            var confidences = ExceptionCount.ConfidencesOf(request.Kind == BacktestKind.WalkForward ? settings.Measures.Where(m => m.Kind != MeasureKind.Les).Select(m => m with { Kind = MeasureKind.Var }) : settings.Measures);
            if (confidences.Length == 0) throw new NotStoredException("The settings ask for no VaR over one day, so there is nothing to hold a day's profit against.");
            var days = BacktestDays.Of(newest.Observations).Skip(1).Where(d => !(d > request.To)).ToList();
            List<DateOnly> dates = request.From is { } from ? [.. days.Where(d => d >= from)] : [.. days.TakeLast(UsualDays)];
            if (dates.Count == 0) throw new DataRefusedException($"There is no day with observations from {request.From:yyyy-MM-dd} to {request.To:yyyy-MM-dd} in the store.");
            return new(request, store, reader, tree, dates, confidences, progress, cancellation);
        }
    }

    private BacktestEvidence Walked(Work work)
    {
        var span = work.Reader.TakeSpan(work.Dates[0], work.Dates[^1], work.Settings, []);
        var walk = new WalkForward(work.Store, work.Reader, span, work.Tree, work.Threads);
        var forecasts = walk.Days(work.Dates, work.Request.Positions, work.Confidences, work.Progress, work.Cancellation);
        if (forecasts.Count == 0) throw new DataRefusedException($"No day from {work.Dates[0]:yyyy-MM-dd} to {work.Dates[^1]:yyyy-MM-dd} has positions and {work.Settings.Checks.MinimumHistory} complete days of history before it.");
        var byDate = forecasts.ToDictionary(f => f.ProfitDate, f => f.Books.ToDictionary(b => b.Book, b => b.Factors, StringComparer.Ordinal));
        var evidence = new EvidenceSpan(span, work.Tree, work.Dates[0], forecasts, work.Request.Positions);
        return Evidence(work, evidence, span.Hash.Root, (date, book) => byDate.TryGetValue(date, out var books) ? books.GetValueOrDefault(book) ?? [] : []) with
        {
            Positions = work.Request.Positions,
            Scenarios = forecasts.Select(f => f.Scenarios).Distinct().Count() == 1 ? forecasts[0].Scenarios : null,
        };
    }

    private BacktestEvidence Counted(Work work)
    {
        var kind = work.Request.Kind == BacktestKind.Recorded ? EvidenceKind.Recorded : EvidenceKind.Backfilled;
        var counted = work.Store.Runs.CountedOf(work.Settings.Model.Name, kind).Where(r => r.AsOf < work.Dates[^1]).ToList();
        if (counted.Count == 0)
        {
            throw new NotStoredException($"There is no {(kind == EvidenceKind.Recorded ? "recorded" : "backfilled")} run of model '{work.Settings.Model.Name}' before {work.Dates[^1]:yyyy-MM-dd}. "
                + "`measure` records one a day; `measure --from --to` fills past dates, which `--kind backfilled` takes; `--kind walk-forward` needs none.");
        }
        var span = work.Reader.TakeSpan(work.Dates[0], work.Dates[^1], work.Settings, counted);
        var days = BacktestDays.Of(span.Observations);
        var forecasts = new List<DayForecast>();
        for (var i = 0; i < counted.Count; i++)
        {
            work.Cancellation.ThrowIfCancellationRequested();
            var at = Array.BinarySearch(days, counted[i].AsOf);
            if (at < 0 || at + 1 >= days.Length || days[at + 1] < work.Dates[0]) continue;
            work.Progress.Report(new("read runs", (double)i / counted.Count, $"{counted[i].AsOf:yyyy-MM-dd}"));
            if (work.Store.Runs.Find(counted[i].Run) is { } stored) forecasts.Add(RecordedForecasts.Of(counted[i].AsOf, days[at + 1], stored.Record.Results));
        }
        var evidence = new EvidenceSpan(span, work.Tree, work.Dates[0], forecasts, null);
        var inputs = SnapshotHash.OfText(string.Concat(counted.Select(r => $"{r.AsOf:yyyy-MM-dd} {r.Hash}\n")));
        var factors = new RunFactors(work.Reader, span, work.Tree, work.Confidences, work.Cancellation);
        return Evidence(work, evidence, inputs, factors.Of) with
        {
            Scenarios = forecasts.Select(f => f.Scenarios).Distinct().Count() == 1 ? forecasts[0].Scenarios : null,
            Models = evidence.Challengers(work.Confidences),
            Runs = [.. counted.Select(r => new EvidenceRun(r.AsOf, r.Run, r.Hash, r.Evidence))],
        };
    }

    private BacktestEvidence Evidence(Work work, EvidenceSpan evidence, string inputs, Func<DateOnly, string, IReadOnlyList<FactorAmount>> factorsOf)
    {
        work.Progress.Report(new("test", 0));
        var series = evidence.Series(work.Confidences).Where(s => work.Request.Book is not { } book || s.Book == book).ToList();
        return new()
        {
            Kind = work.Request.Kind,
            From = work.Dates[0],
            To = work.Dates[^1],
            Firm = new(work.Tree.Books[0].DisplayName, work.Tree.ReportingCurrency),
            Model = work.Settings.Model,
            Series = series,
            Exceptions = evidence.Register(series, work.Store.Explanations.All(), factorsOf),
            Inputs = inputs,
            Command = Options.ShellText.Of(work.Request.Command),
            Made = clock.GetUtcNow(),
            Version = s_version,
            Epoch = NumericsEpoch.Current,
        };
    }
}
