using RiskWorker.Domain.Runs;

namespace RiskWorker.Host.UseCases;

/// <summary>Asks whether a stored run is still what it was.</summary>
/// <param name="Workspace">Where it is stored.</param>
/// <param name="Run">Its id, or the beginning of it.</param>
/// <param name="Threads">Threads to compute it with; null for one a core.</param>
public sealed record VerifyRequest(Workspace Workspace, string Run, int? Threads);

/// <summary>What was held against what.</summary>
public enum VerifiedThing
{
    /// <summary>The chain of all runs, and what each entry of it vouches for.</summary>
    Chain,

    /// <summary>The run's record against its entry of the chain.</summary>
    Record,

    /// <summary>The run's frozen inputs against the hashes in its record.</summary>
    Snapshot,

    /// <summary>The files that were written against their hashes in the chain.</summary>
    Documents,

    /// <summary>The run computed again from its frozen inputs against the results in its record.</summary>
    Figures,
}

/// <summary>How a check ended.</summary>
public enum VerifyOutcome
{
    /// <summary>All is as recorded.</summary>
    Equal,

    /// <summary>Something is gone or altered, or a figure differs.</summary>
    Different,

    /// <summary>Figures differ, and the run is of another numerics epoch: that is expected.</summary>
    OtherEpoch,

    /// <summary>Not possible, since what it needs failed a check before.</summary>
    NotChecked,
}

/// <summary>One check.</summary>
/// <param name="Thing">What was held against what.</param>
/// <param name="Outcome">How it ended.</param>
/// <param name="Findings">What was found, a sentence each.</param>
public sealed record VerifyCheck(VerifiedThing Thing, VerifyOutcome Outcome, IReadOnlyList<string> Findings);

/// <summary>A value of <c>results.json</c> that the run computed again does not repeat.</summary>
/// <param name="Path">Where it stands, as in <c>nodes[FIRM].measures[var 0.99 1].value</c>.</param>
/// <param name="Recorded">What the record says, as JSON; null for nothing.</param>
/// <param name="Computed">What was computed, as JSON; null for nothing.</param>
public sealed record ValueDifference(string Path, string? Recorded, string? Computed)
{
    /// <summary>The 16 hex digits of the recorded number's bits; null where it is none.</summary>
    public string? RecordedBits => BitsOf(Recorded);

    /// <summary>The 16 hex digits of the computed number's bits; null where it is none.</summary>
    public string? ComputedBits => BitsOf(Computed);

    /// <summary>The difference of two numbers in units of the larger; null where one of them is none.</summary>
    public double? Relative => ResultsComparison.NumberOf(Recorded) is { } one && ResultsComparison.NumberOf(Computed) is { } other
        ? Math.Abs(one - other) / Math.Max(Math.Abs(one), Math.Abs(other)) : null;

    private static string? BitsOf(string? json) => ResultsComparison.NumberOf(json) is { } number ? $"{BitConverter.DoubleToUInt64Bits(number):x16}" : null;
}

/// <summary>What verifying a run found.</summary>
public sealed record VerifyReport
{
    /// <summary>The run's id.</summary>
    public required string Run { get; init; }

    /// <summary>Its record as it is stored; null where it is missing or cannot be read.</summary>
    public required RunRecord? Record { get; init; }

    /// <summary>The numerics epoch of this program.</summary>
    public required int Epoch { get; init; }

    /// <summary>The checks, in the order in which they were made.</summary>
    public required IReadOnlyList<VerifyCheck> Checks { get; init; }

    /// <summary>Values of the results that differ, in the order of <c>results.json</c>.</summary>
    public required IReadOnlyList<ValueDifference> Differences { get; init; }

    /// <summary>Done where nothing differs but what another epoch explains; else a difference.</summary>
    public ExitCode ExitCode => Checks.Any(c => c.Outcome == VerifyOutcome.Different) ? ExitCode.Difference : ExitCode.Done;
}
