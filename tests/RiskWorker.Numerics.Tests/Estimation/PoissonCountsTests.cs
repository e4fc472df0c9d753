using RiskWorker.Numerics.Estimation;
using RiskWorker.Numerics.Random;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Estimation;

public sealed class PoissonCountsTests
{
    // P(N ≤ k) by mpmath in 40 digits; scipy agrees to 2e-15.
    [Theory]
    [InlineData(0.02, 0, 0.9801986733067553)]
    [InlineData(0.02, 1, 0.9998026467728904)]
    [InlineData(0.02, 2, 0.9999986865075517)]
    [InlineData(0.02, 4, 0.999999999973774)]
    [InlineData(0.9, 0, 0.4065696597405991)]
    [InlineData(0.9, 1, 0.7724823535071383)]
    [InlineData(0.9, 3, 0.9865412793605638)]
    [InlineData(0.9, 8, 0.9999995234156748)]
    [InlineData(7, 0, 0.0009118819655545162)]
    [InlineData(7, 3, 0.08176541624472163)]
    [InlineData(7, 7, 0.5987138355230367)]
    [InlineData(7, 20, 0.9999855046583893)]
    [InlineData(20, 0, 2.061153622438558e-09)]
    [InlineData(20, 10, 0.010811718826652723)]
    [InlineData(20, 20, 0.5590925842313252)]
    [InlineData(20, 40, 0.9999745736817659)]
    public void AtMost_equals_the_sum_in_forty_digits(double mean, int k, double expected) =>
        Assert.Equal(expected, new PoissonCounts(mean).AtMost[k], 1e-14);

    [Fact]
    public void Of_every_length_and_alignment_equals_the_scalar_form()
    {
        var numbers = new SeededNumbers(21);
        foreach (var mean in new[] { 0, 0.01, 0.9, 7, 20 })
        {
            var poisson = new PoissonCounts(mean);
            for (int length = 0; length <= 257; length++)
            {
                var source = new GuardedBuffer<double>(length, -1, length % 7);
                var destination = new GuardedBuffer<double>(length, -1, length % 3);
                for (int i = 0; i < length; i++)
                    source.Span[i] = i % 5 == 0 ? 1 - (1e-15 * numbers.Unit()) : numbers.Unit();
                poisson.Of(source.Span, destination.Span);
                for (int i = 0; i < length; i++)
                    BitAssert.Equal(poisson.Of(source.Span[i]), destination.Span[i], $"mean {mean}, u {source.Span[i]:R}:");
                destination.AssertIntact();
            }
        }
    }

    [Fact]
    public void Of_a_uniform_is_the_smallest_count_that_reaches_it()
    {
        var poisson = new PoissonCounts(1.7);
        for (var k = 0; k < poisson.AtMost.Length - 1; k++)
        {
            Assert.Equal(k, poisson.Of(poisson.AtMost[k]));
            if (poisson.AtMost[k + 1] > poisson.AtMost[k]) Assert.Equal(k + 1, poisson.Of(Math.BitIncrement(poisson.AtMost[k])));
        }
        Assert.Equal(0, poisson.Of(1e-300));
        Assert.Equal(0, poisson.Of(double.NaN));
        double[] counts = new double[8];
        poisson.Of(Enumerable.Repeat(double.NaN, 8).ToArray(), counts);
        Assert.All(counts, c => Assert.Equal(0, c));
    }

    [Fact]
    public void Of_a_mean_of_zero_is_always_zero()
    {
        var none = new PoissonCounts(0);
        Assert.Equal(0, none.Of(1 - 1e-16));
        Assert.Equal(0, none.Of(0.5));
    }

    // Standard errors of n draws: mean √(m/n), variance √((m + 2m²)/n).
    [Theory]
    [InlineData(0.02)]
    [InlineData(0.7)]
    [InlineData(6)]
    [InlineData(20)]
    public void Of_uniform_draws_has_the_mean_and_variance_of_the_distribution(double mean)
    {
        const int n = 400_000;
        double[] first = new double[n], second = new double[n];
        UniformDraws.FillPair(new(3, DrawPurpose.Jumps, 0), 0, 0, first, second);
        var poisson = new PoissonCounts(mean);

        poisson.Of(first, first);

        Assert.Equal(mean, first.Average(), 4 * Math.Sqrt(mean / n));
        Assert.Equal(mean, first.Average(x => (x - mean) * (x - mean)), 4 * Math.Sqrt((mean + (2 * mean * mean)) / n));
        for (var k = (int)mean; k < mean + 2; k++)
        {
            var p = poisson.AtMost[k];
            Assert.Equal(p, first.Count(x => x <= k) / (double)n, 4 * Math.Sqrt(p * (1 - p) / n));
        }
    }

    [Fact]
    public void Of_a_span_allocates_nothing()
    {
        var poisson = new PoissonCounts(3);
        double[] u = new SeededNumbers(4).Between(0, 1, 1000), counts = new double[1000];
        Assert.Equal(0, Allocations.FewestOf(() => poisson.Of(u, counts)));
    }

    [Fact]
    public void Faulty_arguments_are_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => new PoissonCounts(-0.1));
        Assert.Throws<ArgumentOutOfRangeException>(() => new PoissonCounts(20.5));
        Assert.Throws<ArgumentOutOfRangeException>(() => new PoissonCounts(double.NaN));
        var memory = new double[20];
        Assert.Throws<ArgumentException>(() => new PoissonCounts(1).Of(memory.AsSpan(0, 9), memory.AsSpan(10, 8)));
        Assert.Throws<ArgumentException>(() => new PoissonCounts(1).Of(memory.AsSpan(0, 9), memory.AsSpan(1, 9)));
    }
}
