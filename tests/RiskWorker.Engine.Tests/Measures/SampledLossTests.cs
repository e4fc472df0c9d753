using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Measures;
using RiskWorker.Engine.Reductions;

namespace RiskWorker.Engine.Tests.Measures;

/// <summary>Tails by cutoff against the plain way: sort all losses and read ranks, as the definitions of VaR and expected shortfall say.</summary>
public sealed class SampledLossTests
{
    private static double[] Losses(int count, int seed, int distinct)
    {
        var random = new Random(seed);
        return [.. Enumerable.Range(0, count).Select(_ => distinct == 0 ? random.NextDouble() * 200 - 100 : random.Next(distinct))];
    }

    private static SampledLoss Cut(double[] losses, double cutoff) => new(losses.Length,
        [.. losses.Select((l, i) => new TailEntry(l, i)).Where(t => t.Loss > cutoff).OrderByDescending(t => t.Loss).ThenBy(t => t.Scenario)],
        cutoff, losses.Count(l => l == cutoff));

    [Theory]
    [InlineData(1_000, 0)]
    [InlineData(1_037, 0)]
    [InlineData(1_000, 7)]
    [InlineData(1_000, 1)]
    public void Tails_by_cutoff_equal_the_sorted_losses_ties_included(int count, int distinct)
    {
        foreach (var level in new[] { 0.99m, 0.975m, 0.95m, 0.9m })
        {
            var losses = Losses(count, 11, distinct);
            var sorted = losses.Order().ToArray();
            var confidence = new Confidence(level);
            var whole = (int)decimal.Floor(count * (1 - level));
            var fraction = (double)((count * (1 - level)) - whole);
            var var = sorted[(int)decimal.Ceiling(count * level) - 1];
            var shortfall = (sorted[^whole..].Sum() + (fraction > 0 ? fraction * sorted[^(whole + 1)] : 0)) / (double)(count * (1 - level));
            foreach (var cutoff in new[] { double.NegativeInfinity, sorted[count / 2], sorted[(int)(count * 0.85)] })
            {
                var sample = Cut(losses, cutoff);
                Assert.Equal(var, sample.Var(confidence));
                Assert.Equal(shortfall, sample.ExpectedShortfall(confidence), 1e-12 * Math.Abs(shortfall) + 1e-12);
            }
        }
    }

    [Fact]
    public void Figures_do_not_depend_on_where_the_cutoff_lies()
    {
        var losses = Losses(2_000, 5, 0);
        var confidence = new Confidence(0.975m);
        var (whole, cut) = (Cut(losses, double.NegativeInfinity), Cut(losses, losses.Order().ElementAt(1_900)));
        Assert.Equal(whole.ExpectedShortfall(confidence), cut.ExpectedShortfall(confidence));
        Assert.Equal(whole.ExpectedShortfallInterval(confidence, 0.95m), cut.ExpectedShortfallInterval(confidence, 0.95m));
        Assert.Equal(whole.VarInterval(confidence, 0.95m), cut.VarInterval(confidence, 0.95m));
    }

    // Acerbi and Tasche (2002): with 40 losses at 97.5% exactly one loss is the tail; with 30 it is three quarters of one.
    [Theory]
    [InlineData(40, 40.0)]
    [InlineData(30, 30.0)]
    [InlineData(60, 59.666666666666664)]
    public void Expected_shortfall_weights_the_boundary_loss_by_the_fraction_needed(int count, double expected) =>
        Assert.Equal(expected, Cut([.. Enumerable.Range(1, count).Select(i => (double)i)], double.NegativeInfinity).ExpectedShortfall(new(0.975m)), 1e-13 * expected);

    // Decimal arithmetic: 100 losses at 99% have the rank 99, though 100 * 0.99 in binary is not 99.
    [Fact]
    public void Var_takes_its_rank_in_decimal_arithmetic() =>
        Assert.Equal(99.0, Cut([.. Enumerable.Range(1, 100).Select(i => (double)i)], double.NegativeInfinity).Var(new(0.99m)));

    [Fact]
    public void Interval_has_no_lower_or_upper_end_where_the_rank_lies_outside_the_sample()
    {
        var (_, high) = Cut([.. Enumerable.Range(1, 100).Select(i => (double)i)], double.NegativeInfinity).VarInterval(new(0.99m), 0.95m);
        Assert.Null(high);
    }

    [Fact]
    public void AtRank_refuses_a_rank_below_the_cutoff() =>
        Assert.Throws<ArgumentOutOfRangeException>(() => Cut(Losses(100, 1, 0), 90).AtRank(60));

    // A riskless book: every loss is 0, the cutoff too, and nothing is kept.
    [Fact]
    public void Constant_losses_give_the_constant_with_no_width()
    {
        var sample = Cut(new double[1_000], 0);
        Assert.Equal(0, sample.Var(new(0.99m)));
        Assert.Equal(0, sample.ExpectedShortfall(new(0.975m)));
        Assert.Equal((0, 0), sample.ExpectedShortfallInterval(new(0.975m), 0.95m));
        Assert.Equal((0, 0), sample.VarInterval(new(0.9m), 0.95m));
    }
}
