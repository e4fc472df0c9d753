using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Backtesting.Evidence;
using static RiskWorker.Engine.Tests.Backtesting.Evidence.Years;

namespace RiskWorker.Engine.Tests.Backtesting.Evidence;

/// <summary>M. Haas, New methods in backtesting (2001); the sums of whole series are in <see cref="RollingIndexTests"/>.</summary>
public sealed class HaasTestTests
{
    private readonly NullLaws _laws = new();

    [Fact]
    public void Chi_square_tail_of_five_exceptions_is_the_recomputed_one() => // SciPy
        Assert.Equal(0.2967241279557309, Judgement.ChiSquareTail(7.2685526710739, 6), 1e-13);

    [Fact]
    public void Statistic_adds_the_count_and_every_wait()
    {
        var test = HaasTest.Of(On(250, 1, 7, 45), C99, _laws); // waits of 1, 6 and 38 days; 1 and 6 recomputed with SciPy
        var expected = LikelihoodRatios.Failures(250, 3, 0.01) + 9.210340371976182 + 3.904109224115541 + LikelihoodRatios.FirstFailure(38, 0.01);
        Assert.Equal(expected, test.Statistic!.Value, 1e-10);
        Assert.Equal(PValueMethod.Simulated, test.Method);
        Assert.Contains("with 4 degrees of freedom", test.Note, StringComparison.Ordinal);
    }

    [Fact]
    public void Year_without_exception_is_the_count_alone() =>
        Assert.Equal(5.025167926750726, HaasTest.Of(new bool[250], C99, _laws).Statistic!.Value, 1e-11);

    [Fact]
    public void No_day_is_not_assessed() => Assert.Null(HaasTest.Of([], C99, _laws).Reject);

    [Fact]
    public void Duration_of_less_than_two_exceptions_is_not_assessed() =>
        Assert.Equal("Fewer than two exceptions: there is no time between them.", DurationTest.Of(On(250, 9), _laws).Note);
}
