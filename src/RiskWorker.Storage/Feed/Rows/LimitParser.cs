using System.Globalization;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;

namespace RiskWorker.Storage.Feed.Rows;

/// <summary><c>limits.csv</c>: limit, book, measure, confidence, horizon_days, amount, basis, reference_book, warn_at, valid_from, valid_to, approver, reason.</summary>
internal sealed class LimitParser : IRowParser<string?[]>
{
    public static FileFormat Format { get; } = new("limits.csv", false,
    [
        FeedColumn.Must("limit"), FeedColumn.Must("book"), FeedColumn.Must("measure"), FeedColumn.Must("confidence"), FeedColumn.Must("horizon_days"), FeedColumn.Must("amount"),
        FeedColumn.May("basis"), FeedColumn.May("reference_book"), FeedColumn.May("warn_at"), FeedColumn.May("valid_from"), FeedColumn.May("valid_to"),
        FeedColumn.May("approver"), FeedColumn.May("reason"),
    ]);

    // Ten years: what the settings allow for a measure, too.
    private const int MostDays = 2_520;

    private const int Basis = 6, Reference = 7, WarnAt = 8, ValidFrom = 9, ValidTo = 10;

    // A limit is decided by intervals from the sample itself, which a liquidity-adjusted measure has not.
    private static readonly Dictionary<string, MeasureKind> s_measures = Spelling.Of<MeasureKind>().Where(m => m.Value != MeasureKind.Les).ToDictionary(StringComparer.Ordinal);

    private readonly FirstLines<string> _names = new(StringComparer.Ordinal);

    public bool TryParse(CellReader cells, out string?[] row)
    {
        var (name, book) = (cells.Name(0), cells.Name(1));
        var measure = cells.Choice(2, s_measures);
        var confidence = new Confidence(cells.Fraction(3)).Level.ToString(CultureInfo.InvariantCulture);
        var horizon = cells.Count(4, MostDays).ToString(CultureInfo.InvariantCulture);
        var amount = cells.Number(5, "a number above 0", value => value > 0);
        var basis = cells.IsEmpty(Basis) ? LimitBasis.Amount : cells.Choice(Basis, Spelling.Of<LimitBasis>());
        var reference = cells.OptionalName(Reference);
        var warnAt = cells.OptionalNumber(WarnAt, "a fraction above 0 and at most 1, as in 0.8", value => value is > 0 and <= 1);
        var (from, to) = (cells.OptionalDate(ValidFrom), cells.OptionalDate(ValidTo));
        row = [name, book, Spelling.Of(measure), confidence, horizon, amount.Text, Spelling.Of(basis), reference, warnAt?.Text ?? "0.8", Iso.Of(from), Iso.Of(to), cells.OptionalText(11), cells.OptionalText(12)];
        if (!cells.RowIsSound) return false;

        if (basis == LimitBasis.Book && reference is null) cells.Fault(Reference, "a book to compare with, since basis is book");
        if (basis != LimitBasis.Book && reference is not null) cells.Fault(Reference, "nothing, since basis is not book");
        if (to < from) cells.Fault(ValidTo, $"a date not before valid_from, {Iso.Of(from)}");
        _names.Claim(name, cells, 0, "each limit");
        return cells.RowIsSound;
    }
}
