using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Runs;

public sealed class PriceErrorTests
{
    // 40 at home in euros and -10 away, whose figures are in dollars at 0.9: the home book's error is four times the other's in euros.
    [Fact]
    public void Calculate_errors_of_numerical_prices_add_up_without_sign_in_each_books_currency()
    {
        var snapshot = WideBook.Holding(new Position("HOME", "ARITHMETIC", 40), new("HOME", "SHARE", 1), new("AWAY", "ARITHMETIC", -10)).Build();
        var results = Calculate(snapshot);
        var (all, home, away) = (ErrorOf(results, "ALL")!, ErrorOf(results, "HOME")!, ErrorOf(results, "AWAY")!);
        Assert.Equal(home.Table, 4 * 0.9 * away.Table, 1e-12 * home.Table);
        Assert.Equal(all.Standard, home.Standard + (0.9 * away.Standard), 1e-12 * all.Standard);
        var table = (TabulatedFormula)CompiledBook.Of(snapshot, 1, 10).Plan.Groups.SelectMany(g => g.Formulas).SelectMany(f => f.Items).First().Formula;
        Assert.Equal(40 * table.Error, home.Table, 1e-12 * home.Table);
        Assert.Equal(40 * table.StandardError, home.Standard, 1e-12 * home.Standard);
        Assert.True(table.StandardError > 0);
    }

    [Fact]
    public void Calculate_book_without_numerical_prices_has_none()
    {
        var results = Calculate(WideBook.Holding(new Position("HOME", "AMERICAN", 1), new("AWAY", "BOND", 1)).Build());
        Assert.Null(ErrorOf(results, "AWAY"));
        Assert.Equal(0, ErrorOf(results, "HOME")!.Standard);
    }

    private static PriceError? ErrorOf(RunResults results, string book) => results.Nodes.Single(n => n.Book == book).PriceError;

    private static RunResults Calculate(Snapshot snapshot) =>
        new RunCalculator(snapshot with { Settings = snapshot.Settings with { Simulation = new() { Scenarios = 2_000, Looks = 1, Cap = 2_000 }, Checks = new() { MinimumHistory = 1 } } }, 2, null, CancellationToken.None).Calculate();
}
