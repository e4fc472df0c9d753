using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.UseCases;

/// <summary>How a verb ends, as the process's exit code.</summary>
public enum ExitCode
{
    /// <summary>Done.</summary>
    Done = 0,

    /// <summary>Done, and a limit is breached.</summary>
    Breach = 1,

    /// <summary>Stopped by a blocking finding, or a file of the feed was refused.</summary>
    Blocked = 2,

    /// <summary>The settings or the command line cannot be used.</summary>
    Usage = 3,

    /// <summary>Internal failure, or cancelled.</summary>
    Failure = 4,

    /// <summary>A stored run computed again differs.</summary>
    Difference = 5,

    /// <summary>Done, and a limit is undecided at the cap.</summary>
    Undecided = 6,
}

/// <summary>How far a piece of work has come.</summary>
/// <param name="Phase">What is being done, in a word or two.</param>
/// <param name="Fraction">Share of the phase that is done, from 0 to 1.</param>
/// <param name="Detail">What is worth adding, or null.</param>
public readonly record struct WorkProgress(string Phase, double Fraction, string? Detail = null);

/// <summary>One use case: a request in, a report out.</summary>
public delegate Task<TReport> UseCase<in TRequest, TReport>(TRequest request, IProgress<WorkProgress> progress, CancellationToken cancellationToken);

/// <summary>The folders that a verb works on, as absolute paths.</summary>
/// <param name="ConfigFolder">Holds <c>riskworker.json</c> and <c>feed/</c>.</param>
/// <param name="OutFolder">Holds the store and the reports.</param>
/// <param name="StoreFile">The store's file, below <paramref name="OutFolder"/>.</param>
public sealed record Workspace(string ConfigFolder, string OutFolder, string StoreFile)
{
    /// <summary>The feed of the settings' folder.</summary>
    public string FeedFolder => Path.Combine(ConfigFolder, "feed");
}

/// <summary>Data that cannot be used: a refused file of the feed, or nothing to run on. Ends in exit code 2.</summary>
/// <param name="message">All that a person needs to mend it; may have several lines.</param>
public sealed class DataRefusedException(string message) : Exception(message);

/// <summary>Asks for a run or date that is not there. Ends in exit code 3.</summary>
/// <param name="message">What was asked for and what there is.</param>
public sealed class NotStoredException(string message) : Exception(message);

/// <summary>Loads the feed.</summary>
public sealed record LoadRequest(Workspace Workspace);

/// <summary>What loading did.</summary>
/// <param name="Files">Every file read, in order.</param>
/// <param name="Warnings">Unknown columns, ignored terms and the like.</param>
public sealed record LoadReport(IReadOnlyList<LoadedFile> Files, IReadOnlyList<Finding> Warnings);

/// <summary>One file of the feed.</summary>
/// <param name="File">Its name.</param>
/// <param name="Rows">Its rows.</param>
/// <param name="IsNew">False where the store held the same content already.</param>
public sealed record LoadedFile(string File, long Rows, bool IsNew);

/// <summary>Asks for one run, or for a span of past dates.</summary>
public sealed record MeasureRequest
{
    /// <summary>Where to work.</summary>
    public required Workspace Workspace { get; init; }

    /// <summary>The settings, overrides of the command line applied.</summary>
    public required Configuration Configuration { get; init; }

    /// <summary>The command that asks for it, as the record prints it.</summary>
    public required string CommandLine { get; init; }

    /// <summary>As-of date; null for the newest with positions.</summary>
    public DateOnly? AsOf { get; init; }

    /// <summary>First date of a span to backfill; null for none. Set together with <see cref="To"/>.</summary>
    public DateOnly? From { get; init; }

    /// <summary>Last date of a span to backfill, itself included.</summary>
    public DateOnly? To { get; init; }

    /// <summary>Threads to use; null for one a core.</summary>
    public int? Threads { get; init; }
}

/// <summary>A stored run and its documents.</summary>
public sealed record MeasureReport
{
    /// <summary>The run; of a span, the last one.</summary>
    public required RunRecord Record { get; init; }

    /// <summary>Folder of its documents, or null where none were written.</summary>
    public required string? Folder { get; init; }

    /// <summary>Paths of its documents.</summary>
    public required IReadOnlyList<string> Documents { get; init; }

    /// <summary>The text of its <c>results.json</c>.</summary>
    public required string Json { get; init; }

    /// <summary>How it ended.</summary>
    public required ExitCode ExitCode { get; init; }

    /// <summary>Past dates that were filled.</summary>
    public int Backfilled { get; init; }
}

/// <summary>Asks for the list of stored runs.</summary>
public sealed record ListRunsRequest(Workspace Workspace);

/// <summary>A stored run in a line.</summary>
public sealed record RunSummary(
    string Run, DateOnly AsOf, RunStatus Status, EvidenceKind Evidence, string Model, int? Scenarios, ulong Seed, DateTimeOffset Finished, int Breached);

/// <summary>Asks for one stored run.</summary>
/// <param name="Workspace">Where it is stored.</param>
/// <param name="Run">Its id.</param>
/// <param name="Pdf">File to render its report to, as an absolute path; null for none.</param>
public sealed record ShowRunRequest(Workspace Workspace, string Run, string? Pdf);

/// <summary>A stored run.</summary>
/// <param name="Record">The record.</param>
/// <param name="Json">The text of its <c>results.json</c>.</param>
public sealed record ShowRunReport(RunRecord Record, string Json);

/// <summary>Asks for the holidays that schedules keep to: the feed's where it has a file of them, else the store's.</summary>
public sealed record HolidaysRequest(Workspace Workspace);

/// <summary>Records that a scheduled run was stopped before its end.</summary>
/// <param name="Workspace">Where to record it.</param>
/// <param name="Schedule">The schedule that asked for the run.</param>
/// <param name="ScheduledFor">When it was due, UTC.</param>
/// <param name="Started">When it began, UTC.</param>
/// <param name="Interrupted">When it was stopped, UTC.</param>
public sealed record InterruptedRun(Workspace Workspace, string Schedule, DateTimeOffset ScheduledFor, DateTimeOffset Started, DateTimeOffset Interrupted);

/// <summary>The use cases that verbs and jobs call.</summary>
public sealed record UseCaseSet
{
    /// <summary>Loads the feed into the store.</summary>
    public required UseCase<LoadRequest, LoadReport> Load { get; init; }

    /// <summary>Runs the measure.</summary>
    public required UseCase<MeasureRequest, MeasureReport> Measure { get; init; }

    /// <summary>Lists stored runs, newest first.</summary>
    public required UseCase<ListRunsRequest, IReadOnlyList<RunSummary>> ListRuns { get; init; }

    /// <summary>Shows one stored run.</summary>
    public required UseCase<ShowRunRequest, ShowRunReport> ShowRun { get; init; }

    /// <summary>Lists holidays.</summary>
    public required UseCase<HolidaysRequest, IReadOnlyList<Holiday>> Holidays { get; init; }

    /// <summary>Records an interrupted run; reports whether it was recorded.</summary>
    public required UseCase<InterruptedRun, bool> RecordInterrupted { get; init; }
}
