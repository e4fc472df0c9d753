namespace RiskWorker.Engine.Tests.Models;

/// <summary>
/// Over 200 seeds the intervals of VaR and ES cover the exact value as often as their level says, within three binomial standard errors: under every
/// law that is simulated, one position in one factor. <c>coverage</c> of the benchmarks takes 1,000 seeds.
/// </summary>
public sealed class IntervalCoverageTests
{
    private const int Seeds = 200, Scenarios = 8_000;

    private static readonly double s_allowed = 3 * Math.Sqrt(0.95 * 0.05 * Seeds);

    public static TheoryData<string> Names => [.. CoverageCase.All.Select(c => c.Name)];

    [Theory]
    [MemberData(nameof(Names))]
    public void Interval_covers_the_exact_value_as_often_as_it_says(string name)
    {
        var @case = CoverageCase.All.Single(c => c.Name == name);
        var (var, es) = @case.Covered(Seeds, Scenarios);
        // An interval that ends on an atom covers it whole: more often than its level is no fault.
        Assert.InRange(var, (0.95 * Seeds) - s_allowed, @case.IsAtom ? Seeds : (0.95 * Seeds) + s_allowed);
        Assert.InRange(es, (0.95 * Seeds) - s_allowed, (0.95 * Seeds) + s_allowed);
        Assert.True(var < Seeds || @case.IsAtom, "no interval missed the VaR: it says too little");
    }

    // What the check could see: intervals of half the width cover 67%.
    [Fact]
    public void Value_three_errors_away_is_covered_by_few()
    {
        var @case = CoverageCase.All[2];
        Assert.InRange((@case with { Var = 1.1 * @case.Var, Es = 1.1 * @case.Es }).Covered(50, Scenarios).Var, 0, 30);
    }
}
