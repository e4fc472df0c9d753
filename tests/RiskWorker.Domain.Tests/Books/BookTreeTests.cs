using RiskWorker.Domain.Books;

namespace RiskWorker.Domain.Tests.Books;

public sealed class BookTreeTests
{
    private static Book Of(string name, string? parent, string currency = "EUR") => new(name, parent, name, currency);

    private static readonly Book[] s_firm = [Of("rates", "desk"), Of("desk", "firm", "USD"), Of("firm", null, "NOK"), Of("credit", "desk"), Of("Zeta", "firm"), Of("swaps", "rates")];

    // Ordinal order puts 'Z' before 'd'.
    [Fact]
    public void Build_numbers_nodes_depth_first_children_by_ordinal_name()
    {
        var (tree, faults) = BookTree.Build(s_firm);
        Assert.Empty(faults);
        Assert.Equal(["firm", "Zeta", "desk", "credit", "rates", "swaps"], tree!.Books.Select(b => b.Name));
        Assert.Equal([-1, 0, 0, 2, 2, 4], Enumerable.Range(0, 6).Select(tree.ParentOf));
        Assert.Equal([0, 1, 1, 2, 2, 3], Enumerable.Range(0, 6).Select(tree.DepthOf));
        Assert.Equal([1, 2], tree.ChildrenOf(0));
        Assert.Equal([3, 4], tree.ChildrenOf(2));
        Assert.Empty(tree.ChildrenOf(5));
        Assert.Equal("NOK", tree.ReportingCurrency);
    }

    [Fact]
    public void Build_does_not_depend_on_the_order_of_books()
    {
        for (var seed = 0; seed < 50; seed++)
        {
            var books = s_firm.ToArray();
            new Random(seed).Shuffle(books);
            Assert.Equal(["firm", "Zeta", "desk", "credit", "rates", "swaps"], BookTree.Build(books).Tree!.Books.Select(b => b.Name));
        }
    }

    [Fact]
    public void IndexOf_is_the_node_number_or_minus_one()
    {
        var tree = BookTree.Build(s_firm).Tree!;
        Assert.Equal(4, tree.IndexOf("rates"));
        Assert.Equal(-1, tree.IndexOf("Rates"));
    }

    [Fact]
    public void Build_without_books_says_that_there_is_no_root() => AssertFaults([], ("-", "no book is without a parent, so there is no root"));

    [Fact]
    public void Build_without_a_root_says_so() => AssertFaults([Of("a", "b"), Of("b", "a")], ("a", "no book is without a parent, so there is no root"));

    [Fact]
    public void Build_with_two_roots_names_the_second() =>
        AssertFaults([Of("b", null), Of("a", null), Of("c", "a")], ("b", "a second root beside 'a'; exactly one book may be without a parent"));

    [Fact]
    public void Build_with_an_unknown_parent_names_it() => AssertFaults([Of("a", null), Of("b", "x")], ("b", "its parent 'x' is not among the books"));

    [Fact]
    public void Build_tells_all_faults_at_once() =>
        AssertFaults([Of("a", null), Of("b", null), Of("c", "x")], ("b", "a second root beside 'a'; exactly one book may be without a parent"), ("c", "its parent 'x' is not among the books"));

    // A cycle beside a sound tree, and what hangs below it.
    [Fact]
    public void Build_with_a_cycle_names_every_book_that_it_cuts_off() => AssertFaults([Of("a", null), Of("d", "c"), Of("b", "c"), Of("c", "b")],
        ("b", "it is its own ancestor: its parents form a cycle"), ("c", "it is its own ancestor: its parents form a cycle"), ("d", "its parents lead into a cycle, not to the root"));

    [Fact]
    public void Build_with_a_book_that_is_its_own_parent_names_it() => AssertFaults([Of("a", null), Of("b", "b")], ("b", "it is its own ancestor: its parents form a cycle"));

    [Fact]
    public void Build_with_a_name_given_twice_names_it() => AssertFaults([Of("a", null), Of("b", "a"), Of("b", "a")], ("b", "its name is given to 2 books"));

    private static void AssertFaults(Book[] books, params (string, string)[] expected)
    {
        var (tree, faults) = BookTree.Build(books);
        Assert.Null(tree);
        Assert.Equal(expected, faults);
    }
}
