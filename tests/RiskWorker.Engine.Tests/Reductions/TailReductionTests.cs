using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Simulation;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Reductions;

public sealed class TailReductionTests
{
    private const int Scenarios = (13 * Blocks.Size) + 777;
    private static readonly CompiledBook s_book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);

    // Cutoffs at the median of a few losses; one of them is a loss itself, so that there is a tie to count.
    private static readonly TailReduction s_reduction = ReductionOf(s_book.Losses(1_001));

    [Fact]
    public void Record_gives_the_same_answers_for_any_split_into_ranges_merged_in_any_order()
    {
        var evaluator = new BlockEvaluator(s_book.Plan, 2);
        var all = BlockRange.From(0, Scenarios);
        var expected = evaluator.Evaluate(all, s_reduction, null, CancellationToken.None);
        Assert.Contains(Enumerable.Range(0, s_book.Plan.Rows.Count), row => expected.EqualTo(row) > 0);
        for (var seed = 0; seed < 8; seed++)
        {
            var random = new Random(seed);
            var cuts = Enumerable.Range(0, 1 + random.Next(5)).Select(_ => random.Next(all.End + 1)).Append(0).Append(all.End).Order().ToArray();
            var ranges = cuts.Zip(cuts.Skip(1), (first, end) => new BlockRange(first, end, Scenarios)).ToArray();
            random.Shuffle(ranges);
            var merged = s_reduction.Empty();
            foreach (var range in ranges) s_reduction.Merge(merged, evaluator.Evaluate(range, s_reduction, null, CancellationToken.None));
            AssertSame(expected, merged);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(7)]
    public void Record_does_not_depend_on_the_number_of_threads(int threads)
    {
        var all = BlockRange.From(0, Scenarios);
        AssertSame(new BlockEvaluator(s_book.Plan, 2).Evaluate(all, s_reduction, null, CancellationToken.None), new BlockEvaluator(s_book.Plan, threads).Evaluate(all, s_reduction, null, CancellationToken.None));
    }

    [Fact]
    public void SortedTail_breaks_ties_by_scenario_number()
    {
        var reduction = new TailReduction([1.0], [new(0, 4)]);
        var record = reduction.Empty();
        reduction.Accumulate(record, BlockOf(1, [3, 1, 2, 3]));
        reduction.Accumulate(record, BlockOf(0, [2, 3, 0, 1]));
        Assert.Equal([new(3, 1), new(3, 4096), new(3, 4099), new(2, 0), new(2, 4098)], record.SortedTail(0));
        Assert.Equal(2, record.EqualTo(0));
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    public void Accumulate_refuses_a_loss_that_is_no_finite_number(double loss)
    {
        var reduction = new TailReduction([1.0], [new(0, 4)]);
        var fault = Assert.Throws<NotFiniteNumberException>(() => reduction.Accumulate(reduction.Empty(), BlockOf(2, [0, loss, 2])));
        Assert.Contains("series 0 among scenarios 8192 to 8194", fault.Message, StringComparison.Ordinal);
    }

    private static LossBlock BlockOf(int index, double[] losses)
    {
        var values = new double[Blocks.Size];
        losses.CopyTo(values, 0);
        return new(index, losses.Length, values);
    }

    private static TailReduction ReductionOf(double[][] losses) =>
        new([.. losses.Select(l => l.Order().ElementAt(900))], [.. losses.Select(l => HistogramEdges.Holding(l))]);

    private static void AssertSame(TailRecord expected, TailRecord actual)
    {
        Assert.Equal(expected.Count, actual.Count);
        Assert.Equal(expected.Sums.Total(), actual.Sums.Total());
        for (var row = 0; row < s_book.Plan.Rows.Count; row++)
        {
            Assert.Equal(expected.SortedTail(row), actual.SortedTail(row));
            Assert.Equal(expected.EqualTo(row), actual.EqualTo(row));
            Assert.Equal(expected.Histogram(row), actual.Histogram(row));
        }
    }
}
