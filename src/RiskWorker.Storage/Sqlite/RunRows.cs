using System.Globalization;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>The columns that stand beside a run's record: what queries need without unpacking it. A pure function of the record.</summary>
internal sealed record RunRows(IReadOnlyList<object?> Run, IReadOnlyList<CountedVar> Vars, IReadOnlyList<ChallengerVar> Challengers, IReadOnlyList<BookAmount> Profit)
{
    public const string Columns = "run, attempt, as_of, status, evidence, model, scenarios, started, finished, snapshot, settings_hash, figures, version, epoch, content, profit_from, seed, breached";

    private static readonly Horizon s_oneDay = new(1);

    public static RunRows Of(RunRecord record, string content)
    {
        var results = record.Results;
        return new(
            [
                record.Run, (long)record.Attempt, Iso.Of(record.AsOf), Spelling.Of(record.Status), Spelling.Of(record.Evidence), record.Settings.Model.Name, (long?)results.Simulation?.Scenarios,
                Utc(record.Started), Utc(record.Finished), record.Snapshot, record.SettingsHash, record.Figures, record.Version, (long)record.Epoch, content, Iso.Of(results.Hypothetical?.From), record.Settings.Simulation.Seed.ToString(CultureInfo.InvariantCulture), (long)results.Limits.Count(l => l.Status == LimitStatus.Breached),
            ],
            [
                .. results.Nodes.SelectMany(n => n.Measures.Where(IsCounted)
                    .Select(m => new CountedVar(n.Book, m.Spec.Confidence, m.Value)))
                    .OrderBy(v => v.Book, StringComparer.Ordinal).ThenBy(v => v.Confidence),
            ],
            [
                .. results.Models.SelectMany(model => model.Nodes.SelectMany(n => n.Measures.Where(IsCounted).Select(m => new ChallengerVar(model.Name, n.Book, m.Spec.Confidence, m.Value))))
                    .OrderBy(v => v.Model, StringComparer.Ordinal).ThenBy(v => v.Book, StringComparer.Ordinal).ThenBy(v => v.Confidence),
            ],
            [.. (results.Hypothetical?.Books ?? []).Where(b => double.IsFinite(b.Amount)).OrderBy(b => b.Book, StringComparer.Ordinal)]);
    }

    public void Insert(SqliteConnection connection, byte[] packed)
    {
        connection.Run($"INSERT INTO run ({Columns}, record) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15, ?16, ?17, ?18, ?19)", [.. Run, packed]);
        using var insertVar = new Statement(connection, "INSERT INTO run_var (run, book, confidence, value) VALUES (?1, ?2, ?3, ?4)", 4);
        foreach (var (book, confidence, value) in Vars) insertVar.Set(0, Run[0]).Set(1, book).Set(2, Text(confidence)).Set(3, value).Run();
        using var insertChallenger = new Statement(connection, "INSERT INTO run_challenger_var (run, model, book, confidence, value) VALUES (?1, ?2, ?3, ?4, ?5)", 5);
        foreach (var (model, book, confidence, value) in Challengers) insertChallenger.Set(0, Run[0]).Set(1, model).Set(2, book).Set(3, Text(confidence)).Set(4, value).Run();
        using var insertProfit = new Statement(connection, "INSERT INTO run_profit (run, book, amount) VALUES (?1, ?2, ?3)", 3);
        foreach (var (book, amount) in Profit) insertProfit.Set(0, Run[0]).Set(1, book).Set(2, amount).Run();
    }

    public static List<CountedVar> StoredVars(SqliteConnection connection, string run) => connection.Query(
        "SELECT book, confidence, value FROM run_var WHERE run = ?1",
        r => new CountedVar(r.GetString(0), new(decimal.Parse(r.GetString(1), CultureInfo.InvariantCulture)), r.GetDouble(2)), run)
        .OrderBy(v => v.Book, StringComparer.Ordinal).ThenBy(v => v.Confidence).ToList();

    public static List<ChallengerVar> StoredChallengers(SqliteConnection connection, string run) => connection.Query(
        "SELECT model, book, confidence, value FROM run_challenger_var WHERE run = ?1",
        r => new ChallengerVar(r.GetString(0), r.GetString(1), new(decimal.Parse(r.GetString(2), CultureInfo.InvariantCulture)), r.GetDouble(3)), run)
        .OrderBy(v => v.Model, StringComparer.Ordinal).ThenBy(v => v.Book, StringComparer.Ordinal).ThenBy(v => v.Confidence).ToList();

    public static List<BookAmount> StoredProfit(SqliteConnection connection, string run) => connection.Query(
        "SELECT book, amount FROM run_profit WHERE run = ?1", r => new BookAmount(r.GetString(0), r.GetDouble(1)), run)
        .OrderBy(b => b.Book, StringComparer.Ordinal).ToList();

    /// <summary>What the exception count takes from a stored run.</summary>
    public static CountedRun Counted(SqliteConnection connection, string run, string content, DateOnly asOf, EvidenceKind evidence, DateOnly? profitFrom) =>
        new(run, content, asOf, evidence, StoredVars(connection, run), profitFrom, StoredProfit(connection, run)) { Challengers = StoredChallengers(connection, run) };

    private static bool IsCounted(MeasureResult measure) => measure.Spec.Kind == MeasureKind.Var && measure.Spec.Horizon == s_oneDay && double.IsFinite(measure.Value);

    private static string Text(Confidence confidence) => confidence.Level.ToString(CultureInfo.InvariantCulture);

    private static string Utc(DateTimeOffset time) => time.UtcDateTime.ToString("O", CultureInfo.InvariantCulture);
}
