using System.Globalization;
using RiskWorker.Domain.Evidence;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>What was written to explain exceptions, by date and book. Append-only: a correction stands beside what it corrects.</summary>
public sealed class ExplanationLog
{
    private readonly RiskStore _store;

    internal ExplanationLog(RiskStore store) => _store = store;

    /// <summary>Adds an explanation.</summary>
    /// <exception cref="StoreException">The store cannot be written.</exception>
    public void Append(DateOnly date, string book, ExceptionExplanation explanation)
    {
        ArgumentNullException.ThrowIfNull(explanation);
        _store.Write(connection => connection.Run(
            "INSERT INTO exception_explanation (date, book, cause, text, author, written) VALUES (?1, ?2, ?3, ?4, ?5, ?6)",
            Iso.Of(date), book, Spelling.Of(explanation.Cause), explanation.Text, explanation.Author, explanation.Written.UtcDateTime.ToString("O", CultureInfo.InvariantCulture)));
    }

    /// <summary>All of them by date and book, of each the newest first.</summary>
    public ILookup<(DateOnly Date, string Book), ExceptionExplanation> All() => _store.Use(connection => connection.Query(
        "SELECT date, book, cause, text, author, written FROM exception_explanation ORDER BY id DESC",
        r => (Key: (Iso.Date(r.GetString(0)), r.GetString(1)), Explanation: new ExceptionExplanation(
            Spelling.Of<ExceptionCause>()[r.GetString(2)], r.GetString(3), r.GetString(4), DateTimeOffset.Parse(r.GetString(5), CultureInfo.InvariantCulture)))))
        .ToLookup(row => row.Key, row => row.Explanation);
}
