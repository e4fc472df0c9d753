using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Runs;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Runs;

/// <summary>A whole small run, from snapshot to figures, to the last bit: the same on any hardware and any number of threads.</summary>
public sealed class RunBitsTests
{
    // May change only together with the numerics epoch.
    private const string Pinned = "4b9cb184cde4c0c2db6b464ad2e2548d3940bf0018b4bac8739bdf443977032a";

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(7)]
    public void Figures_of_the_mixed_book_are_pinned_for_any_number_of_threads(int threads)
    {
        var results = Calculated(threads);
        Assert.Equal((20_000, 2), (results.Simulation!.Scenarios, results.Simulation.Looks));
        Assert.Equal(4, results.Nodes.Count);
        Assert.Equal(Pinned, FiguresHash.Of(results));
    }

    // What the figures hash leaves out is the same too: plan, distributions, ends of what limits use.
    [Fact]
    public void Everything_computed_is_the_same_on_one_thread_and_on_seven()
    {
        var (one, seven) = (Calculated(1), Calculated(7));
        Assert.Equal(one.Calibration!.Parameters, seven.Calibration!.Parameters);
        Assert.Equal(one.Calibration with { Parameters = [] }, seven.Calibration with { Parameters = [] });
        Assert.Equal(one.Limits, seven.Limits);
        foreach (var (a, b) in one.Nodes.Zip(seven.Nodes).SelectMany(n => n.First.Distributions.Zip(n.Second.Distributions)))
        {
            Assert.Equal((a.Mean, a.Deviation, a.Low, a.High), (b.Mean, b.Deviation, b.Low, b.High));
            Assert.Equal(a.Counts, b.Counts);
            Assert.Equal(a.Quantiles, b.Quantiles);
        }
    }

    [Fact]
    public void Cancelled_run_has_no_results() =>
        Assert.ThrowsAny<OperationCanceledException>(() => new RunCalculator(MixedBook.Whole().Build(), 2, null, new CancellationToken(true)).Calculate());

    private static RunResults Calculated(int threads)
    {
        var results = new RunCalculator(MixedBook.Whole().Build(), threads, null, CancellationToken.None).Calculate();
        Assert.DoesNotContain(results.Findings, f => f.Severity == FindingSeverity.Blocking);
        return results;
    }
}
