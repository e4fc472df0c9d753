using RiskWorker.Numerics.Kernels;
using RiskWorker.TestKit;

namespace RiskWorker.Numerics.Tests.Kernels;

/// <summary>Scenarios around a level, seeded or odd, and the tests that every kernel over them passes.</summary>
internal sealed class MarketBlock(double[] x, double[] spot, double[] discount, double[] carry, double[] deviation)
{
    public delegate void Accumulation(in MarketSpans market, double quantity, double baseValue, Span<double> profit);

    public delegate double Twin(in MarketPoint at, double quantity, double baseValue, double profit);

    public MarketSpans Spans => new(x, spot, discount, carry, deviation);

    public static MarketBlock Seeded(ulong seed, double spot0, int count)
    {
        var numbers = new SeededNumbers(seed);
        double[] x = numbers.Between(-0.4, 0.4, count), spot = new double[count];
        LogNormalMoves.Spots(x, spot0, spot);
        return new(x, spot, numbers.Between(-0.03, 0.1, count), numbers.Between(-0.03, 0.1, count), numbers.Between(0.01, 0.6, count));
    }

    /// <summary>The ends of every range, in every combination with the others'.</summary>
    public static MarketBlock Odd(double spot0)
    {
        double[] moves = [double.NegativeInfinity, -700, -5, -1e-300, 0, 0.03, 1, 50, 700, double.NaN];
        double[] exponents = [-3, -0.01, 0, 0.02, 800, double.NaN];
        double[] deviations = [-1, 0, 1e-300, 1e-9, 0.2, 40, double.NaN];
        var points = (from m in moves from r in exponents from q in exponents from w in deviations select (m, r, q, w)).ToArray();
        double[] x = [.. points.Select(p => p.m)];
        return new(x, [.. x.Select(m => LogNormalMoves.Spot(m, spot0))], [.. points.Select(p => p.r)], [.. points.Select(p => p.q)], [.. points.Select(p => p.w)]);
    }

    public static MarketPoint Point(double x, double spot0, double discount, double carry, double deviation) =>
        new(x, LogNormalMoves.Spot(x, spot0), discount, carry, deviation);

    public static void AssertLanesEqualTwin(double spot0, Accumulation lanes, Twin twin)
    {
        for (int length = 0; length <= 257; length += length < 20 ? 1 : 79)
            AssertEqual(Seeded(92 + (ulong)length, spot0, length).Spans, lanes, twin);
        AssertEqual(Odd(spot0).Spans, lanes, twin);
    }

    public static void AssertNaNStays(Twin twin)
    {
        MarketPoint at = Point(0.01, 100, 0.02, 0.01, 0.2);
        Assert.False(double.IsNaN(twin(at, 1, 0, 0)));
        foreach (MarketPoint faulty in new[] { at with { X = double.NaN }, at with { Discount = double.NaN }, at with { Carry = double.NaN }, at with { Deviation = double.NaN } })
            Assert.True(double.IsNaN(twin(faulty, 1, 0, 0)), $"{faulty}");
    }

    public static void AssertFaultySpansAreRefused(Accumulation lanes)
    {
        double[] memory = new double[64];
        Assert.Throws<ArgumentException>("profit", () => lanes(new(memory.AsSpan(0, 8), memory.AsSpan(0, 8), memory.AsSpan(0, 8), memory.AsSpan(0, 8), memory.AsSpan(0, 8)), 1, 0, new double[7]));
        for (int span = 0; span < 5; span++)
        {
            int at = span;
            Assert.Throws<ArgumentException>("profit", () => lanes(
                new(Part(memory, at == 0), Part(memory, at == 1), Part(memory, at == 2), Part(memory, at == 3), Part(memory, at == 4)), 1, 0, memory.AsSpan(39, 8)));
        }

        static ReadOnlySpan<double> Part(double[] memory, bool beside) => memory.AsSpan(beside ? 32 : 0, 8);
    }

    private static void AssertEqual(in MarketSpans market, Accumulation lanes, Twin twin)
    {
        double[] start = new SeededNumbers(7).Between(-10, 10, market.Length);
        var profit = new GuardedBuffer<double>(market.Length, 1e9, market.Length % 5);
        start.CopyTo(profit.Span);
        lanes(market, 12.5, 3.25, profit.Span);
        for (int s = 0; s < market.Length; s++)
            BitAssert.Equal(twin(market[s], 12.5, 3.25, start[s]), profit.Span[s], $"{market[s]}");
        profit.AssertIntact();
    }
}
