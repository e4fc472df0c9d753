using System.Text.Json;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>Holds the stored runs against the chain: every record, every document list, and every column kept beside a record.</summary>
/// <remarks>A chain cut at its end together with everything it vouched for looks whole: the printed heads of later documents show it.</remarks>
internal static class RunAudit
{
    public const string ChainColumns = "sequence, kind, run, content, previous, hash";

    public static List<ChainEntry> Chain(SqliteConnection connection) => connection.Query($"SELECT {ChainColumns} FROM chain ORDER BY sequence", Entry);

    // A kind that is none of ours was put there by somebody: it must break the chain, not the reading of it.
    public static ChainEntry Entry(SqliteDataReader row) =>
        new(row.GetInt64(0), Spelling.Of<ChainEntryKind>().GetValueOrDefault(row.GetString(1), (ChainEntryKind)(-1)), row.GetString(2), row.GetString(3), row.GetString(4), row.GetString(5));

    public static string? FirstBreak(SqliteConnection connection, IProgress<double>? progress, CancellationToken cancellation)
    {
        var chain = Chain(connection);
        if (RunChain.FirstBreak(chain) is { } broken) return broken;
        for (var i = 0; i < chain.Count; i++)
        {
            cancellation.ThrowIfCancellationRequested();
            progress?.Report((double)i / chain.Count);
            var entry = chain[i];
            var fault = entry.Kind == ChainEntryKind.Results ? FaultOfRun(connection, entry) : FaultOfDocuments(connection, entry);
            if (fault is not null) return fault;
        }
        return connection.Query(
            """
            SELECT 'The results of run ' || run FROM run WHERE run NOT IN (SELECT run FROM chain WHERE kind = 'results')
            UNION ALL
            SELECT 'The document ' || name FROM document WHERE entry NOT IN (SELECT sequence FROM chain WHERE kind = 'documents')
            LIMIT 1
            """,
            row => row.GetString(0) + " is stored without an entry in the chain: the entry was removed.").FirstOrDefault();
    }

    /// <summary>One run: its record, where it can be read, and what is wrong with it.</summary>
    public static AuditedRun Of(SqliteConnection connection, string run)
    {
        var entry = connection.Query($"SELECT {ChainColumns} FROM chain WHERE run = ?1 AND kind = 'results' ORDER BY sequence", Entry, run).FirstOrDefault();
        var fault = entry is null ? $"The results of run {run} are stored without an entry in the chain: the entry was removed." : FaultOfRun(connection, entry);
        var packed = connection.Query("SELECT record FROM run WHERE run = ?1", row => row.GetFieldValue<byte[]>(0), run);
        return new(packed.Count == 0 ? null : Readable(packed[0]), fault);
    }

    private static RunRecord? Readable(byte[] packed)
    {
        try
        {
            return RecordJson.Read(Zlib.Unpack(packed));
        }
        catch (Exception error) when (error is InvalidDataException or JsonException)
        {
            return null;
        }
    }

    private static string? FaultOfRun(SqliteConnection connection, ChainEntry entry)
    {
        var found = connection.Query($"SELECT {RunRows.Columns}, record FROM run WHERE run = ?1", row =>
        {
            var cells = new object[row.FieldCount];
            row.GetValues(cells);
            return cells;
        }, entry.Run);
        if (found.Count == 0) return $"The record of run {entry.Run} is missing: the chain vouches for it in entry {entry.Sequence}.";
        byte[] json;
        try
        {
            json = Zlib.Unpack((byte[])found[0][^1]);
        }
        catch (InvalidDataException)
        {
            return Altered(entry);
        }
        if (SnapshotHash.OfBytes(json) != entry.Content) return Altered(entry);
        var expected = RunRows.Of(RecordJson.Read(json), entry.Content);
        var columns = found[0].AsSpan(0, expected.Run.Count).ToArray().Select(c => c is DBNull ? null : c);
        var whole = columns.SequenceEqual(expected.Run)
            && RunRows.StoredVars(connection, entry.Run).SequenceEqual(expected.Vars) && RunRows.StoredChallengers(connection, entry.Run).SequenceEqual(expected.Challengers)
            && RunRows.StoredProfit(connection, entry.Run).SequenceEqual(expected.Profit);
        return whole ? null : $"What is kept beside the record of run {entry.Run} differs from the record: it was altered.";
    }

    private static string? FaultOfDocuments(SqliteConnection connection, ChainEntry entry)
    {
        var documents = connection.Query("SELECT name, sha256 FROM document WHERE entry = ?1", r => new DocumentHash(r.GetString(0), r.GetString(1)), entry.Sequence);
        return RunJournal.ContentOf(documents) == entry.Content ? null : $"The document hashes of run {entry.Run} differ from what entry {entry.Sequence} of the chain vouches for: they were altered.";
    }

    private static string Altered(ChainEntry entry) => $"The record of run {entry.Run} was altered: its hash is not the one in entry {entry.Sequence} of the chain.";
}
