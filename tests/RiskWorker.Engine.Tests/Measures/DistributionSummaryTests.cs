using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Measures;

public sealed class DistributionSummaryTests
{
    private const int Scenarios = 30_000;

    [Fact]
    public void Quantiles_are_order_statistics_in_the_tail_and_within_a_bin_of_them_elsewhere()
    {
        foreach (var (losses, distribution) in Summaries())
        {
            var profits = losses.Select(l => -l).Order().ToArray();
            var width = (distribution.High - distribution.Low) / HistogramEdges.Bins;
            foreach (var quantile in distribution.Quantiles)
            {
                var expected = profits[(int)decimal.Ceiling(Scenarios * (decimal)quantile.Probability) - 1];
                // Profits outside the bins, which are the pilot's, have no bin to be placed in: they stand at its edge.
                if (quantile.Exact) Assert.Equal(expected, quantile.Profit);
                else Assert.Equal(Math.Clamp(expected, distribution.Low, distribution.High), quantile.Profit, width);
            }
            Assert.Equal(distribution.Quantiles.Select(q => q.Profit).Order(), distribution.Quantiles.Select(q => q.Profit));
            Assert.Equal(distribution.Quantiles.Select(q => q.Probability).Order(), distribution.Quantiles.Select(q => q.Probability));
            Assert.InRange(distribution.Quantiles.Count(q => q.Exact), 20, 60);
            Assert.InRange(distribution.Quantiles.Count, 190, 210);
        }
    }

    [Fact]
    public void Counts_add_up_to_the_scenarios_and_are_those_of_the_bins()
    {
        foreach (var (losses, distribution) in Summaries())
        {
            Assert.Equal(HistogramEdges.Bins + 2, distribution.Counts.Count);
            Assert.Equal(Scenarios, distribution.Counts.Sum());
            Assert.Equal(losses.Count(l => -l < distribution.Low), distribution.Counts[0], 1.0); // a loss on the edge belongs to one side or the other
            Assert.Equal(losses.Count(l => -l > distribution.High), distribution.Counts[^1]);
            var middle = distribution.Low + ((distribution.High - distribution.Low) / 2);
            Assert.Equal(losses.Count(l => -l < middle), distribution.Counts.Take(1 + (HistogramEdges.Bins / 2)).Sum());
        }
    }

    [Fact]
    public void Moments_are_those_of_the_profits()
    {
        foreach (var (losses, distribution) in Summaries())
        {
            var mean = -losses.Average();
            var deviation = Math.Sqrt(losses.Average(l => (-l - mean) * (-l - mean)));
            Assert.Equal(mean, distribution.Mean, 1e-12 * deviation);
            Assert.Equal(deviation, distribution.Deviation, 1e-12 * deviation);
        }
    }

    [Fact]
    public void Constant_profits_lie_in_one_bin_and_have_no_width()
    {
        var book = CompiledBook.Of(MixedBook.Holding(new Domain.Books.Position("EUROPE", "STILL-UNIT", 5)).Build(), 10);
        var row = book.RowOf("EUROPE", 10);
        var profit = -book.Losses(1)[row][0];
        var distribution = SummaryOf(book, row);
        Assert.Equal(Scenarios, distribution.Counts.Max());
        Assert.All(distribution.Quantiles, q => Assert.Equal(profit, q.Profit, Math.Abs(profit) * 1e-11));
        Assert.Equal(profit, distribution.Mean, 1e-12);
    }

    private static IEnumerable<(double[] Losses, ProfitDistribution Distribution)> Summaries()
    {
        var book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
        var losses = book.Losses(Scenarios);
        for (var row = 0; row < losses.Length; row++) yield return (losses[row], SummaryOf(book, row));
    }

    private static ProfitDistribution SummaryOf(CompiledBook book, int row)
    {
        var sampler = new LossSampler(book.Plan, 2, new([new(MeasureKind.Var, new(0.99m), new(1))], [0.95m]), Scenarios, null, CancellationToken.None);
        var (record, series) = sampler.Look(Scenarios);
        var sums = record.Sums.Total();
        return DistributionSummary.Of(new(1), sums[row], sums[book.Plan.Rows.Count + row], record.Histogram(row), sampler.Edges[row], series[row]);
    }
}
