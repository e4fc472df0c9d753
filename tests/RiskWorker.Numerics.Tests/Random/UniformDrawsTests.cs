using System.Runtime.Intrinsics.X86;
using RiskWorker.Numerics.Random;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Random;

public sealed class UniformDrawsTests
{
    private static readonly DrawStream Stream = new(0x0123456789ABCDEF, DrawPurpose.FactorMoves, 3);

    [Fact]
    public void FillPair_every_length_and_alignment_equals_At()
    {
        for (int length = 0; length <= 257; length++)
        {
            var first = new GuardedBuffer<double>(length, -7.0, length % 5);
            var second = new GuardedBuffer<double>(length, -7.0, length % 3);
            UniformDraws.FillPair(Stream, 41, 6, first.Span, second.Span);
            for (int s = 0; s < length; s++)
            {
                BitAssert.Equal(UniformDraws.At(Stream, 41 + (ulong)s, 12), first.Span[s]);
                BitAssert.Equal(UniformDraws.At(Stream, 41 + (ulong)s, 13), second.Span[s]);
            }

            first.AssertIntact();
            second.AssertIntact();
        }
    }

    [Theory]
    [InlineData(0xFFFFFFF0UL)]
    [InlineData(0xFFFFFFFBUL)]
    [InlineData(0x123FFFFFFFFUL)]
    public void FillPair_across_two_to_the_32_scenarios_carries_into_the_high_word(ulong firstScenario)
    {
        double[] first = new double[40], second = new double[40];
        UniformDraws.FillPair(Stream, firstScenario, 0, first, second);
        for (int s = 0; s < first.Length; s++)
        {
            BitAssert.Equal(UniformDraws.At(Stream, firstScenario + (ulong)s, 0), first[s]);
            BitAssert.Equal(UniformDraws.At(Stream, firstScenario + (ulong)s, 1), second[s]);
        }
    }

    [Fact]
    public void FillPair_split_into_ranges_gives_the_same_bits()
    {
        double[] whole = new double[1000], other = new double[1000], part = new double[1000], rest = new double[1000];
        UniformDraws.FillPair(Stream, 5, 1, whole, other);
        foreach ((int start, int end) in new[] { (0, 13), (13, 14), (14, 600), (600, 1000) })
            UniformDraws.FillPair(Stream, 5 + (ulong)start, 1, part.AsSpan(start..end), rest.AsSpan(start..end));
        BitAssert.Equal(whole, part);
        BitAssert.Equal(other, rest);
    }

    [Fact]
    public void FillPair_every_instruction_set_gives_the_same_bits()
    {
        double[] portable = new double[1003], portableSecond = new double[1003], other = new double[1003], otherSecond = new double[1003];
        UniformDraws.FillPair<PortableWideProduct>(Stream, 0xFFFFFE00, 9, portable, portableSecond);
        if (Avx2.IsSupported)
        {
            UniformDraws.FillPair<Avx2WideProduct>(Stream, 0xFFFFFE00, 9, other, otherSecond);
            BitAssert.Equal(portable, other, "AVX2");
            BitAssert.Equal(portableSecond, otherSecond, "AVX2");
        }

        if (Avx512F.IsSupported)
        {
            UniformDraws.FillPair<Avx512WideProduct>(Stream, 0xFFFFFE00, 9, other, otherSecond);
            BitAssert.Equal(portable, other, "AVX-512");
            BitAssert.Equal(portableSecond, otherSecond, "AVX-512");
        }

        UniformDraws.FillPair(Stream, 0xFFFFFE00, 9, other, otherSecond);
        BitAssert.Equal(portable, other, "chosen");
        BitAssert.Equal(portableSecond, otherSecond, "chosen");
    }

    [Fact]
    public void FillPair_different_streams_differ()
    {
        DrawStream[] streams = [Stream, new(1, DrawPurpose.FactorMoves, 3), new(Stream.Seed, DrawPurpose.Jumps, 3), new(Stream.Seed, DrawPurpose.FactorMoves, 4)];
        Assert.Equal(streams.Length, streams.Select(stream => UniformDraws.At(stream, 0, 0)).Distinct().Count());
    }

    // A million uniforms: mean 1/2 with standard error 1/√(12 n), variance 1/12 with √(1/180 n), and the correlation of the
    // two draws of a pair and of neighbouring scenarios with 1/√n; each within 4 standard errors.
    [Fact]
    public void FillPair_moments_and_correlations_are_those_of_independent_uniforms()
    {
        const int n = 1_000_000;
        double[] u = new double[n], v = new double[n];
        UniformDraws.FillPair(Stream, 0, 0, u, v);
        double mean = u.Average(), variance = u.Average(x => (x - 0.5) * (x - 0.5));
        Assert.InRange(mean, 0.5 - (4 / Math.Sqrt(12.0 * n)), 0.5 + (4 / Math.Sqrt(12.0 * n)));
        Assert.InRange(variance, (1 / 12.0) - (4 / Math.Sqrt(180.0 * n)), (1 / 12.0) + (4 / Math.Sqrt(180.0 * n)));
        double pair = 0, neighbour = 0;
        for (int s = 1; s < n; s++)
        {
            pair += 12 * (u[s] - 0.5) * (v[s] - 0.5);
            neighbour += 12 * (u[s] - 0.5) * (u[s - 1] - 0.5);
        }

        Assert.InRange(pair / n, -4 / Math.Sqrt(n), 4 / Math.Sqrt(n));
        Assert.InRange(neighbour / n, -4 / Math.Sqrt(n), 4 / Math.Sqrt(n));
        Assert.True(u.Min() > 0 && u.Max() < 1);
    }

    [Fact]
    public void FillPair_faulty_spans_are_refused()
    {
        double[] memory = new double[20];
        Assert.Throws<ArgumentException>(() => UniformDraws.FillPair(Stream, 0, 0, memory.AsSpan(0, 8), memory.AsSpan(10, 7)));
        Assert.Throws<ArgumentException>(() => UniformDraws.FillPair(Stream, 0, 0, memory.AsSpan(0, 8), memory.AsSpan(7, 8)));
        Assert.Throws<ArgumentOutOfRangeException>(() => UniformDraws.FillPair(Stream, 0, 1u << 31, memory.AsSpan(0, 8), memory.AsSpan(10, 8)));
    }
}
