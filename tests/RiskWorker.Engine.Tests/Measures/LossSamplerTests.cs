using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Limits;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Reductions;
using RiskWorker.Engine.Tests.Plans;

namespace RiskWorker.Engine.Tests.Measures;

/// <summary>The tails of whole runs against plain sorting of every loss.</summary>
public sealed class LossSamplerTests
{
    // The last block is short.
    private const int Scenarios = 30_000;
    private static readonly decimal[] s_levels = [0.95m, 0.99m, LimitEvaluator.LevelOfEachOfTwo(0.99m)];
    private static readonly decimal[] s_confidences = [0.95m, 0.975m, 0.99m, 0.999m, 0.99987m];

    [Fact]
    public void Tails_by_cutoff_equal_the_sorted_losses_of_all_scenarios_ties_included()
    {
        var book = CompiledBook.Of(MixedBook.Whole().Build(), 1, 10);
        Assert.Equal(12, book.Plan.Rows.Count);
        AssertEqualsSorted(book, Scenarios);
    }

    // The pilot itself ends inside a block, or is the whole run.
    [Theory]
    [InlineData(900)]
    [InlineData(4_096)]
    [InlineData(10_000)]
    [InlineData(16_384)]
    [InlineData(16_385)]
    public void Tails_by_cutoff_equal_the_sorted_losses_of_a_run_not_longer_than_the_pilot(int scenarios) =>
        AssertEqualsSorted(CompiledBook.Of(MixedBook.Whole().Build(), 1, 10), scenarios);

    [Fact]
    public void Riskless_book_has_nothing_but_ties_and_keeps_none_of_them()
    {
        var book = CompiledBook.Of(MixedBook.Holding(new("ALL", "EUR-CASH", 1_000), new("EUROPE", "EUR-CASH", 5)).Build(), 1);
        var (record, series) = AssertEqualsSorted(book, Scenarios);
        foreach (var row in new[] { book.RowOf("ALL"), book.RowOf("EUROPE") })
        {
            Assert.Empty(record.SortedTail(row));
            Assert.Equal(Scenarios, record.EqualTo(row));
            Assert.Equal((0.0, 0.0), (series[row].Var(new(0.99m)), series[row].ExpectedShortfall(new(0.975m))));
        }
    }

    // A long call so far out of the money that nearly every scenario loses the whole premium and no more.
    [Fact]
    public void Capped_book_has_its_whole_tail_at_the_cap()
    {
        var snapshot = MixedBook.Holding(new Domain.Books.Position("EUROPE", "EQ-LAST-DAY", 2)).Build();
        var option = (Domain.Instruments.Option)snapshot.Instruments["EQ-LAST-DAY"];
        snapshot = snapshot with { Instruments = new Dictionary<string, Domain.Instruments.Instrument> { [option.Name] = option with { Strike = 99 } } };
        var book = CompiledBook.Of(snapshot, 1);
        var (record, series) = AssertEqualsSorted(book, Scenarios);
        var row = book.RowOf("EUROPE");
        Assert.Empty(record.SortedTail(row));
        Assert.InRange(record.EqualTo(row), Scenarios / 10, Scenarios / 3); // P(EQ < 99) = Phi(-0.84) or so
        Assert.Equal((2.0, 2.0), (series[row].Var(new(0.99m)), series[row].ExpectedShortfall(new(0.975m))));
    }

    // Planned for 1,600,000 scenarios, where an interval at a level of 1 - 1e-24 needs 0.019% of the sample, and looked at after
    // 20,000, where the same interval reaches to 0.16%: far below the cutoff.
    [Fact]
    public void Cutoff_that_turns_out_too_high_is_lowered_and_the_tail_drawn_again()
    {
        const int Few = 20_000, Many = 1_600_000;
        var book = CompiledBook.Of(MixedBook.Whole().Build(), 1);
        var level = 1 - 1e-24m;
        var demand = new TailDemand([new(MeasureKind.Var, new(0.9999m), new(1))], [level]);
        var blocksDrawn = 0;
        var sampler = new LossSampler(book.Plan, 2, demand, Many, _ => Interlocked.Increment(ref blocksDrawn), CancellationToken.None);
        var pilot = Volatile.Read(ref blocksDrawn);
        var (_, series) = sampler.Look(Few);
        var losses = book.Losses(Few);
        for (var row = 0; row < series.Count; row++)
        {
            var sorted = new SortedLosses(losses[row]);
            for (var rank = 1; rank <= demand.DeepestRank(Few); rank++) Assert.Equal(sorted.Largest(rank), series[row].AtRank(rank));
            Assert.Equal(sorted.VarInterval(0.9999m, level), series[row].VarInterval(new(0.9999m), level));
        }
        // One block lies beyond the pilot: once for the first cutoffs, and again for each lowering.
        Assert.True(blocksDrawn - pilot >= 2, $"{blocksDrawn - pilot} blocks were drawn beyond the pilot");
    }

    private static (TailRecord Record, IReadOnlyList<SampledLoss> Series) AssertEqualsSorted(CompiledBook book, int scenarios)
    {
        var measures = s_confidences.SelectMany(c => new MeasureSpec[] { new(MeasureKind.Var, new(c), new(1)), new(MeasureKind.Es, new(c), new(1)) });
        var (record, series) = new LossSampler(book.Plan, 2, new(measures, s_levels), scenarios, null, CancellationToken.None).Look(scenarios);
        var losses = book.Losses(scenarios);
        Assert.Equal(scenarios, record.Count);
        for (var row = 0; row < losses.Length; row++)
        {
            Assert.InRange(record.SortedTail(row).Length, 0, scenarios < LossSampler.PilotScenarios / 4 ? scenarios : scenarios / 5);
            foreach (var entry in record.SortedTail(row)) Assert.Equal(losses[row][entry.Scenario], entry.Loss);
            foreach (var confidence in s_confidences) AssertMeasures(new(losses[row]), series[row], confidence);
            AssertSums(losses[row], record, row, losses.Length);
        }
        return (record, series);
    }

    private static void AssertMeasures(SortedLosses sorted, SampledLoss series, decimal alpha)
    {
        var confidence = new Confidence(alpha);
        Assert.Equal(sorted.Var(alpha), series.Var(confidence));
        // Sums of up to 1,500 losses, added in another order: n u times the mean of their sizes (Higham 2002, section 4.2).
        var tolerance = 1_500 * Math.ScaleB(1, -53) * Math.Abs(sorted.Largest(1));
        Assert.Equal(sorted.Shortfall(alpha), series.ExpectedShortfall(confidence), tolerance);
        foreach (var level in s_levels)
        {
            Assert.Equal(sorted.VarInterval(alpha, level), series.VarInterval(confidence, level));
            var (expected, actual) = (sorted.ShortfallInterval(alpha, level), series.ExpectedShortfallInterval(confidence, level));
            Assert.Equal(expected.Low, actual.Low, 10 * tolerance);
            Assert.Equal(expected.High, actual.High, 10 * tolerance);
        }
    }

    private static void AssertSums(double[] losses, TailRecord record, int row, int rows)
    {
        var sums = record.Sums.Total();
        Assert.Equal(losses.Sum(), sums[row], 1e-13 * losses.Sum(Math.Abs));
        Assert.Equal(losses.Sum(l => l * l), sums[rows + row], 1e-13 * losses.Sum(l => l * l));
        Assert.Equal(losses.Length, record.Histogram(row).Sum());
    }
}
