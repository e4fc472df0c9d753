using RiskWorker.Domain.Runs;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.UseCases;

/// <summary>Asks for one run, or for a span of past dates.</summary>
public sealed record MeasureRequest
{
    /// <summary>Where to work.</summary>
    public required Workspace Workspace { get; init; }

    /// <summary>The settings, overrides of the command line applied.</summary>
    public required Configuration Configuration { get; init; }

    /// <summary>The words of a command that runs it, up to the options that pin one run: the record adds date, scenarios, seed and model.</summary>
    public required IReadOnlyList<string> Command { get; init; }

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
