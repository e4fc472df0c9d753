using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>
/// For each model and date the one run whose VaR is counted: not failed, recorded before backfilled, then the newest.
/// Follows the store by reading only the runs that were added since it last looked.
/// </summary>
internal sealed class CountableRuns
{
    private readonly Dictionary<string, SortedList<DateOnly, Candidate>> _byModel = new(StringComparer.Ordinal);
    private readonly Dictionary<string, (CountedRun Run, SnapshotLeaf Leaf)> _read = new(StringComparer.Ordinal);
    private long _last;

    private readonly record struct Candidate(string Run, string Content, EvidenceKind Evidence, DateOnly? ProfitFrom);

    public void Follow(SqliteConnection connection)
    {
        const string sql = "SELECT sequence, run, as_of, evidence, model, content, profit_from, status FROM run WHERE sequence > ?1 ORDER BY sequence";
        foreach (var (sequence, asOf, model, status, run) in connection.Query(sql, row => (row.GetInt64(0), Iso.Date(row.GetString(2)), row.GetString(4), row.GetString(7),
            new Candidate(row.GetString(1), row.GetString(5), Spelling.Of<EvidenceKind>()[row.GetString(3)], row.Text(6) is { } from ? Iso.Date(from) : null)), _last))
        {
            _last = sequence;
            if (status == Spelling.Of(RunStatus.Failed)) continue;
            if (!_byModel.TryGetValue(model, out var dates)) _byModel[model] = dates = [];
            if (dates.TryGetValue(asOf, out var before) && before.Evidence < run.Evidence) continue;
            dates[asOf] = run;
        }
    }

    /// <summary>The counted runs of <paramref name="model"/> from <paramref name="from"/> to before <paramref name="end"/>, oldest first, with their leaves.</summary>
    public List<(CountedRun Run, SnapshotLeaf Leaf)> Between(SqliteConnection connection, string model, DateOnly from, DateOnly end)
    {
        var counted = new List<(CountedRun, SnapshotLeaf)>();
        if (!_byModel.TryGetValue(model, out var dates)) return counted;
        foreach (var (date, run) in dates)
        {
            if (date < from || date >= end) continue;
            if (!_read.TryGetValue(run.Run, out var read))
            {
                var counts = RunRows.Counted(connection, run.Run, run.Content, date, run.Evidence, run.ProfitFrom);
                _read[run.Run] = read = (counts, SnapshotLeaves.Run(counts));
            }
            counted.Add(read);
        }
        return counted;
    }
}
