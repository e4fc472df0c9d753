using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>
/// Expected shortfall at liquidity horizons (Basel Committee, MAR33.4: the root of the sum of squares over nested sets of factors) on normal
/// losses, where the cascade of independent factors is that of a loss in which each factor moves over its own horizon.
/// </summary>
public sealed class LiquidityCascadesTests
{
    // phi(z)/(1 - c) at 97.5% with z = Phi^-1(0.975): expected shortfall of a standard normal (McNeil, Frey and Embrechts 2015, example 2.11).
    private const double NormalShortfall = 2.3378027922014;

    private static readonly MeasureSpec s_les = new(MeasureKind.Les, new(0.975m), new(10));
    private static readonly MeasureSpec s_es = new(MeasureKind.Es, new(0.975m), new(10));

    [Fact]
    public void Independent_factors_move_over_their_own_horizons()
    {
        var measured = Measure(Book(10, 60), s_les);
        var exact = NormalShortfall * Math.Sqrt((10 * 3.0 * 3.0) + (60 * 2.0 * 2.0));
        Assert.InRange(measured.Value, exact * 0.99, exact * 1.01);
        Assert.InRange(exact, measured.Low!.Value, measured.High!.Value);
    }

    // Weights of one long step or of several short ones are the same: (60 - 10)/10 = (20 - 10)/10 + (40 - 20)/10 + (60 - 40)/10.
    [Fact]
    public void Steps_between_change_nothing_where_the_same_factors_move()
    {
        var still = NormalBook.Normal("C", liquidityDays: 20);
        var book = Book(10, 60);
        var between = new NormalBook([.. book.Factors, still, still with { Name = "D", LiquidityDays = 40 }]) { Deviations = [.. book.Deviations, 0, 0], Settings = book.Settings };
        var (one, several) = (Measure(book, s_les).Value, Measure(between, s_les).Value);
        Assert.InRange(several / one, 1 - 1e-12, 1 + 1e-12);
    }

    [Theory]
    [InlineData(null)]
    [InlineData(1)]
    [InlineData(10)]
    public void Horizons_up_to_the_base_count_as_the_base(int? days)
    {
        var results = Book(days, days).Results().Nodes[0].Measures;
        Assert.Equal(results.Single(m => m.Spec == s_es).Value, results.Single(m => m.Spec == s_les).Value, 1e-9);
    }

    [Fact]
    public void Interval_is_at_least_that_of_the_base()
    {
        var results = Book(10, 60).Results().Nodes[0].Measures;
        var (es, les) = (results.Single(m => m.Spec == s_es), results.Single(m => m.Spec == s_les));
        Assert.True((les.High - les.Low) / les.Value > 0.9 * ((es.High - es.Low) / es.Value));
        Assert.Equal(es.Level, les.Level);
    }

    private static NormalBook Book(int? first, int? second) => new(NormalBook.Normal("A", liquidityDays: first), NormalBook.Normal("B", liquidityDays: second))
    {
        Deviations = [3, 2],
        Settings = new() { Measures = [s_es, s_les], Simulation = new() { Scenarios = 200_000 } },
    };

    private static MeasureResult Measure(NormalBook book, MeasureSpec spec) => book.Results().Nodes[0].Measures.Single(m => m.Spec == spec);
}
