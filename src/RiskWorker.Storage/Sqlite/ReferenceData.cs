using System.Globalization;
using System.Text.Json;
using Microsoft.Data.Sqlite;
using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Storage.Feed.Rows;

namespace RiskWorker.Storage.Sqlite;

/// <summary>What the store holds beside dated rows, in canonical order.</summary>
internal sealed record ReferenceData(
    IReadOnlyList<Book> Books,
    IReadOnlyList<Factor> Factors,
    IReadOnlyDictionary<string, Instrument> Instruments,
    IReadOnlyList<Limit> Limits,
    IReadOnlyList<Holiday> Holidays,
    IReadOnlyList<Adjustment> Adjustments,
    IReadOnlyList<CovarianceEntry> Covariance,
    IReadOnlyList<Finding> FeedWarnings)
{
    // TEXT compares by its UTF-8 bytes in SQLite and by UTF-16 units here; the order that counts is the ordinal one.
    public static ReferenceData Read(SqliteConnection connection) => new(
        WithCurrencies([.. connection.Query("SELECT book, parent, name, currency FROM book", ReadBook).OrderBy(b => b.Name, StringComparer.Ordinal)]),
        [.. connection.Query("SELECT factor, class, shock, currency, curve, tenor_years, calendar, liquidity_days, proxy, beta FROM factor", ReadFactor).OrderBy(f => f.Name, StringComparer.Ordinal)],
        connection.Query("SELECT instrument, kind, currency, terms, issuer, lot, daily_volume FROM instrument", ReadInstrument).ToDictionary(i => i.Name, StringComparer.Ordinal),
        [
            .. connection.Query("""SELECT "limit", book, measure, confidence, horizon_days, amount, basis, reference_book, warn_at, valid_from, valid_to, approver, reason FROM risk_limit""", ReadLimit)
                .OrderBy(l => l.Name, StringComparer.Ordinal),
        ],
        [
            .. connection.Query("SELECT calendar, date FROM holiday", r => new Holiday(r.GetString(0), Iso.Date(r.GetString(1))))
                .OrderBy(h => h.Calendar, StringComparer.Ordinal).ThenBy(h => h.Date),
        ],
        [
            .. connection.Query("SELECT factor, date, ratio, reason FROM adjustment", r => new Adjustment(r.GetString(0), Iso.Date(r.GetString(1)), r.Number(2)!.Value, r.Text(3)))
                .OrderBy(a => a.Date).ThenBy(a => a.Factor, StringComparer.Ordinal),
        ],
        [
            .. connection.Query("SELECT factor, other, value FROM covariance", r => new CovarianceEntry(r.GetString(0), r.GetString(1), r.Number(2)!.Value))
                .OrderBy(c => c.Factor, StringComparer.Ordinal).ThenBy(c => c.Other, StringComparer.Ordinal),
        ],
        Warnings(connection));

    /// <summary>Warnings of the newest load, by file and code.</summary>
    public static List<Finding> Warnings(SqliteConnection connection) => connection.Query(
        "SELECT code, subject, message FROM feed_warning ORDER BY subject, code",
        row => new Finding(FindingSeverity.Warning, row.GetString(0), row.GetString(1), row.GetString(2)));

    private static Book ReadBook(SqliteDataReader row) => new(row.GetString(0), row.Text(1), row.Text(2) ?? row.GetString(0), row.Text(3) ?? "");

    /// <summary>Gives books without a currency that of the nearest book above; in a cycle there may be none, which the checks of the tree refuse anyway.</summary>
    private static Book[] WithCurrencies(Book[] books)
    {
        var byName = books.ToDictionary(b => b.Name, StringComparer.Ordinal);
        return Array.ConvertAll(books, book =>
        {
            var above = book;
            for (var steps = 0; above.Currency.Length == 0 && steps < books.Length && above.Parent is not null && byName.TryGetValue(above.Parent, out var parent); steps++) above = parent;
            return book with { Currency = above.Currency };
        });
    }

    private static Factor ReadFactor(SqliteDataReader row) => new(
        row.GetString(0), Spelling.Of<FactorClass>()[row.GetString(1)], Spelling.Of<ShockKind>()[row.GetString(2)], row.Text(3), row.Text(4), row.Number(5), row.Text(6),
        row.IsDBNull(7) ? null : int.Parse(row.GetString(7), CultureInfo.InvariantCulture), row.Text(8), row.Number(9));

    private static Instrument ReadInstrument(SqliteDataReader row)
    {
        var terms = JsonSerializer.Deserialize(row.GetString(3), TermsJson.Default.SortedDictionaryStringString)!;
        var (instrument, faults) = InstrumentReader.Read(new(row.GetString(0), row.GetString(1), row.GetString(2), terms, row.Text(4), row.Number(5), row.Number(6)));
        return instrument ?? throw new InvalidDataException($"The stored instrument '{row.GetString(0)}' cannot be read: {faults[0].Term} is '{faults[0].Found}', expected {faults[0].Expected}.");
    }

    private static Limit ReadLimit(SqliteDataReader row) => new(
        row.GetString(0), row.GetString(1),
        new(Spelling.Of<MeasureKind>()[row.GetString(2)], new(decimal.Parse(row.GetString(3), CultureInfo.InvariantCulture)), new(int.Parse(row.GetString(4), CultureInfo.InvariantCulture))),
        row.Number(5)!.Value, Spelling.Of<LimitBasis>()[row.GetString(6)], row.Text(7), row.Number(8)!.Value, Date(row.Text(9)), Date(row.Text(10)), row.Text(11), row.Text(12));

    private static DateOnly? Date(string? text) => text is null ? null : Iso.Date(text);
}
