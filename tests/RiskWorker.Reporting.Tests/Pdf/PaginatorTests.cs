using RiskWorker.Reporting.Pdf;

namespace RiskWorker.Reporting.Tests.Pdf;

public sealed class PaginatorTests
{
    [Fact]
    public void Place_drops_white_space_at_the_top_of_a_page()
    {
        var pages = new Paginator(100).Place([Piece(60, space: 10), Piece(60, space: 10)]);
        Assert.Equal([0f, 0f], pages.Select(page => page[0].Y));
    }

    [Fact]
    public void Place_moves_a_chain_that_fits_on_the_next_page()
    {
        var pages = new Paginator(100).Place([Piece(50), Piece(20, keep: true), Piece(20, keep: true), Piece(20)]);
        Assert.Equal([1, 3], pages.Select(page => page.Count));
    }

    [Fact]
    public void Place_breaks_a_chain_that_no_page_holds_where_it_must()
    {
        var pages = new Paginator(100).Place([Piece(50), Piece(40, keep: true), Piece(40, keep: true), Piece(40)]);
        Assert.Equal([2, 2], pages.Select(page => page.Count));
    }

    [Fact]
    public void Place_repeats_a_head_above_what_begins_a_page()
    {
        var head = Piece(10, keep: true);
        Fragment Row() => Piece(30) with { Repeat = head };
        var pages = new Paginator(100).Place([head, Row(), Row(), Row(), Row()]);
        Assert.Equal([4, 2], pages.Select(page => page.Count));
        Assert.Same(head, pages[1][0].Fragment);
        Assert.Equal(10, pages[1][1].Y);
    }

    [Fact]
    public void Place_ignores_breaks_that_would_leave_an_empty_page()
    {
        var pages = new Paginator(100).Place([Fragment.Break(), Piece(10), Fragment.Break(), Fragment.Break(), Piece(10), Fragment.Break()]);
        Assert.Equal(2, pages.Count);
    }

    private static Fragment Piece(float height, float space = 0, bool keep = false) =>
        new(height, (_, _) => { }) { SpaceBefore = space, KeepWithNext = keep };
}
