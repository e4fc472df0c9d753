using RiskWorker.Domain.Evidence;
using RiskWorker.Host.Options;

namespace RiskWorker.Host.UseCases;

/// <summary>Asks for evidence over a span of days.</summary>
public sealed record BacktestRequest
{
    /// <summary>Where to work.</summary>
    public required Workspace Workspace { get; init; }

    /// <summary>The settings, overrides of the command line applied.</summary>
    public required Configuration Configuration { get; init; }

    /// <summary>The words of the command that makes it again.</summary>
    public required IReadOnlyList<string> Command { get; init; }

    /// <summary>Where the figures come from.</summary>
    public required BacktestKind Kind { get; init; }

    /// <summary>Positions of a walk-forward.</summary>
    public BacktestPositions Positions { get; init; }

    /// <summary>First day of profit; null for the last 500 days.</summary>
    public DateOnly? From { get; init; }

    /// <summary>Last day of profit; null for the newest.</summary>
    public DateOnly? To { get; init; }

    /// <summary>One book alone; null for all.</summary>
    public string? Book { get; init; }

    /// <summary>Threads to use; null for one a core.</summary>
    public int? Threads { get; init; }
}

/// <summary>Evidence and its documents.</summary>
/// <param name="Evidence">The evidence.</param>
/// <param name="Folder">Where the documents are.</param>
/// <param name="Documents">Their paths.</param>
/// <param name="Json">The text of <c>backtest.json</c>.</param>
public sealed record BacktestReport(BacktestEvidence Evidence, string Folder, IReadOnlyList<string> Documents, string Json);

/// <summary>An explanation to be kept.</summary>
/// <param name="Workspace">Where to work.</param>
/// <param name="Date">Date of the profit.</param>
/// <param name="Book">The book.</param>
/// <param name="Cause">What it is put down to.</param>
/// <param name="Text">In words.</param>
/// <param name="Author">Who writes it.</param>
public sealed record ExplainRequest(Workspace Workspace, DateOnly Date, string Book, ExceptionCause Cause, string Text, string Author);
