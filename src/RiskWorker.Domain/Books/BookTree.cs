namespace RiskWorker.Domain.Books;

/// <summary>
/// The books as one tree. Nodes are numbered in depth-first order, children by ordinal name, so node 0 is the root
/// and every child has a larger number than its parent.
/// </summary>
public sealed class BookTree
{
    private readonly Dictionary<string, int> _index;
    private readonly int[] _parent;
    private readonly int[] _depth;

    private BookTree(List<Book> ordered, List<int> parents, List<int> depths)
    {
        Books = ordered;
        _parent = [.. parents];
        _depth = [.. depths];
        _index = new(ordered.Count, StringComparer.Ordinal);
        for (var i = 0; i < ordered.Count; i++) _index[ordered[i].Name] = i;
    }

    /// <summary>The books by node number.</summary>
    public IReadOnlyList<Book> Books { get; }

    /// <summary>The root's currency.</summary>
    public string ReportingCurrency => Books[0].Currency;

    /// <summary>Node number of <paramref name="book"/>, or -1.</summary>
    public int IndexOf(string book) => _index.GetValueOrDefault(book, -1);

    /// <summary>Node number of the parent; -1 for the root.</summary>
    public int ParentOf(int node) => _parent[node];

    /// <summary>Steps from the root.</summary>
    public int DepthOf(int node) => _depth[node];

    /// <summary>Node numbers of the direct children, ascending.</summary>
    public IEnumerable<int> ChildrenOf(int node) => Enumerable.Range(node + 1, Books.Count - node - 1).Where(i => _parent[i] == node);

    /// <summary>
    /// Orders <paramref name="books"/> into a tree, or says what prevents it: a name given twice, no root, several roots, an unknown parent, a cycle.
    /// </summary>
    /// <returns>The tree and no faults, or null and at least one fault as (book, sentence).</returns>
    public static (BookTree? Tree, IReadOnlyList<(string Book, string Fault)> Faults) Build(IReadOnlyCollection<Book> books)
    {
        var faults = new List<(string, string)>();
        var names = books.Select(b => b.Name).ToHashSet(StringComparer.Ordinal);
        foreach (var name in books.CountBy(b => b.Name, StringComparer.Ordinal).Where(n => n.Value > 1)) faults.Add((name.Key, $"its name is given to {name.Value} books"));
        var roots = books.Where(b => b.Parent is null).OrderBy(b => b.Name, StringComparer.Ordinal).ToList();
        if (roots.Count == 0) faults.Add((books.Count == 0 ? "-" : books.First().Name, "no book is without a parent, so there is no root"));
        foreach (var extra in roots.Skip(1)) faults.Add((extra.Name, $"a second root beside '{roots[0].Name}'; exactly one book may be without a parent"));
        foreach (var orphan in books.Where(b => b.Parent is not null && !names.Contains(b.Parent)))
            faults.Add((orphan.Name, $"its parent '{orphan.Parent}' is not among the books"));
        if (faults.Count > 0) return (null, faults);

        var children = books.Where(b => b.Parent is not null).OrderBy(b => b.Name, StringComparer.Ordinal).ToLookup(b => b.Parent!, StringComparer.Ordinal);
        var (ordered, parents, depths) = (new List<Book>(), new List<int>(), new List<int>());
        var pending = new Stack<(Book Book, int Parent, int Depth)>();
        pending.Push((roots[0], -1, 0));
        while (pending.TryPop(out var next))
        {
            ordered.Add(next.Book);
            parents.Add(next.Parent);
            depths.Add(next.Depth);
            var node = ordered.Count - 1;
            foreach (var child in children[next.Book.Name].Reverse()) pending.Push((child, node, next.Depth + 1));
        }
        if (ordered.Count == books.Count) return (new(ordered, parents, depths), faults);
        var reached = ordered.Select(b => b.Name).ToHashSet(StringComparer.Ordinal);
        foreach (var lost in books.Where(b => !reached.Contains(b.Name)).OrderBy(b => b.Name, StringComparer.Ordinal))
            faults.Add((lost.Name, IsOwnAncestor(lost, books) ? "it is its own ancestor: its parents form a cycle" : "its parents lead into a cycle, not to the root"));
        return (null, faults);
    }

    private static bool IsOwnAncestor(Book book, IReadOnlyCollection<Book> books)
    {
        var above = book.Parent;
        for (var steps = 0; above is not null && steps < books.Count; steps++)
        {
            if (above == book.Name) return true;
            above = books.First(b => b.Name == above).Parent;
        }
        return false;
    }
}
