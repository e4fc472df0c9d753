using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A stored run as lists show it.</summary>
/// <param name="Run">Its id.</param>
/// <param name="Attempt">1 for the first run of its inputs.</param>
/// <param name="AsOf">Its as-of date.</param>
/// <param name="Status">How it ended.</param>
/// <param name="Evidence">Recorded or backfilled.</param>
/// <param name="Model">Name of its model of record.</param>
/// <param name="Scenarios">Scenarios used; null in a failed run.</param>
/// <param name="Started">Start, UTC.</param>
/// <param name="Finished">End, UTC.</param>
/// <param name="Snapshot">Hash of its inputs.</param>
/// <param name="Figures">Hash of its figures.</param>
/// <param name="Head">Hash of its results entry in the chain: the head that its documents print.</param>
/// <param name="Seed">Seed of its draws.</param>
/// <param name="Breached">Limits that it found breached.</param>
public sealed record RunSummary(
    string Run, int Attempt, DateOnly AsOf, RunStatus Status, EvidenceKind Evidence, string Model, int? Scenarios,
    DateTimeOffset Started, DateTimeOffset Finished, string Snapshot, string Figures, string Head, ulong Seed, int Breached);

/// <summary>A stored run: its record, and the hash that its documents print.</summary>
/// <param name="Record">The record.</param>
/// <param name="Head">Hash of its results entry in the chain.</param>
public sealed record StoredRun(RunRecord Record, string Head);

/// <summary>A stored run held against the chain.</summary>
/// <param name="Record">Its record as it is stored, altered or not; null where it is missing or cannot be read.</param>
/// <param name="Fault">What is wrong with it, as a sentence; null where it is what the chain vouches for.</param>
public sealed record AuditedRun(RunRecord? Record, string? Fault);

/// <summary>A file rendered from a run.</summary>
/// <param name="Name">File name.</param>
/// <param name="Sha256">64 lower-case hex digits.</param>
public readonly record struct DocumentHash(string Name, string Sha256);
