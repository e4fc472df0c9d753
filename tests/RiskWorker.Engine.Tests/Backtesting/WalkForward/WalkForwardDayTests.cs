using RiskWorker.Domain.Books;
using RiskWorker.Domain.Evidence;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting;
using RiskWorker.Engine.Backtesting.WalkForward;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Models;

namespace RiskWorker.Engine.Tests.Backtesting.WalkForward;

/// <summary>A day of a walk-forward against the run that the same close would have had, and against revaluation at the next close.</summary>
public sealed class WalkForwardDayTests
{
    private const int Scenarios = 6_000;

    private static readonly Confidence s_99 = new(0.99m);
    private static readonly Confidence s_975 = new(0.975m);

    [Theory]
    [InlineData("lognormal")]
    [InlineData("student-given")]
    [InlineData("historical")]
    [InlineData("filtered")]
    [InlineData("jumps-given")]
    public void Figures_are_those_of_a_run_on_that_close_to_the_bit(string model)
    {
        var (whole, known, next) = Close(model);
        var day = Day(whole, known, next);
        var run = new RunCalculator(known, 2, null, CancellationToken.None).Calculate();
        Assert.Equal(run.Nodes.Select(n => n.Book), day.Books.Select(b => b.Book));
        foreach (var (node, book) in run.Nodes.Zip(day.Books))
        {
            Assert.Equal(Measure(node, MeasureKind.Var, s_99), book.Levels.Single(l => l.Confidence == s_99).Var);
            Assert.Equal(Measure(node, MeasureKind.Es, s_975), book.Levels.Single(l => l.Confidence == s_975).Es);
        }
    }

    [Fact]
    public void Theoretical_profit_is_that_of_full_revaluation_at_the_next_close()
    {
        var (whole, known, next) = Close("lognormal");
        var day = Day(whole, known, next);
        var revalued = new HypotheticalProfits(whole, Tree(whole)).From(new(known.AsOf, known.Positions), next).Profit.Books.ToDictionary(b => b.Book, b => b.Amount);
        Assert.All(day.Books, book => Assert.InRange(book.Theoretical!.Value, revalued[book.Book] - 1e-7, revalued[book.Book] + 1e-7));
    }

    // (scenarios at or below + 1/2)/(N + 1), counted here over every scenario of a run that keeps them all in its histogram's tail ranks.
    [Fact]
    public void Probability_lies_where_the_quantiles_put_the_profit()
    {
        var (whole, known, next) = Close("lognormal");
        var run = new RunCalculator(known, 2, null, CancellationToken.None).Calculate();
        foreach (var (node, book) in run.Nodes.Zip(Day(whole, known, next).Books))
        {
            var quantiles = node.Distributions.Single(d => d.Horizon.Days == 1).Quantiles;
            var (below, above) = (quantiles.LastOrDefault(q => q.Profit <= book.Theoretical), quantiles.FirstOrDefault(q => q.Profit > book.Theoretical));
            Assert.InRange(book.PTheoretical!.Value, below.Probability - 0.002, above == default ? 1 : above.Probability + 0.002);
        }
    }

    [Fact]
    public void Order_and_threads_change_no_bit()
    {
        var (whole, known, next) = Close("student-given");
        var day = new WalkForwardDay(whole, Tree(whole), [s_975, s_99]);
        var (one, several) = (new SimulationWorkspace(1), new SimulationWorkspace(3));
        var first = day.Of(known, next, one, CancellationToken.None)!;
        _ = day.Of(known with { Settings = known.Settings with { Simulation = known.Settings.Simulation with { Seed = 9 } } }, next, several, CancellationToken.None);
        var again = day.Of(known, next, several, CancellationToken.None)!;
        foreach (var (a, b) in first.Books.Zip(again.Books))
        {
            Assert.Equal(a.Levels, b.Levels);
            Assert.Equal((a.Theoretical, a.PTheoretical), (b.Theoretical, b.PTheoretical));
            Assert.Equal(a.Tail, b.Tail);
        }
    }

    [Fact]
    public void Too_little_history_gives_no_forecast()
    {
        var (whole, known, next) = Close("lognormal");
        var checks = known.Settings.Checks with { MinimumHistory = 1_000 };
        Assert.Null(new WalkForwardDay(whole, Tree(whole), [s_99]).Of(known with { Settings = known.Settings with { Checks = checks } }, next, new(1), CancellationToken.None));
    }

    [Fact]
    public void Factors_that_cost_most_come_first_and_each_costs()
    {
        var (whole, known, next) = Close("lognormal");
        var factors = new WalkForwardDay(whole, Tree(whole), [s_99]).FactorsOf(known, next, ["ALL"], CancellationToken.None)["ALL"];
        Assert.InRange(factors.Count, 1, 3);
        Assert.All(factors, f => Assert.True(f.Amount < 0));
        Assert.Equal(factors.OrderBy(f => f.Amount), factors);
    }

    private static DayForecast Day(Snapshot whole, Snapshot known, DateOnly next) => new WalkForwardDay(whole, Tree(whole), [s_975, s_99]).Of(known, next, new(2), CancellationToken.None)!;

    private static BookTree Tree(Snapshot snapshot) => BookTree.Build(snapshot.Books).Tree!;

    private static double Measure(NodeResult node, MeasureKind kind, Confidence confidence) =>
        node.Measures.Single(m => m.Spec.Kind == kind && m.Spec.Confidence == confidence && m.Spec.Horizon.Days == 1).Value;

    // The close before the last one, so that there is a next.
    private static (Snapshot Whole, Snapshot Known, DateOnly Next) Close(string model)
    {
        var whole = MixedHistory.Of(model);
        var settings = whole.Settings with { Simulation = new() { Scenarios = Scenarios, Looks = 1, Cap = Scenarios, Revaluation = RevaluationKind.Full }, Measures = [new(MeasureKind.Var, s_99, new(1)), new(MeasureKind.Es, s_975, new(1))] };
        whole = whole with { Settings = settings, Limits = [] };
        var dates = whole.Observations.Dates;
        var close = dates[^2];
        return (whole, whole with { AsOf = close, Observations = whole.Observations.UpTo(close) }, dates[^1]);
    }
}
