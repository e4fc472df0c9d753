using System.Text;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// Reads a snapshot back from the text of its parts. What it counts of earlier runs comes from their own records, which its parts name by hash.
/// </summary>
internal sealed class SnapshotRestoration
{
    private readonly Dictionary<string, string> _whole = new(StringComparer.Ordinal);
    private readonly Dictionary<string, SortedDictionary<DateOnly, string>> _dated = new(StringComparer.Ordinal);

    private SnapshotRestoration(IEnumerable<SnapshotLeaf> leaves)
    {
        foreach (var (part, bytes) in leaves)
        {
            var (text, slash) = (Encoding.UTF8.GetString(bytes), part.Path.IndexOf('/'));
            if (slash < 0) _whole.Add(part.Path, text);
            else if (_dated.TryGetValue(part.Path[..slash], out var file)) file.Add(Iso.Date(part.Path[(slash + 1)..]), text);
            else _dated[part.Path[..slash]] = new() { [Iso.Date(part.Path[(slash + 1)..])] = text };
        }
    }

    /// <summary>The snapshot whose parts are <paramref name="leaves"/>.</summary>
    /// <exception cref="InvalidDataException">A run that it counts is not stored as it was counted.</exception>
    public static Snapshot Of(SqliteConnection connection, IReadOnlyList<SnapshotLeaf> leaves, SnapshotHash hash) => new SnapshotRestoration(leaves).Read(connection, hash);

    private Snapshot Read(SqliteConnection connection, SnapshotHash hash)
    {
        var (asOf, previous) = Dates();
        var reference = ReferenceData.InOrder(
            Rows("books", LeafText.Book), Rows("factors", LeafText.Factor), Rows("instruments", row => ReferenceData.Instrument(row.Rest())), Rows("limits", LeafText.Limit),
            Rows("holidays", LeafText.Holiday), Rows("adjustments", LeafText.Adjustment), Rows("covariance", LeafText.Covariance), Rows("feed-warnings", LeafText.Warning));
        var observations = ObservationHistory.From(reference.Factors.Select(f => f.Name), Rows("observations", LeafText.Observation));
        var counted = Dated("runs").Select(run => Counted(connection, run.Key, run.Value)).ToList();
        return new()
        {
            AsOf = asOf,
            Settings = SettingsText.Read(_whole["settings"]),
            Books = reference.Books,
            Factors = reference.Factors,
            Observations = observations,
            Adjustments = reference.Adjustments,
            Holidays = reference.Holidays,
            Instruments = reference.Instruments,
            Positions = Positions(asOf),
            Previous = previous is { } date ? new(date, Positions(date)) : null,
            Limits = reference.Limits,
            ProfitAndLoss = [.. Rows("pnl", LeafText.Profit).OrderBy(p => p.Date).ThenBy(p => p.Book, StringComparer.Ordinal)],
            Covariance = reference.Covariance,
            FeedWarnings = reference.FeedWarnings,
            CountedRuns = counted,
            EarlierPositions = [.. SnapshotReader.WithoutProfit(observations, counted, asOf, previous).Where(Dated("positions").ContainsKey).Select(d => new DatedPositions(d, Positions(d)))],
            Hash = hash,
        };
    }

    private (DateOnly AsOf, DateOnly? Previous) Dates()
    {
        var lines = _whole["as-of"].Split('\n');
        return (Iso.Date(lines[0]), lines[1].Length == 0 ? null : Iso.Date(lines[1]));
    }

    private Position[] Positions(DateOnly date)
    {
        var positions = CanonicalRow.Of(Dated("positions")[date]).Select(LeafText.Position).ToArray();
        Array.Sort(positions, SnapshotReader.Canonical);
        return positions;
    }

    private static CountedRun Counted(SqliteConnection connection, DateOnly date, string text)
    {
        var (run, content) = (text.Split('\n')[0], text.Split('\n')[1]);
        var found = connection.Query("SELECT evidence, profit_from FROM run WHERE run = ?1 AND content = ?2",
            r => (Evidence: Spelling.Of<EvidenceKind>()[r.GetString(0)], From: r.Text(1)), run, content);
        if (found.Count == 0) throw new InvalidDataException($"Run {run} of {Iso.Of(date)}, whose VaR it counts, is not stored as it was counted.");
        return RunRows.Counted(connection, run, content, date, found[0].Evidence, found[0].From is { } from ? Iso.Date(from) : null);
    }

    private List<T> Rows<T>(string file, Func<CanonicalRow, T> read) => [.. CanonicalRow.Of(_whole.GetValueOrDefault(file, "")).Select(read)];

    private List<T> Rows<T>(string file, Func<DateOnly, CanonicalRow, T> read) => [.. Dated(file).SelectMany(day => CanonicalRow.Of(day.Value).Select(row => read(day.Key, row)))];

    private SortedDictionary<DateOnly, string> Dated(string file) => _dated.GetValueOrDefault(file) ?? [];
}
