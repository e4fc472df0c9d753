using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Tests.Checks;
using static RiskWorker.Engine.Tests.Checks.FridaySnapshot;

namespace RiskWorker.Engine.Tests.Backtesting;

public sealed class ActualProfitsTests
{
    private static readonly DateOnly s_thursday = Friday.AddDays(-1);

    /// <summary>FIRM in EUR over NY in USD (over A and B in USD) and LN in GBP; a dollar at 0.80 and then 0.84 EUR, a pound at 1.20.</summary>
    private static FridaySnapshot Firm() => new FridaySnapshot()
        .Book("FIRM", null).Book("NY", "FIRM", "USD").Book("A", "NY", "USD").Book("B", "NY", "USD").Book("LN", "FIRM", "GBP")
        .Factor("USD", FactorClass.Fx, currency: "USD").Prices("USD", 0.8, 0.84).Factor("GBP", FactorClass.Fx, currency: "GBP").Prices("GBP", 1.2, 1.2);

    private static (ActualProfits Profits, BookTree Tree) Read(FridaySnapshot builder)
    {
        var snapshot = builder.Build();
        var tree = BookTree.Build(snapshot.Books).Tree!;
        return (new(snapshot, tree), tree);
    }

    [Fact]
    public void Of_a_node_without_a_row_sums_its_children_at_the_rates_of_the_day()
    {
        var (profits, tree) = Read(Firm().Profit(Friday, "A", 100).Profit(Friday, "B", -30).Profit(Friday, "LN", 10)
            .Profit(s_thursday, "A", 100).Profit(s_thursday, "B", -30).Profit(s_thursday, "LN", 10));

        Assert.Equal(70, profits.Of(tree.IndexOf("NY"), Friday));
        Assert.Equal((70 * 0.84) + 12, profits.Of(0, Friday)!.Value, 1e-12);
        Assert.Equal((70 * 0.80) + 12, profits.Of(0, s_thursday)!.Value, 1e-12);
    }

    [Fact]
    public void Of_a_node_converts_from_child_to_parent_where_neither_reports()
    {
        var (profits, tree) = Read(new FridaySnapshot().Book("FIRM", null).Book("NY", "FIRM", "USD").Book("LN", "NY", "GBP")
            .Factor("USD", FactorClass.Fx, currency: "USD").Prices("USD", 0.8).Factor("GBP", FactorClass.Fx, currency: "GBP").Prices("GBP", 1.2).Profit(Friday, "LN", 10));

        Assert.Equal(15, profits.Of(tree.IndexOf("NY"), Friday)!.Value, 1e-12);
    }

    [Fact]
    public void Of_a_node_with_a_row_takes_it_over_its_children()
    {
        var (profits, tree) = Read(Firm().Profit(Friday, "NY", 5).Profit(Friday, "A", 100).Profit(Friday, "B", -30));

        Assert.Equal(5, profits.Of(tree.IndexOf("NY"), Friday));
    }

    [Fact]
    public void Of_a_node_with_one_child_missing_is_missing()
    {
        var (profits, tree) = Read(Firm().Profit(Friday, "A", 100).Profit(s_thursday, "B", 1).Profit(Friday, "LN", 1));

        Assert.Null(profits.Of(tree.IndexOf("NY"), Friday));
        Assert.Null(profits.Of(0, Friday));
        Assert.Null(profits.Of(tree.IndexOf("B"), Friday));
    }

    [Fact]
    public void HasSeries_of_a_node_needs_a_row_of_its_own_or_a_series_of_every_child()
    {
        var (profits, tree) = Read(Firm().Profit(Friday, "A", 100).Profit(s_thursday, "B", 1).Profit(s_thursday, "LN", null).Profit(Friday, "NOWHERE", 1));

        Assert.Equal(["NY", "A", "B"], Enumerable.Range(0, 5).Where(profits.HasSeries).Select(n => tree.Books[n].Name).OrderBy(n => n != "NY"));
        Assert.False(profits.HasSeries(tree.IndexOf("LN")));
        Assert.False(profits.HasSeries(0));
    }
}
