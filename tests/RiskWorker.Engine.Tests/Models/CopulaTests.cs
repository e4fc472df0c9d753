using RiskWorker.Engine.Models;
using RiskWorker.Engine.Tests.Plans;
using RiskWorker.Numerics.Distributions;

namespace RiskWorker.Engine.Tests.Models;

/// <summary>A t copula of 4 degrees with margins of 3 and of 8, one day: each factor by its own margin, both together by the copula.</summary>
public sealed class CopulaTests
{
    private const int N = 200_000;

    private static readonly double s_deviation = 0.25 / Math.Sqrt(252);
    private static readonly double[] s_margins = [3, 8];

    [Theory]
    [InlineData("X", 0)]
    [InlineData("Y", 1)]
    public void Each_factor_has_the_tails_of_its_own_margin(string factor, int margin)
    {
        var moves = Moves(0.5)[factor];
        var law = new StudentT(s_margins[margin]);
        foreach (var p in new[] { 0.001, 0.01, 0.05, 0.5, 0.95, 0.99, 0.999 })
        {
            var quantile = law.UnitScale * law.Quantile(p);
            AssertShare(p, moves.Count(m => m <= quantile));
        }
    }

    // P(both at or below their own 5% quantile), whatever the margins: by Gauss-Legendre over the mixing variable and the bivariate normal of SciPy. Independent
    // factors of one mixing variable are at an end together two and a half times as often as 0.25%.
    [Theory]
    [InlineData(0.5, 0.016936960325053)]
    [InlineData(0.0, 0.006384482876242)]
    public void Both_factors_are_low_together_as_often_as_the_copula_says(double correlation, double expected)
    {
        var moves = Moves(correlation);
        double Low(int margin) => new StudentT(s_margins[margin]) is var law ? law.UnitScale * law.Quantile(0.05) : 0;
        AssertShare(expected, moves["X"].Zip(moves["Y"]).Count(m => m.First <= Low(0) && m.Second <= Low(1)));
    }

    private static void AssertShare(double expected, int count)
    {
        var error = Math.Sqrt(expected * (1 - expected) / N);
        Assert.True(Math.Abs(((double)count / N) - expected) <= 4 * error, $"{(double)count / N:r} is {(((double)count / N) - expected) / error:f1} standard errors from {expected:r}");
    }

    // Moves in units of the deviation, read off the losses of one unit of each factor.
    private static Dictionary<string, double[]> Moves(double correlation)
    {
        var snapshot = new SpotBook(new(), 1) { Volatilities = [0.25, 0.25], Values = [1, 1], Correlation = correlation }.Snapshot() with
        {
            Books = [new("ALL", null, "All", "EUR"), new("X", "ALL", "X", "EUR"), new("Y", "ALL", "Y", "EUR")],
            Positions = [new("X", "X-UNIT", 1), new("Y", "Y-UNIT", 1)],
        };
        var book = CompiledBook.Of(snapshot, 1);
        double[] margins = [.. book.Model.Moving.Select(factor => s_margins[factor])];
        var losses = (book with { Plan = book.Plan with { Law = new StudentLaw(4, margins, null, null) } }).Losses(N);
        return new[] { "X", "Y" }.ToDictionary(name => name, name => losses[book.RowOf(name)].Select(loss => (Math.Log(1 - loss) + (s_deviation * s_deviation / 2)) / s_deviation).ToArray());
    }
}
