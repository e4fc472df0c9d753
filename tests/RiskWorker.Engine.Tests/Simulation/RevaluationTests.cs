using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Simulation;

/// <summary>Losses of the plan's scenarios against each position worked by hand.</summary>
public sealed class RevaluationTests
{
    // Both sides round some ten operations on numbers of the positions' gross size; 5e-15 of it is 23 roundings.
    private const double Precision = 5e-15;

    public static TheoryData<string> InstrumentNames => [.. MixedBook.Instruments.Select(i => i.Name)];

    [Theory]
    [MemberData(nameof(InstrumentNames))]
    public void Losses_of_one_position_equal_its_value_worked_by_hand(string instrument)
    {
        var book = CompiledBook.Of(MixedBook.Holding(new Position("EUROPE", instrument, 3), new("LONDON", instrument, -2)).Build(), 1, 10);
        AssertLosses(book, 600);
    }

    [Fact]
    public void Losses_of_the_whole_book_equal_the_positions_worked_by_hand() => AssertLosses(CompiledBook.Of(MixedBook.Whole().Build(), 1, 10), 1_000);

    // A node in another currency: V(0)/X(0) - V(h)/X(h), while the roll-up stays in the root's currency.
    [Theory]
    [InlineData("AMERICA", "USD")]
    [InlineData("LONDON", "GBP")]
    public void Losses_in_a_nodes_own_currency_are_the_change_of_its_converted_value(string node, string currency)
    {
        var book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
        var losses = book.Losses(500);
        foreach (var days in new[] { 1, 10 })
        {
            for (var i = 0; i < 500; i++)
            {
                var hand = new HandRevaluation(book, i, days);
                Assert.Equal(hand.LossInCurrency(node, currency), losses[book.RowOf(node, days, own: true)][i], Precision * hand.Gross);
            }
        }
    }

    // 700 EUR seen from London: worth 700/X GBP, which only the rate moves; in EUR nothing moves at all.
    [Fact]
    public void Reporting_currency_cash_in_a_foreign_node_moves_in_the_nodes_currency_alone()
    {
        var book = CompiledBook.Of(MixedBook.Holding(new Position("LONDON", "EUR-CASH", 700)).Build(), 1);
        var losses = book.Losses(300);
        Assert.All(losses[book.RowOf("LONDON")], loss => Assert.Equal(0, loss));
        Assert.All(losses[book.RowOf("ALL")], loss => Assert.Equal(0, loss));
        for (var i = 0; i < 300; i++)
            Assert.Equal((700 / 1.15) - (700 / new HandRevaluation(book, i, 1).LevelOf("GBP")), losses[book.RowOf("LONDON", own: true)][i], Precision * 700);
    }

    [Fact]
    public void Still_factor_moves_by_its_drift_alone_and_alike_in_every_scenario()
    {
        var book = CompiledBook.Of(MixedBook.Holding(new Position("EUROPE", "STILL-UNIT", 5)).Build(), 1, 10);
        var losses = book.Losses(300);
        Assert.DoesNotContain(book.Model.Moving, j => book.Model.Factors[j].Name == "STILL");
        Assert.All(losses[book.RowOf("EUROPE")], loss => Assert.Equal(losses[book.RowOf("EUROPE")][0], loss));
        Assert.Equal(-100 * (Math.Exp(0.1 * 10 / 252) - 1), losses[book.RowOf("EUROPE", 10)][7], Precision * 100);
    }

    // With no variance and no drift nothing moves: base values and scenarios agree to the last bit, so every loss is exactly 0.
    [Fact]
    public void Scenario_without_a_move_loses_exactly_nothing()
    {
        var snapshot = MixedBook.Whole().Build();
        snapshot = snapshot with
        {
            Settings = snapshot.Settings with { Model = snapshot.Settings.Model with { Drift = DriftKind.Zero } },
            Covariance = [.. snapshot.Covariance.Select(c => c with { Value = 0 })],
        };
        var book = CompiledBook.Of(snapshot, 1, 10);
        Assert.Equal(0, book.Model.Rank);
        Assert.All(book.Losses(300), row => Assert.All(row, loss => Assert.Equal(0, loss)));
    }

    // x(h) = x(0) + b h/252 + s sqrt(h) z: the future's loss is linear in the draw, and may carry the factor below zero.
    [Fact]
    public void Factor_of_normal_shocks_moves_by_differences_and_may_turn_negative()
    {
        var book = CompiledBook.Of(MixedBook.Holding(new Position("EUROPE", "RATE-FUTURE", 1)).Build(), 1, 2_520);
        var losses = book.Losses(4_000);
        var (one, years) = (losses[book.RowOf("EUROPE")], losses[book.RowOf("EUROPE", 2_520)]);
        for (var i = 0; i < one.Length; i++)
        {
            var z = (-one[i] / 100_000 - (0.002 / 252)) / 0.0006;
            Assert.Equal(-100_000 * ((0.002 * 10) + (0.0006 * Math.Sqrt(2_520) * z)), years[i], 1e-8);
        }
        Assert.Contains(years, loss => loss > 0.03 * 100_000);
    }

    // One draw serves all horizons: with X = ln(S(1)/S(0)), ln(S(10)/S(0)) = sqrt(10) X + (10 - sqrt(10)) m.
    [Fact]
    public void Horizons_of_one_run_use_the_same_draw()
    {
        var book = CompiledBook.Of(MixedBook.Holding(new Position("EUROPE", "EQ-UNIT", 1)).Build(), 1, 10);
        var losses = book.Losses(1_000);
        var drift = (0.07 / 252) - (0.012 * 0.012 / 2);
        for (var i = 0; i < 1_000; i++)
        {
            double day = Math.Log(1 - (losses[book.RowOf("EUROPE")][i] / 100)), ten = Math.Log(1 - (losses[book.RowOf("EUROPE", 10)][i] / 100));
            Assert.Equal((Math.Sqrt(10) * day) + ((10 - Math.Sqrt(10)) * drift), ten, 1e-14);
        }
    }

    private static void AssertLosses(CompiledBook book, int scenarios)
    {
        var losses = book.Losses(scenarios);
        foreach (var days in new[] { 1, 10 })
        {
            for (var i = 0; i < scenarios; i++)
            {
                var hand = new HandRevaluation(book, i, days);
                var tolerance = Precision * hand.Gross;
                foreach (var node in book.Tree.Books)
                    Assert.Equal(-hand.ProfitOf(node.Name), losses[book.RowOf(node.Name, days)][i], tolerance);
            }
        }
    }
}
