using System.Globalization;
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
    /// <summary>Reads it; <paramref name="instruments"/> are the rows of <see cref="InstrumentRows"/>, read over all cores: there may be very many.</summary>
    public static ReferenceData Read(SqliteConnection connection, IReadOnlyList<string?[]> instruments) => InOrder(
        WithCurrencies(connection.Query("SELECT book, parent, name, currency FROM book", ReadBook)),
        connection.Query("SELECT factor, class, shock, currency, curve, tenor_years, calendar, liquidity_days, proxy, beta FROM factor", ReadFactor),
        instruments.AsParallel().AsOrdered().Select(Instrument).ToArray(),
        connection.Query("""SELECT "limit", book, measure, confidence, horizon_days, amount, basis, reference_book, warn_at, valid_from, valid_to, approver, reason FROM risk_limit""", ReadLimit),
        connection.Query("SELECT calendar, date FROM holiday", r => new Holiday(r.GetString(0), Iso.Date(r.GetString(1)))),
        connection.Query("SELECT factor, date, ratio, reason FROM adjustment", r => new Adjustment(r.GetString(0), Iso.Date(r.GetString(1)), r.Number(2)!.Value, r.Text(3))),
        connection.Query("SELECT factor, other, value FROM covariance", r => new CovarianceEntry(r.GetString(0), r.GetString(1), r.Number(2)!.Value)),
        Warnings(connection));

    /// <summary>Brings rows into canonical order, the ordinal one: SQLite compares TEXT by its UTF-8 bytes, .NET by UTF-16 units.</summary>
    public static ReferenceData InOrder(
        IEnumerable<Book> books, IEnumerable<Factor> factors, IEnumerable<Instrument> instruments, IEnumerable<Limit> limits,
        IEnumerable<Holiday> holidays, IEnumerable<Adjustment> adjustments, IEnumerable<CovarianceEntry> covariance, IEnumerable<Finding> warnings) => new(
        [.. books.OrderBy(b => b.Name, StringComparer.Ordinal)],
        [.. factors.OrderBy(f => f.Name, StringComparer.Ordinal)],
        instruments.OrderBy(i => i.Name, StringComparer.Ordinal).ToDictionary(i => i.Name, StringComparer.Ordinal),
        [.. limits.OrderBy(l => l.Name, StringComparer.Ordinal)],
        [.. holidays.OrderBy(h => h.Calendar, StringComparer.Ordinal).ThenBy(h => h.Date)],
        [.. adjustments.OrderBy(a => a.Date).ThenBy(a => a.Factor, StringComparer.Ordinal)],
        [.. covariance.OrderBy(c => c.Factor, StringComparer.Ordinal).ThenBy(c => c.Other, StringComparer.Ordinal)],
        [.. warnings.OrderBy(w => w.Subject, StringComparer.Ordinal).ThenBy(w => w.Code, StringComparer.Ordinal)]);

    /// <summary>Reads a row of <see cref="InstrumentRows"/>; one with a term that only an earlier version took stays, unmodelled.</summary>
    public static Instrument Instrument(string?[] cells)
    {
        var terms = TermsText.Read(cells[3]!);
        return InstrumentReader.ReadAccepted(new(cells[0]!, cells[1]!, cells[2]!, terms, cells[4], Number(cells[5]), Number(cells[6])));
    }

    /// <summary>Warnings of the newest load, by file and code.</summary>
    public static List<Finding> Warnings(SqliteConnection connection) => connection.Query(
        "SELECT code, subject, message FROM feed_warning ORDER BY subject, code",
        row => new Finding(FindingSeverity.Warning, row.GetString(0), row.GetString(1), row.GetString(2)));

    private static Book ReadBook(SqliteDataReader row) => new(row.GetString(0), row.Text(1), row.Text(2) ?? row.GetString(0), row.Text(3) ?? "");

    /// <summary>Gives books without a currency that of the nearest book above; in a cycle there may be none, which the checks of the tree refuse anyway.</summary>
    private static List<Book> WithCurrencies(List<Book> books)
    {
        var byName = books.ToDictionary(b => b.Name, StringComparer.Ordinal);
        return books.ConvertAll(book =>
        {
            var above = book;
            for (var steps = 0; above.Currency.Length == 0 && steps < books.Count && above.Parent is not null && byName.TryGetValue(above.Parent, out var parent); steps++) above = parent;
            return book with { Currency = above.Currency };
        });
    }

    private static Factor ReadFactor(SqliteDataReader row) => new(
        row.GetString(0), Spelling.Of<FactorClass>()[row.GetString(1)], Spelling.Of<ShockKind>()[row.GetString(2)], row.Text(3), row.Text(4), row.Number(5), row.Text(6),
        row.IsDBNull(7) ? null : int.Parse(row.GetString(7), CultureInfo.InvariantCulture), row.Text(8), row.Number(9));

    private static Limit ReadLimit(SqliteDataReader row) => new(
        row.GetString(0), row.GetString(1),
        new(Spelling.Of<MeasureKind>()[row.GetString(2)], new(decimal.Parse(row.GetString(3), CultureInfo.InvariantCulture)), new(int.Parse(row.GetString(4), CultureInfo.InvariantCulture))),
        row.Number(5)!.Value, Spelling.Of<LimitBasis>()[row.GetString(6)], row.Text(7), row.Number(8)!.Value, Date(row.Text(9)), Date(row.Text(10)), row.Text(11), row.Text(12));

    private static double? Number(string? text) => text is null ? null : double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);

    private static DateOnly? Date(string? text) => text is null ? null : Iso.Date(text);
}
