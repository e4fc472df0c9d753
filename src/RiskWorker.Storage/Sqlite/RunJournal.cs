using System.Globalization;
using System.Text;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// The stored runs. Nothing here is ever changed or removed; each run is vouched for by an entry of the chain, and its documents by a later one.
/// </summary>
public sealed class RunJournal
{
    private const string SummaryColumns = "r.run, attempt, as_of, status, evidence, model, scenarios, started, finished, snapshot, figures, c.hash, seed, breached";
    private const string FromRuns = "FROM run r JOIN chain c ON c.run = r.run AND c.kind = 'results'";

    private readonly RiskStore _store;

    // A span of dates compares each run with the one before it, which need not be unpacked again.
    private volatile RunRecord? _newest;

    internal RunJournal(RiskStore store) => _store = store;

    /// <summary>Stores a run and chains it, in one transaction.</summary>
    /// <param name="record">The run.</param>
    /// <param name="inputs">What it read, to be kept with it; without it the run cannot be computed again later.</param>
    /// <returns>The head of the chain: the hash that the run's documents print.</returns>
    /// <exception cref="ArgumentException">The inputs are not those that the record names.</exception>
    /// <exception cref="StoreException">A run of this id, or of this attempt at the same inputs, is stored already; or the store cannot be written.</exception>
    public string Append(RunRecord record, FrozenSnapshot? inputs = null)
    {
        ArgumentNullException.ThrowIfNull(record);
        RequireInputsOf(record, inputs);
        var head = _store.Write(connection =>
        {
            if (connection.Scalar("SELECT run FROM run WHERE run = ?1 OR snapshot = ?2 AND attempt = ?3", record.Run, record.Snapshot, record.Attempt) is { } taken)
                throw new StoreException(StoreFault.Refused, $"The run {record.Run} (attempt {record.Attempt}) cannot be stored: run {taken} is stored already.");
            return Insert(connection, record, inputs);
        });
        _newest = record;
        return head;
    }

    /// <summary>
    /// Stores a run as the next attempt at its inputs. Number and id are given here, inside the transaction: another process may
    /// measure the same inputs at the same time.
    /// </summary>
    /// <param name="record">The run.</param>
    /// <param name="inputs">What it read, to be kept with it; without it the run cannot be computed again later.</param>
    /// <exception cref="ArgumentException">The inputs are not those that the record names.</exception>
    /// <exception cref="StoreException">The store cannot be written.</exception>
    public StoredRun AppendNext(RunRecord record, FrozenSnapshot? inputs = null)
    {
        ArgumentNullException.ThrowIfNull(record);
        RequireInputsOf(record, inputs);
        var stored = _store.Write(connection =>
        {
            var attempt = Convert.ToInt32(connection.Scalar("SELECT coalesce(max(attempt), 0) + 1 FROM run WHERE snapshot = ?1", record.Snapshot), CultureInfo.InvariantCulture);
            var next = record with { Run = RunIdentity.Of(record.Snapshot, attempt), Attempt = attempt };
            return new StoredRun(next, Insert(connection, next, inputs));
        });
        _newest = stored.Record;
        return stored;
    }

    /// <summary>Chains the hashes of the documents rendered from a stored run.</summary>
    /// <returns>The head of the chain.</returns>
    /// <exception cref="StoreException">The run is not stored, or the store cannot be written.</exception>
    public string AppendDocuments(string run, IReadOnlyList<DocumentHash> documents)
    {
        ArgumentNullException.ThrowIfNull(documents);
        return _store.Write(connection =>
        {
            if (connection.Scalar("SELECT 1 FROM run WHERE run = ?1", run) is null)
                throw new StoreException(StoreFault.Refused, $"The run {run} is not stored, so no document of it can be.");
            var entry = Chain(connection, ChainEntryKind.Documents, run, ContentOf(documents));
            foreach (var (name, sha256) in documents)
                connection.Run("INSERT INTO document (entry, name, sha256) VALUES (?1, ?2, ?3)", entry.Sequence, name, sha256);
            return entry.Hash;
        });
    }

    /// <summary>The run with this id, or the only one whose id begins so; null when there is none.</summary>
    /// <exception cref="StoreException">Several runs begin so, or the record is damaged.</exception>
    public StoredRun? Find(string runOrPrefix)
    {
        ArgumentException.ThrowIfNullOrEmpty(runOrPrefix);
        return _store.Read(connection =>
        {
            var matches = connection.Query($"SELECT r.run, r.record, c.hash {FromRuns} WHERE substr(r.run, 1, length(?1)) = ?1 ORDER BY r.run LIMIT 2",
                r => (Run: r.GetString(0), Packed: r.GetFieldValue<byte[]>(1), Head: r.GetString(2)), runOrPrefix);
            if (matches.Count > 1 && matches[0].Run != runOrPrefix) throw Ambiguous(runOrPrefix, matches[0].Run, matches[1].Run);
            return matches.Count == 0 ? null : new StoredRun(Unpacked(matches[0].Run, matches[0].Packed), matches[0].Head);
        });
    }

    /// <summary>The id of the run that the store or its chain knows by this id, or by the beginning of no other; null when there is none.</summary>
    /// <exception cref="StoreException">Several runs begin so.</exception>
    public string? Identify(string runOrPrefix)
    {
        ArgumentException.ThrowIfNullOrEmpty(runOrPrefix);
        var matches = _store.Read(connection => connection.Query(
            "SELECT run FROM (SELECT run FROM run UNION SELECT run FROM chain) WHERE substr(run, 1, length(?1)) = ?1 ORDER BY run LIMIT 2", r => r.GetString(0), runOrPrefix));
        if (matches.Count > 1 && matches[0] != runOrPrefix) throw Ambiguous(runOrPrefix, matches[0], matches[1]);
        return matches.FirstOrDefault();
    }

    /// <summary>A run's record as it is stored, altered or not, held against what the chain vouches for.</summary>
    public AuditedRun Audit(string run) => _store.Read(connection => RunAudit.Of(connection, run));

    /// <summary>All runs, in the order in which they were stored.</summary>
    public IReadOnlyList<RunSummary> List() => Summaries("ORDER BY r.sequence");

    /// <summary>The runs of the same inputs, by attempt.</summary>
    public IReadOnlyList<RunSummary> AttemptsOf(string snapshotHash) => Summaries("WHERE r.snapshot = ?1 ORDER BY r.attempt", snapshotHash);

    /// <summary>
    /// What a run at <paramref name="asOf"/> is compared with: of the runs of the model that did not fail, the newest of the latest earlier date;
    /// where there is none, the newest at the same date.
    /// </summary>
    public PreviousRun? PreviousRun(DateOnly asOf, string model) => _store.Read(connection =>
    {
        var found = connection.Query(
            "SELECT run FROM run WHERE model = ?1 AND status <> 'failed' AND as_of <= ?2 ORDER BY as_of = ?2, as_of DESC, sequence DESC LIMIT 1",
            r => r.GetString(0), model, Iso.Of(asOf));
        return found.Count == 0 ? null : Previous(RecordOf(connection, found[0]));
    });

    /// <summary>What is counted of the runs of <paramref name="model"/> of one kind, for each date the newest that did not fail, oldest date first.</summary>
    public IReadOnlyList<CountedRun> CountedOf(string model, EvidenceKind kind) => _store.Read(connection =>
    {
        var newest = new SortedDictionary<DateOnly, (string Run, string Content, DateOnly? ProfitFrom)>();
        foreach (var run in connection.Query(
            "SELECT run, as_of, content, profit_from FROM run WHERE model = ?1 AND evidence = ?2 AND status <> ?3 ORDER BY sequence",
            r => (Run: r.GetString(0), AsOf: Iso.Date(r.GetString(1)), Content: r.GetString(2), ProfitFrom: r.Text(3) is { } from ? Iso.Date(from) : (DateOnly?)null),
            model, Spelling.Of(kind), Spelling.Of(RunStatus.Failed)))
        {
            newest[run.AsOf] = (run.Run, run.Content, run.ProfitFrom);
        }
        return (IReadOnlyList<CountedRun>)[.. newest.Select(n => RunRows.Counted(connection, n.Value.Run, n.Value.Content, n.Key, kind, n.Value.ProfitFrom))];
    });

    /// <summary>The chain in stored order.</summary>
    public IReadOnlyList<ChainEntry> ReadChain() => _store.Use(RunAudit.Chain);

    /// <summary>The documents chained for a run, by name; of one rendered twice the newer.</summary>
    public IReadOnlyList<DocumentHash> DocumentsOf(string run) => _store.Use(connection => connection.Query(
        "SELECT name, sha256, max(entry) FROM document d JOIN chain c ON c.sequence = d.entry WHERE c.run = ?1 GROUP BY name ORDER BY name",
        r => new DocumentHash(r.GetString(0), r.GetString(1)), run));

    /// <summary>The first thing wrong with the chain, the records or what is kept beside them, as a sentence; null when all is whole.</summary>
    /// <param name="progress">Told the share of the entries that were held against what they vouch for, or null.</param>
    /// <param name="cancellation">Stops it.</param>
    public string? FirstBreak(IProgress<double>? progress = null, CancellationToken cancellation = default) =>
        _store.Read(connection => RunAudit.FirstBreak(connection, progress, cancellation));

    internal static string ContentOf(IEnumerable<DocumentHash> documents)
    {
        var text = new StringBuilder();
        foreach (var (name, sha256) in documents.OrderBy(d => d.Name, StringComparer.Ordinal)) text.Append(sha256).Append(' ').Append(name).Append('\n');
        return SnapshotHash.OfText(text.ToString());
    }

    private static void RequireInputsOf(RunRecord record, FrozenSnapshot? inputs)
    {
        if (inputs is not null && inputs.Snapshot.Hash.Root != record.Snapshot)
            throw new ArgumentException($"The inputs hash to {inputs.Snapshot.Hash.Root}, and the record names {record.Snapshot}.", nameof(inputs));
    }

    private string Insert(SqliteConnection connection, RunRecord record, FrozenSnapshot? inputs)
    {
        if (inputs is not null) _store.Snapshots.Keep(connection, inputs);
        var json = RecordJson.Write(record);
        var content = SnapshotHash.OfBytes(json);
        RunRows.Of(record, content).Insert(connection, Zlib.Pack(json));
        return Chain(connection, ChainEntryKind.Results, record.Run, content).Hash;
    }

    private static ChainEntry Chain(SqliteConnection connection, ChainEntryKind kind, string run, string content)
    {
        var last = connection.Query($"SELECT {RunAudit.ChainColumns} FROM chain ORDER BY sequence DESC LIMIT 1", RunAudit.Entry).SingleOrDefault();
        var entry = RunChain.Append(last, kind, run, content);
        connection.Run($"INSERT INTO chain ({RunAudit.ChainColumns}) VALUES (?1, ?2, ?3, ?4, ?5, ?6)", entry.Sequence, Spelling.Of(kind), run, content, entry.Previous, entry.Hash);
        return entry;
    }

    private List<RunSummary> Summaries(string condition, params object?[] values) => _store.Use(connection => connection.Query(
        $"SELECT {SummaryColumns} {FromRuns} {condition}",
        r => new RunSummary(r.GetString(0), r.GetInt32(1), Iso.Date(r.GetString(2)), Spelling.Of<RunStatus>()[r.GetString(3)], Spelling.Of<EvidenceKind>()[r.GetString(4)],
            r.GetString(5), r.IsDBNull(6) ? null : r.GetInt32(6), Time(r.GetString(7)), Time(r.GetString(8)), r.GetString(9), r.GetString(10), r.GetString(11), ulong.Parse(r.GetString(12), CultureInfo.InvariantCulture), r.GetInt32(13)),
        values));

    private RunRecord RecordOf(SqliteConnection connection, string run) =>
        _newest is { } newest && newest.Run == run
            ? newest
            : Unpacked(run, connection.Query("SELECT record FROM run WHERE run = ?1", r => r.GetFieldValue<byte[]>(0), run)[0]);

    private static DateTimeOffset Time(string text) => DateTimeOffset.Parse(text, CultureInfo.InvariantCulture);

    private static StoreException Ambiguous(string prefix, string one, string other) =>
        new(StoreFault.Refused, $"Several runs begin with '{prefix}', {one} and {other} among them. Give more digits.");

    private static RunRecord Unpacked(string run, byte[] packed)
    {
        try
        {
            return RecordJson.Read(Zlib.Unpack(packed));
        }
        catch (Exception error) when (error is InvalidDataException or System.Text.Json.JsonException)
        {
            throw new StoreException(StoreFault.Corrupt, $"The record of run {run} cannot be read: {error.Message} Restore a backup.", error);
        }
    }

    private static PreviousRun Previous(RunRecord record) => new(
        record.Run, record.AsOf, record.Results.Simulation?.Scenarios ?? 0, record.Settings.Model.Name, record.SettingsHash,
        [.. record.Results.Nodes.Select(n => new PreviousNode(n.Book, n.Value, n.Measures))],
        [.. record.Results.Limits.Select(l => new PreviousLimit(l.Limit.Name, l.Used, l.Status, l.StatusSince ?? record.AsOf))]);
}
