using RiskWorker.Numerics.Distributions;
using RiskWorker.Numerics.Random;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Distributions;

public sealed class MixingDrawsTests
{
    private static readonly MixingQuantile Quantile = new(5);
    private static readonly DrawStream Stream = new(99, DrawPurpose.MixingVariable, 2);

    [Theory]
    [InlineData(new[] { 1 })]
    [InlineData(new[] { 2 })]
    [InlineData(new[] { 1, 10, 20 })]
    [InlineData(new[] { 3, 4, 7 })]
    public void Fill_every_length_equals_the_scalar_form(int[] horizons)
    {
        var draws = new MixingDraws(Quantile, Stream, horizons);
        foreach (int count in new[] { 0, 1, 7, 8, 9, 255, 256, 257, 600 })
        {
            var sums = new GuardedBuffer<double>(count * horizons.Length, -7, count % 5);
            var multipliers = new GuardedBuffer<double>(count * horizons.Length, -7, count % 3);
            draws.FillSums(0xFFFFFF80, sums.Span);
            draws.FillMultipliers(0xFFFFFF80, multipliers.Span);
            for (int i = 0; i < horizons.Length; i++)
            {
                for (int s = 0; s < count; s++)
                {
                    BitAssert.Equal(draws.SumAt(0xFFFFFF80 + (ulong)s, horizons[i]), sums.Span[(i * count) + s]);
                    BitAssert.Equal(draws.MultiplierAt(0xFFFFFF80 + (ulong)s, horizons[i]), multipliers.Span[(i * count) + s]);
                }
            }

            sums.AssertIntact();
            multipliers.AssertIntact();
        }
    }

    [Fact]
    public void SumAt_adds_the_quantiles_of_the_stream_day_by_day()
    {
        var draws = new MixingDraws(Quantile, Stream, [3]);
        double expected = Quantile.Of(UniformDraws.At(Stream, 7, 0)) + Quantile.Of(UniformDraws.At(Stream, 7, 1)) + Quantile.Of(UniformDraws.At(Stream, 7, 2));
        BitAssert.Equal(expected, draws.SumAt(7, 3));
        Assert.Equal(Math.Sqrt(expected * 3 / 5), draws.MultiplierAt(7, 3), 1e-15);
    }

    [Fact]
    public void FillSums_split_into_ranges_gives_the_same_bits()
    {
        var draws = new MixingDraws(Quantile, Stream, [1, 5]);
        double[] whole = new double[2 * 700];
        draws.FillSums(40, whole);
        foreach ((int start, int length) in new[] { (0, 13), (13, 300), (313, 387) })
        {
            double[] part = new double[2 * length];
            draws.FillSums(40 + (ulong)start, part);
            BitAssert.Equal(whole.AsSpan(start, length), part.AsSpan(0, length));
            BitAssert.Equal(whole.AsSpan(700 + start, length), part.AsSpan(length, length));
        }
    }

    // At ν = 5 W has mean 5/3 and no fourth moment; at ν = 12 the sum of ten has mean 12 and variance 10·(144/80 - 1.44) = 3.6, so that
    // the mean of 200,000 has standard error √(3.6/2e5). Seed fixed.
    [Fact]
    public void FillSums_mean_and_variance_are_those_of_ten_independent_days()
    {
        const int n = 200_000;
        double[] sums = new double[2 * n];
        new MixingDraws(new(12), Stream, [1, 10]).FillSums(0, sums);
        double mean = sums[n..].Average(), variance = sums[n..].Average(x => (x - mean) * (x - mean));
        Assert.InRange(mean, 12 - (4 * Math.Sqrt(3.6 / n)), 12 + (4 * Math.Sqrt(3.6 / n)));
        Assert.InRange(variance, 3.6 * 0.97, 3.6 * 1.03);
        double first = sums[..n].Average();
        Assert.InRange(first, 1.2 - (4 * Math.Sqrt(0.36 / n)), 1.2 + (4 * Math.Sqrt(0.36 / n)));
    }

    [Fact]
    public void FillMultipliers_allocates_nothing()
    {
        var draws = new MixingDraws(Quantile, Stream, [1, 10]);
        double[] room = new double[2000];
        Assert.Equal(0, Allocations.FewestOf(() => draws.FillMultipliers(3, room)));
    }

    [Fact]
    public void New_faulty_stream_or_horizons_are_refused()
    {
        Assert.Contains("FactorMoves", Assert.Throws<ArgumentException>(() => new MixingDraws(Quantile, new(1, DrawPurpose.FactorMoves, 0), [1])).Message, StringComparison.Ordinal);
        Assert.Contains("at least one", Assert.Throws<ArgumentException>(() => new MixingDraws(Quantile, Stream, [])).Message, StringComparison.Ordinal);
        Assert.Contains("0 days", Assert.Throws<ArgumentOutOfRangeException>(() => new MixingDraws(Quantile, Stream, [0])).Message, StringComparison.Ordinal);
        Assert.Contains("10 days after 10", Assert.Throws<ArgumentException>(() => new MixingDraws(Quantile, Stream, [10, 10])).Message, StringComparison.Ordinal);
        Assert.Contains("5 elements", Assert.Throws<ArgumentException>(() => new MixingDraws(Quantile, Stream, [1, 2]).FillSums(0, new double[5])).Message, StringComparison.Ordinal);
    }
}
