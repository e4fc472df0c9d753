using RiskWorker.Domain.Books;
using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Checks;

/// <summary>Checks of the tree, and of every file that names a book.</summary>
internal static class BookChecks
{
    public static void Run(Snapshot snapshot, FindingList findings)
    {
        Tree(snapshot, findings);
        if (snapshot.Positions.Count == 0)
            findings.Add(FindingCodes.PositionsNone, "positions.csv", $"nothing is held on {snapshot.AsOf:yyyy-MM-dd}, so there is nothing to measure");
        var books = snapshot.Books.Select(b => b.Name).ToHashSet(StringComparer.Ordinal);
        Positions(snapshot, books, findings);
        Limits(snapshot, books, findings);
        Profits(snapshot, books, findings);
    }

    private static void Tree(Snapshot snapshot, FindingList findings)
    {
        var (tree, faults) = BookTree.Build(snapshot.Books);
        if (tree is not null)
        {
            Currencies(snapshot, tree, findings);
            return;
        }
        string[] named = [.. faults.Select(f => $"{f.Book}: {f.Fault}")];
        findings.Add(FindingCodes.BookTree, "books.csv",
            $"the books form no tree, for {FindingList.Count(named.Length, "reason", "reasons")} ({FindingList.Names(named)}), so nothing can be rolled up");
    }

    private static void Currencies(Snapshot snapshot, BookTree tree, FindingList findings)
    {
        var currencies = new CurrencyTable(tree.ReportingCurrency, snapshot.Factors);
        string[] without = [.. tree.Books.Where(b => currencies.IndexOf(b.Currency) < 0).Select(b => $"{b.Name} in {b.Currency}")];
        if (without.Length == 0) return;
        findings.Add(FindingCodes.BookCurrency, "books.csv",
            $"{FindingList.Count(without.Length, "book has a currency", "books have a currency")} that no fx factor prices ({FindingList.Names(without)}), so none of their figures can be expressed in it");
    }

    private static void Positions(Snapshot snapshot, HashSet<string> books, FindingList findings)
    {
        var lines = new SortedDictionary<string, int>(StringComparer.Ordinal);
        foreach (var position in snapshot.Positions)
        {
            if (!books.Contains(position.Book)) lines[position.Book] = lines.GetValueOrDefault(position.Book) + 1;
        }
        if (lines.Count == 0) return;
        findings.Add(FindingCodes.BookUnknown, "positions.csv",
            $"{FindingList.Count(lines.Values.Sum(), "line lies", "lines lie")} in {FindingList.Count(lines.Count, "book", "books")} that books.csv lacks ({FindingList.Names([.. lines.Keys])}), so no figure holds them, the root's neither");
    }

    private static void Limits(Snapshot snapshot, HashSet<string> books, FindingList findings)
    {
        string[] lost = [.. snapshot.ValidLimits.Where(l => UnknownBook(l, books) is not null).Select(l => $"{l.Name} on {UnknownBook(l, books)}")];
        if (lost.Length == 0) return;
        findings.Add(FindingCodes.LimitBookUnknown, "limits.csv",
            $"{FindingList.Count(lost.Length, "limit names a book", "limits name a book")} that books.csv lacks ({FindingList.Names(lost)}) and cannot be decided");
    }

    private static string? UnknownBook(Limit limit, HashSet<string> books)
    {
        if (!books.Contains(limit.Book)) return limit.Book;
        return limit.ReferenceBook is { } reference && !books.Contains(reference) ? reference : null;
    }

    private static void Profits(Snapshot snapshot, HashSet<string> books, FindingList findings)
    {
        var rows = snapshot.ProfitAndLoss.Where(p => !books.Contains(p.Book)).Select(p => p.Book).ToArray();
        if (rows.Length == 0) return;
        string[] names = [.. rows.Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal)];
        findings.Add(FindingCodes.ProfitBookUnknown, "pnl.csv",
            $"{FindingList.Count(rows.Length, "row is", "rows are")} of {FindingList.Count(names.Length, "book", "books")} that books.csv lacks ({FindingList.Names(names)}), so no backtest counts them");
    }
}
