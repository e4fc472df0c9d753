using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using RiskWorker.Numerics.Kernels;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

public sealed class BacktestTestsTests
{
    [Fact]
    public void Of_a_year_has_every_test_in_order_with_its_source()
    {
        var tests = BacktestTests.Of(Year(21), new());
        Assert.Equal(StatisticalTestNames.All, tests.Select(t => t.Name));
        Assert.All(tests, t => Assert.NotEmpty(t.Source));
        Assert.All(tests, t => Assert.Equal(t.PValue is null, t.Method is null));
        Assert.All(tests.Where(t => t.Name != StatisticalTestNames.AttributionSpearman), t => Assert.NotNull(t.Reject));
    }

    [Fact]
    public void Of_exceptions_alone_says_of_the_others_why_they_are_not_assessed()
    {
        var tests = BacktestTests.Of(new() { Confidence = C99, Exceptions = On(250, 10, 90, 91) }, new());
        Assert.Equal(StatisticalTestNames.All.Take(6), tests.Where(t => t.Reject is not null).Select(t => t.Name));
        Assert.All(tests.Skip(6), t => Assert.NotEmpty(t.Note));
    }

    [Fact]
    public void Of_a_year_does_not_depend_on_what_laws_were_known_before()
    {
        var used = new NullLaws();
        for (ulong seed = 30; seed < 34; seed++) BacktestTests.Of(Year(seed), used);
        Assert.Equal(BacktestTests.Of(Year(22), new()), BacktestTests.Of(Year(22), used));
    }

    [Fact]
    public void Of_the_same_books_side_by_side_is_the_same()
    {
        var laws = new NullLaws();
        var books = new IReadOnlyList<StatisticalTest>[8];
        Parallel.For(0, books.Length, b => books[b] = BacktestTests.Of(Year(40 + (ulong)(b / 2)), laws));
        for (var b = 0; b < books.Length; b += 2) Assert.Equal(books[b], books[b + 1]);
    }

    [Fact]
    public void Figures_have_twelve_digits() => Assert.All(BacktestTests.Of(Year(23), new()), t =>
    {
        Assert.Equal(t.Statistic is { } s ? Significant.Of(s) : null, t.Statistic);
        Assert.Equal(t.PValue is { } p ? Significant.Of(p) : null, t.PValue);
    });

    private static EvidenceSeries Year(ulong seed)
    {
        double[] u = [.. Uniforms(seed, 250).Select(x => Math.Pow(x, 1.2))];
        var (var, shortfall) = (-InverseNormal.Of(0.025), NormalDensity.Of(InverseNormal.Of(0.025)) / 0.025);
        double[] profits = [.. u.Select(x => InverseNormal.Of(x))];
        return new()
        {
            Confidence = C975,
            Exceptions = [.. u.Select(x => x < 0.025)],
            Shortfall = [.. profits.Select(x => new ShortfallDay(x, var, shortfall, InverseNormal.Of))],
            Transforms = u,
            Hypothetical = profits,
            RiskTheoretical = [.. profits.Select(x => x * 1.1)],
        };
    }
}
