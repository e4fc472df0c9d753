using RiskWorker.Domain.Limits;
using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Checks;

namespace RiskWorker.Engine.Tests.Checks;

public sealed class BookChecksTests
{
    private static readonly MeasureSpec s_var = new(MeasureKind.Var, new(0.99m), new(1));

    [Fact]
    public void Run_of_sound_data_finds_nothing() => Assert.Empty(FindingsOf.Feed(FridaySnapshot.Sound()));

    [Fact]
    public void Run_with_two_roots_blocks_and_names_the_second()
    {
        var finding = FindingsOf.Feed(FridaySnapshot.Sound().Book("FIRM", null).Book("OTHER", null)).One(FindingCodes.BookTree);

        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Equal("books.csv", finding.Subject);
        Assert.Contains("1 reason (OTHER: a second root beside 'FIRM'", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_cycle_blocks_and_names_its_books()
    {
        var finding = FindingsOf.Feed(FridaySnapshot.Sound().Book("FIRM", null).Book("X", "Y").Book("Y", "X")).One(FindingCodes.BookTree);

        Assert.Contains("2 reasons (X: it is its own ancestor", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_an_unknown_parent_blocks() =>
        Assert.Contains("'NOWHERE' is not among the books", FindingsOf.Feed(FridaySnapshot.Sound().Book("FIRM", null).Book("X", "NOWHERE")).One(FindingCodes.BookTree).Message, StringComparison.Ordinal);

    [Fact]
    public void Run_without_positions_blocks()
    {
        var finding = FindingsOf.Feed(new FridaySnapshot().Factor("A").Prices("A", FridaySnapshot.Wave(61))).One(FindingCodes.PositionsNone);

        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Equal("nothing is held on 2026-11-27, so there is nothing to measure; load the positions of that date, or run for a date that has some.", finding.Message);
    }

    [Fact]
    public void Run_with_positions_in_unknown_books_warns_once_for_all()
    {
        var finding = FindingsOf.Feed(FridaySnapshot.Sound().Position("LOST", "A-UNIT", 1).Position("LOST", "A-UNIT", 2).Position("GONE", "A-UNIT", 3)).One(FindingCodes.BookUnknown);

        Assert.Equal(FindingSeverity.Warning, finding.Severity);
        Assert.StartsWith("3 lines lie in 2 books that books.csv lacks (GONE, LOST)", finding.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_names_the_first_ten_and_counts_the_rest()
    {
        var builder = FridaySnapshot.Sound();
        for (var i = 0; i < 12; i++) builder.Position($"LOST{i:00}", "A-UNIT", 1);

        Assert.Contains("(LOST00, LOST01, LOST02, LOST03, LOST04, LOST05, LOST06, LOST07, LOST08, LOST09 and 2 more)", FindingsOf.Feed(builder).One(FindingCodes.BookUnknown).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_a_book_in_an_unpriced_currency_blocks()
    {
        var builder = FridaySnapshot.Sound().Book("FIRM", null).Book("NY", "FIRM", "USD");

        var finding = FindingsOf.Feed(builder).One(FindingCodes.BookCurrency);
        Assert.Equal(FindingSeverity.Blocking, finding.Severity);
        Assert.Contains("(NY in USD)", finding.Message, StringComparison.Ordinal);

        FindingsOf.Feed(builder.Factor("USD", FactorClass.Fx, currency: "USD").Prices("USD", FridaySnapshot.Wave(61))).None(FindingCodes.BookCurrency);
    }

    [Fact]
    public void Run_with_limits_on_unknown_books_warns_of_those_valid_on_the_date()
    {
        var builder = FridaySnapshot.Sound()
            .Limit(new("L1", "GONE", s_var, 1))
            .Limit(new("L2", "FIRM", s_var, 1, LimitBasis.Book, "BENCH"))
            .Limit(new("L3", "GONE", s_var, 1, ValidTo: FridaySnapshot.Friday.AddDays(-1)))
            .Limit(new("L4", "FIRM", s_var, 1));

        Assert.StartsWith("2 limits name a book that books.csv lacks (L1 on GONE, L2 on BENCH)", FindingsOf.Feed(builder).One(FindingCodes.LimitBookUnknown).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_with_profit_of_an_unknown_book_warns()
    {
        var builder = FridaySnapshot.Sound().Profit(FridaySnapshot.Friday, "GONE", 1).Profit(FridaySnapshot.Friday.AddDays(-1), "GONE", 1).Profit(FridaySnapshot.Friday, "FIRM", 1);

        Assert.StartsWith("2 rows are of 1 book that books.csv lacks (GONE)", FindingsOf.Feed(builder).One(FindingCodes.ProfitBookUnknown).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Run_puts_blocking_findings_first()
    {
        var findings = FindingsOf.Feed(FridaySnapshot.Sound().Profit(FridaySnapshot.Friday, "GONE", 1).Factor("B"));

        Assert.Equal([FindingCodes.FactorUnobserved.Code, FindingCodes.ProfitBookUnknown.Code], findings.Select(f => f.Code));
    }
}
