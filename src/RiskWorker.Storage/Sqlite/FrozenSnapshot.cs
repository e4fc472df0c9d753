using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>A snapshot with the text of its parts: what <see cref="RunJournal.Append"/> keeps beside the run, so that it can be computed again.</summary>
public sealed class FrozenSnapshot
{
    internal FrozenSnapshot(Snapshot snapshot, IReadOnlyList<SnapshotLeaf> leaves) => (Snapshot, Leaves) = (snapshot, leaves);

    /// <summary>What the run reads.</summary>
    public Snapshot Snapshot { get; }

    internal IReadOnlyList<SnapshotLeaf> Leaves { get; }
}
