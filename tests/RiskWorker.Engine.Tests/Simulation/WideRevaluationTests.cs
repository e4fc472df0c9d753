using RiskWorker.Domain.Books;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.Numerics.Random;
using RiskWorker.TestKit;

namespace RiskWorker.Engine.Tests.Simulation;

/// <summary>
/// Losses of every kind of instrument against its value at the scenario's levels, found apart from the plan: each option is made
/// anew for the moved level, each curve read at the moved rates.
/// </summary>
public sealed class WideRevaluationTests
{
    public static TheoryData<string> InstrumentNames => [.. WideBook.Instruments.Select(i => i.Name)];

    [Theory]
    [MemberData(nameof(InstrumentNames))]
    public void Losses_of_one_position_are_the_change_of_its_value(string instrument)
    {
        var book = CompiledBook.Of(WideBook.Holding(new Position("HOME", instrument, 3)).Build(), 1, 10);
        var losses = book.Losses(40);
        var closes = new ClosingLevels(book.Snapshot);
        var binder = new InstrumentBinder("EUR", book.Model.Factors, closes);
        Assert.Null(binder.Bind(book.Snapshot.Instruments[instrument], WideBook.AsOf, out var bound));
        var today = bound!.Value(book.Model.Levels) * binder.Currencies.RateOf(bound.Currency, book.Model.Levels);
        foreach (var days in new[] { 1, 10 })
        {
            for (var scenario = 0; scenario < 40; scenario++)
            {
                var levels = Levels(book, scenario, days);
                var moved = bound.Value(levels) * binder.Currencies.RateOf(bound.Currency, levels);
                Assert.Equal(-3 * (moved - today), losses[book.RowOf("HOME", days)][scenario], 1e-10 * (1 + Math.Abs(today)));
            }
        }
    }

    [Fact]
    public void Scenario_without_a_move_loses_exactly_nothing()
    {
        var snapshot = WideBook.Whole().Build();
        var book = CompiledBook.Of(snapshot with { Covariance = [.. snapshot.Covariance.Select(c => c with { Value = 0 })] }, 1, 10);
        Assert.All(book.Losses(20), row => Assert.All(row, loss => Assert.Equal(0, loss)));
    }

    [Fact]
    public void Width_of_a_tile_changes_no_bit()
    {
        var book = CompiledBook.Of(WideBook.Whole().Build(), 1, 10);
        var expected = book.Losses(60);
        var losses = new double[book.Plan.Rows.Count * 60];
        var tile = new ScenarioTile(book.Plan);
        for (var first = 0; first < 60; first += 7) tile.Evaluate(first, Math.Min(7, 60 - first), losses, first, 60);
        for (var row = 0; row < expected.Length; row++) BitAssert.Equal(expected[row], losses.AsSpan(row * 60, 60));
    }

    private static double[] Levels(CompiledBook book, int scenario, int days)
    {
        var model = book.Model;
        var stream = new DrawStream(book.Plan.Seed, DrawPurpose.FactorMoves, 0);
        double[] draws = [.. Enumerable.Range(0, model.Rank).Select(j => NormalDraws.At(stream, (ulong)scenario, (uint)j))];
        double[] levels = [.. model.Levels];
        for (var row = 0; row < model.Moving.Length; row++)
        {
            var factor = model.Moving[row];
            var normal = draws.Select((e, j) => model.Lower[(row * model.Rank) + j] * e).Sum();
            var move = (model.DailyDrift[factor] * days) + (model.Deviations[factor] * Math.Sqrt(days) * normal);
            levels[factor] = model.Factors[factor].Shock == ShockKind.Lognormal ? levels[factor] * Math.Exp(move) : levels[factor] + move;
        }
        return levels;
    }
}
