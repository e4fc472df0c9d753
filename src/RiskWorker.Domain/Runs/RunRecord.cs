namespace RiskWorker.Domain.Runs;

/// <summary>
/// A run as it is kept for good: what went in (by hash), what came out, and all that its documents show.
/// Documents are rendered from this record alone.
/// </summary>
public sealed record RunRecord
{
    /// <summary>Id: derives from the inputs' hash and the attempt.</summary>
    public required string Run { get; init; }

    /// <summary>1 for the first run of these inputs, one more for each repetition.</summary>
    public required int Attempt { get; init; }

    /// <summary>The date that the figures are for.</summary>
    public required DateOnly AsOf { get; init; }

    /// <summary>How it ended.</summary>
    public required RunStatus Status { get; init; }

    /// <summary>Recorded before the next profit was known, or backfilled.</summary>
    public required EvidenceKind Evidence { get; init; }

    /// <summary>Start, UTC.</summary>
    public required DateTimeOffset Started { get; init; }

    /// <summary>End, UTC.</summary>
    public required DateTimeOffset Finished { get; init; }

    /// <summary>Version of the code.</summary>
    public required string Version { get; init; }

    /// <summary>Numerics epoch: raised by a change that moves bits.</summary>
    public required int Epoch { get; init; }

    /// <summary>Hash of the snapshot, as 64 hex digits.</summary>
    public required string Snapshot { get; init; }

    /// <summary>Hash of the settings that figures depend on.</summary>
    public required string SettingsHash { get; init; }

    /// <summary>Hash of each file of the snapshot.</summary>
    public required IReadOnlyList<SnapshotPart> Parts { get; init; }

    /// <summary>The command that runs it again.</summary>
    public required string Command { get; init; }

    /// <summary>The settings used.</summary>
    public required RunSettings Settings { get; init; }

    /// <summary>What was computed.</summary>
    public required RunResults Results { get; init; }

    /// <summary>Hash over the bits of nodes, limits and backtest.</summary>
    public required string Figures { get; init; }

    /// <summary>The run compared with, or null for the first.</summary>
    public PreviousRun? Previous { get; init; }

    /// <summary>Seconds by phase; not part of any hash.</summary>
    public Timings Timings { get; init; } = new(0, 0, 0, 0);
}

/// <summary>Seconds spent loading, calibrating, simulating (plan, draws, revaluation, reductions) and reporting.</summary>
public sealed record Timings(double Load, double Calibrate, double Simulate, double Report);
