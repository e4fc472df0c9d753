using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Numerics;
using RiskWorker.Storage.Sqlite;

namespace RiskWorker.Host.UseCases;

/// <summary>
/// Answers whether a stored run is still what it was: chain, record, frozen inputs and written files are held against their hashes, and the run is
/// computed again from the frozen inputs and compared bit for bit.
/// </summary>
public sealed class VerifyRun
{
    private readonly RiskStore _store;
    private readonly VerifyRequest _request;
    private readonly IProgress<WorkProgress> _progress;
    private readonly CancellationToken _cancellation;
    private readonly List<VerifyCheck> _checks = [];
    private IReadOnlyList<ValueDifference> _differences = [];

    private VerifyRun(RiskStore store, VerifyRequest request, IProgress<WorkProgress> progress, CancellationToken cancellation) =>
        (_store, _request, _progress, _cancellation) = (store, request, progress, cancellation);

    /// <summary>Verifies one run; nothing is written.</summary>
    /// <exception cref="NotStoredException">There is no store, or neither it nor its chain knows the run.</exception>
    public static Task<VerifyReport> RunAsync(VerifyRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken) => Task.Run(() =>
    {
        using var store = StoredRuns.Open(request.Workspace);
        return new VerifyRun(store, request, progress, cancellationToken).Run();
    }, cancellationToken);

    private VerifyReport Run()
    {
        var run = (_request.Run.Length > 0 ? _store.Runs.Identify(_request.Run) : null) ?? throw new NotStoredException($"There is no run '{_request.Run}' in the store; 'riskworker runs' lists those there are.");
        Add(VerifiedThing.Chain, _store.Runs.FirstBreak(new ChainProgress(_progress), _cancellation), "Every entry follows the one before it, and vouches for what is stored.");
        var (record, fault) = _store.Runs.Audit(run);
        Add(VerifiedThing.Record, fault, "It hashes to what its entry of the chain vouches for.");
        if (record is null)
        {
            foreach (var thing in new[] { VerifiedThing.Snapshot, VerifiedThing.Documents, VerifiedThing.Figures }) Skip(thing, "There is no record to hold it against.");
        }
        else
        {
            var snapshot = CheckSnapshot(record);
            CheckDocuments(record);
            if (snapshot is null) Skip(VerifiedThing.Figures, "The inputs are not whole, so the run cannot be computed again.");
            else CheckFigures(record, snapshot);
        }
        return new() { Run = run, Record = record, Epoch = NumericsEpoch.Current, Checks = _checks, Differences = _differences };
    }

    private Snapshot? CheckSnapshot(RunRecord record)
    {
        _progress.Report(new("snapshot", 0));
        var archived = _store.Snapshots.Read(record);
        Add(VerifiedThing.Snapshot, archived.Faults, $"{archived.Parts:N0} parts hash to what the record says.");
        return archived.Snapshot;
    }

    private void CheckDocuments(RunRecord record)
    {
        _progress.Report(new("documents", 0));
        var documents = _store.Runs.DocumentsOf(record.Run);
        var folder = RunDocuments.FolderOf(record, _request.Workspace.OutFolder);
        Add(VerifiedThing.Documents, [.. documents.Select(d => FaultOf(d, folder)).OfType<string>()],
            documents.Count == 0 ? "None were written." : $"{string.Join(", ", documents.Select(d => d.Name))} are as written.");
    }

    private static string? FaultOf(DocumentHash document, string folder)
    {
        var file = Path.Combine(folder, document.Name);
        if (!File.Exists(file)) return $"{document.Name} is missing from {folder}.";
        var hash = SnapshotHash.OfBytes(File.ReadAllBytes(file));
        return hash == document.Sha256 ? null : $"{document.Name} was altered: it hashes to {hash}, and the chain vouches for {document.Sha256}.";
    }

    private void CheckFigures(RunRecord record, Snapshot snapshot)
    {
        var results = new RunCalculator(snapshot, _request.Threads ?? Environment.ProcessorCount, new SimulationProgress(_progress), _cancellation).Calculate();
        var comparison = ResultsComparison.Of(RunDocuments.JsonOf(record), RunDocuments.JsonOf(Repeated(record, snapshot, results)));
        _differences = comparison.Differences;
        var (others, equal) = (record.Epoch != NumericsEpoch.Current, _differences.Count == 0);
        var outcome = equal ? VerifyOutcome.Equal : others ? VerifyOutcome.OtherEpoch : VerifyOutcome.Different;
        List<string> findings = [equal ? $"{comparison.Values:N0} values, computed again, are equal to the last bit." : $"{_differences.Count:N0} of {comparison.Values:N0} values differ."];
        if (others) findings.Add($"The run is of numerics epoch {record.Epoch}, this program of {NumericsEpoch.Current}: bits moved in between, so differences are no sign of tampering.");
        if (!equal) findings.Add(First(_differences[0]));
        if (others && _differences.Max(d => d.Relative) is { } largest) findings.Add($"The largest difference is {largest:0.0e+00} of its value.");
        _checks.Add(new(VerifiedThing.Figures, outcome, findings));
    }

    private static string First(ValueDifference difference) =>
        $"The first: {difference.Path}: recorded {Value(difference.Recorded, difference.RecordedBits)}, computed {Value(difference.Computed, difference.ComputedBits)}.";

    private static string Value(string? text, string? bits) => text is null ? "nothing" : bits is null ? text : $"{text} (bits {bits})";

    /// <summary>The record as the same run would have left it today; identity, times and what else no snapshot decides are the record's own.</summary>
    private static RunRecord Repeated(RunRecord record, Snapshot snapshot, RunResults results)
    {
        // The record of a backfilled run keeps counts without the days behind them, and no sensitivities; nor does one of a version that had none.
        var kept = record.Results.Backtest.Where(b => b.Days > 0 && b.Series.Count == 0).Select(b => (b.Book, b.Confidence)).ToHashSet();
        var repeated = RunRecords.Of(snapshot, results with
        {
            Backtest = [.. results.Backtest.Select(b => kept.Contains((b.Book, b.Confidence)) ? RunRecords.CountsAlone(b) : b)],
            Effects = record.Results.Effects is null ? null : results.Effects,
            Sensitivities = record.Results.Sensitivities.Count > 0 ? results.Sensitivities : [],
        }, record.Previous);
        return repeated with
        {
            Results = repeated.Results with { Methods = record.Results.Methods }, // words of the version that wrote them
            Run = record.Run,
            Attempt = record.Attempt,
            Evidence = record.Evidence,
            Started = record.Started,
            Finished = record.Finished,
            Version = record.Version,
            Epoch = record.Epoch,
            Command = record.Command,
            Timings = record.Timings,
        };
    }

    private void Add(VerifiedThing thing, string? fault, string whole) => Add(thing, fault is null ? [] : [fault], whole);

    private void Add(VerifiedThing thing, IReadOnlyList<string> faults, string whole) =>
        _checks.Add(faults.Count > 0 ? new(thing, VerifyOutcome.Different, faults) : new(thing, VerifyOutcome.Equal, [whole]));

    private void Skip(VerifiedThing thing, string reason) => _checks.Add(new(thing, VerifyOutcome.NotChecked, [reason]));

    private sealed class ChainProgress(IProgress<WorkProgress> progress) : IProgress<double>
    {
        public void Report(double value) => progress.Report(new("chain", value));
    }
}
