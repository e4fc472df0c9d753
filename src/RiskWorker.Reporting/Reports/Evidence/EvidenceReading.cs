using RiskWorker.Domain.Evidence;
using RiskWorker.Reporting.Document;

namespace RiskWorker.Reporting.Reports.Evidence;

/// <summary>Backtest evidence as the sections read it: its books, their names, their units.</summary>
internal sealed class EvidenceReading
{
    private const int MostPages = 30;
    private readonly Dictionary<string, string> names;

    public EvidenceReading(BacktestEvidence evidence)
    {
        Evidence = evidence;
        Books = [.. evidence.Series.GroupBy(one => one.Book, StringComparer.Ordinal).Select(one => new BookEvidence([.. one]))];
        names = Books.ToDictionary(book => book.Book, book => book.Name, StringComparer.Ordinal);
        var root = Books.Take(1);
        var others = Books.Skip(1).Where(book => book.Days > 0).OrderBy(book => book.Urgency).Take(MostPages);
        var paged = root.Where(book => book.Days > 0).Concat(others).ToHashSet();
        Paged = [.. Books.Where(paged.Contains)];
    }

    public BacktestEvidence Evidence { get; }

    /// <summary>The books, depth first.</summary>
    public IReadOnlyList<BookEvidence> Books { get; }

    /// <summary>Those with a page of their own: the root, and of the others what must be seen first, in the order of the tree.</summary>
    public IReadOnlyList<BookEvidence> Paged { get; }

    /// <summary>Whether the days were walked through afterwards: nobody had these figures, so nobody owes an explanation of a day.</summary>
    public bool IsWalkForward => Evidence.Kind == BacktestKind.WalkForward;

    /// <summary>A book's display name.</summary>
    public string NameOf(string book) => names.GetValueOrDefault(book, book);

    /// <summary>The unit that fits the largest of some amounts.</summary>
    public static MoneyScale Scale(IEnumerable<double?> amounts, string currency) =>
        MoneyScale.For(amounts.Select(amount => Math.Abs(amount ?? 0)).DefaultIfEmpty(0).Max(), currency);
}
