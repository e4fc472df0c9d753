namespace RiskWorker.Domain.Runs;

/// <summary>What a finding does to a run.</summary>
public enum FindingSeverity
{
    /// <summary>The run goes on and is marked degraded.</summary>
    Warning,

    /// <summary>The run stops with a failed report.</summary>
    Blocking,
}

/// <summary>What a check found: one per code and file or book.</summary>
/// <param name="Severity">What it does to the run.</param>
/// <param name="Code">Stable code of the check.</param>
/// <param name="Subject">The file or book that it is about.</param>
/// <param name="Message">A sentence: what, how often, the first ten names, how to mend it.</param>
public sealed record Finding(FindingSeverity Severity, string Code, string Subject, string Message);
