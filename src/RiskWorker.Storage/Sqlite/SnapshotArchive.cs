using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The frozen snapshots of the stored runs: every part once, by its hash, however many runs read it.</summary>
public sealed class SnapshotArchive
{
    private readonly RiskStore _store;
    private readonly Lock _gate = new();
    private readonly Dictionary<string, long> _known = new(StringComparer.Ordinal);
    private long _last;

    internal SnapshotArchive(RiskStore store) => _store = store;

    /// <summary>Reads what the run of <paramref name="record"/> read, and holds every part of it against its hash.</summary>
    public ArchivedSnapshot Read(RunRecord record)
    {
        ArgumentNullException.ThrowIfNull(record);
        return _store.Read(connection => Read(connection, record));
    }

    /// <summary>Keeps a snapshot in the transaction that is open; what is kept already costs a look.</summary>
    internal void Keep(SqliteConnection connection, FrozenSnapshot frozen)
    {
        var root = frozen.Snapshot.Hash.Root;
        if (connection.Scalar("SELECT 1 FROM snapshot WHERE root = ?1", root) is not null) return;
        lock (_gate)
        {
            Follow(connection);
            // Remembered only once they are read back: this transaction may yet be undone.
            var added = new Dictionary<string, long>(StringComparer.Ordinal);
            using var insert = new Statement(connection, "INSERT INTO snapshot_part (hash, content) VALUES (?1, ?2) RETURNING id", 2);
            var unknown = frozen.Leaves.Where(l => !_known.ContainsKey(l.Part.Hash)).DistinctBy(l => l.Part.Hash).ToList();
            foreach (var (hash, content) in unknown.AsParallel().AsOrdered().Select(l => (l.Part.Hash, Content: Zlib.Pack(l.Text))))
                added[hash] = (long)insert.Set(0, hash).Set(1, content).Scalar()!;
            var parts = frozen.Leaves.Select(l => (l.Part.Path, _known.TryGetValue(l.Part.Hash, out var id) ? id : added[l.Part.Hash]));
            connection.Run("INSERT INTO snapshot (root, parts) VALUES (?1, ?2)", root, PartList.Pack(parts));
        }
    }

    private void Follow(SqliteConnection connection)
    {
        foreach (var (id, hash) in connection.Query("SELECT id, hash FROM snapshot_part WHERE id > ?1 ORDER BY id", r => (r.GetInt64(0), r.GetString(1)), _last))
            (_known[hash], _last) = (id, id);
    }

    private static ArchivedSnapshot Read(SqliteConnection connection, RunRecord record)
    {
        var packed = connection.Query("SELECT parts FROM snapshot WHERE root = ?1", r => r.GetFieldValue<byte[]>(0), record.Snapshot);
        if (packed.Count == 0) return new(0, ["Its list of parts is not in the store."], null);
        List<(string Path, long Part)> list;
        try
        {
            list = PartList.Unpack(packed[0]);
        }
        catch (InvalidDataException)
        {
            return new(0, ["Its list of parts was altered: it cannot be read."], null);
        }
        var (leaves, faults) = Leaves(connection, list);
        if (faults.Count > 0) return new(list.Count, faults, null);
        return Restored(connection, record, leaves);
    }

    private static (List<SnapshotLeaf> Leaves, List<string> Faults) Leaves(SqliteConnection connection, List<(string Path, long Part)> list)
    {
        var (leaves, faults) = (new List<SnapshotLeaf>(list.Count), new List<string>());
        using var select = new Statement(connection, "SELECT hash, content FROM snapshot_part WHERE id = ?1", 1);
        foreach (var (path, id) in list)
        {
            var found = select.Set(0, id).Rows(r => (Hash: r.GetString(0), Content: r.GetFieldValue<byte[]>(1))).ToList();
            if (found.Count == 0) faults.Add($"The part {path} is gone.");
            else if (TextOf(found[0].Content) is not { } text) faults.Add($"The part {path} was altered: it cannot be read.");
            else if (SnapshotHash.OfBytes(text) is var hash && hash != found[0].Hash) faults.Add($"The part {path} was altered: it hashes to {hash}, not to {found[0].Hash}.");
            else leaves.Add(new(new(path, hash), text));
        }
        return (leaves, faults);
    }

    private static ArchivedSnapshot Restored(SqliteConnection connection, RunRecord record, List<SnapshotLeaf> leaves)
    {
        leaves = [.. leaves.DistinctBy(l => l.Part.Path)];
        var hash = SnapshotHash.Of(leaves.Select(l => l.Part));
        var (kept, recorded) = (hash.Files.ToDictionary(f => f.Path, f => f.Hash, StringComparer.Ordinal), record.Parts.ToDictionary(p => p.Path, p => p.Hash, StringComparer.Ordinal));
        var faults = kept.Keys.Union(recorded.Keys).Where(path => kept.GetValueOrDefault(path) != recorded.GetValueOrDefault(path)).Order(StringComparer.Ordinal)
            .Select(path => $"The parts of {path} hash to {kept.GetValueOrDefault(path) ?? "nothing"}, and the record says {recorded.GetValueOrDefault(path) ?? "nothing"}.").ToList();
        if (faults.Count == 0 && hash.Root != record.Snapshot) faults.Add($"The parts hash to {hash.Root}, and the record says {record.Snapshot}.");
        if (faults.Count > 0) return new(leaves.Count, faults, null);
        try
        {
            return new(leaves.Count, [], SnapshotRestoration.Of(connection, leaves, hash));
        }
        catch (InvalidDataException error)
        {
            return new(leaves.Count, [error.Message], null);
        }
    }

    private static byte[]? TextOf(byte[] content)
    {
        try
        {
            return Zlib.Unpack(content);
        }
        catch (InvalidDataException)
        {
            return null;
        }
    }
}

/// <summary>What is kept of a run's inputs.</summary>
/// <param name="Parts">Parts on its list.</param>
/// <param name="Faults">What is gone or altered, a sentence each, by path.</param>
/// <param name="Snapshot">The inputs, every part hashed again; null where there is a fault.</param>
public sealed record ArchivedSnapshot(int Parts, IReadOnlyList<string> Faults, Snapshot? Snapshot);
