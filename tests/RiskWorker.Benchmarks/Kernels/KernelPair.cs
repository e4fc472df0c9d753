using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Benchmarks.Kernels;

/// <summary>A kernel and its scalar twin on the same <see cref="Count"/> elements, all of which fit the first-level cache.</summary>
/// <param name="Lanes">The kernel.</param>
/// <param name="Twin">Its twin, element by element.</param>
internal sealed record KernelPair(Action Lanes, Action Twin)
{
    public const int Count = 1024;

    private const double Spot0 = 100;
    private const int Bins = 256;

    private static readonly DrawStream s_stream = new(1, DrawPurpose.FactorMoves, 0);
    private static readonly EuropeanOptionTerms s_terms = new(Spot0, 104, 0.5, 0.22, 0.02, 0.01, isCall: true);
    private static readonly double[] s_uniforms = Draws((first, second) => UniformDraws.FillPair(s_stream, 0, 0, first, second));
    private static readonly double[] s_normals = Draws((first, second) => NormalDraws.FillPair(s_stream, 0, 0, first, second));
    private static readonly double[] s_returns = [.. s_normals.Select(z => 0.014 * z)];
    private static readonly double[] s_spots = [.. s_returns.Select(x => Spot0 * Exponential.Of(x))];
    private static readonly double[] s_volatilities = [.. s_normals.Select(z => 0.22 * Exponential.Of(-0.05 * z))];
    private static readonly double[] s_discounts = [.. s_normals.Select(z => 0.02 + (0.001 * z))];
    private static readonly double[] s_carries = [.. s_normals.Select(z => 0.01 - (0.0005 * z))];
    private static readonly MovedOptionTerms s_moved = new(Spot0, 104, isCall: true);
    private static readonly DigitalOptionTerms s_digital = DigitalOptionTerms.CashOrNothing(Spot0, 104, 10, isCall: true);
    private static readonly GeometricAsianTerms s_geometric = GeometricAsianTerms.Continuous(Spot0, 104, 1, 0, Spot0, isCall: true);
    private static readonly BarrierOptionTerms s_downOut = new(Spot0, 104, 85, isCall: true, isUp: false, isIn: false);
    private static readonly BarrierOptionTerms s_upIn = new(Spot0, 104, 125, isCall: true, isUp: true, isIn: true, 3, 1, 1 / 252.0);
    private static readonly double[] s_out = new double[Count];
    private static readonly int[] s_places = new int[Count];
    private static readonly long[] s_counts = new long[Bins + 2];
    private static double s_sum;

    /// <summary>The kernels by name.</summary>
    public static IReadOnlyDictionary<string, KernelPair> All { get; } = new Dictionary<string, KernelPair>(StringComparer.Ordinal)
    {
        ["uniform draw"] = new(
            () => UniformDraws.FillPair(s_stream, 4096, 3, s_out.AsSpan(0, Count / 2), s_out.AsSpan(Count / 2)),
            () => Each((i, half) => s_out[i + (half * Count / 2)] = UniformDraws.At(s_stream, 4096 + (ulong)i, 6 + (uint)half))),
        ["normal draw"] = new(
            () => NormalDraws.FillPair(s_stream, 4096, 3, s_out.AsSpan(0, Count / 2), s_out.AsSpan(Count / 2)),
            () => Each((i, half) => s_out[i + (half * Count / 2)] = NormalDraws.At(s_stream, 4096 + (ulong)i, 6 + (uint)half))),
        ["inverse normal"] = new(() => InverseNormal.Of(s_uniforms, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = InverseNormal.Of(s_uniforms[i]); }),
        ["exp"] = new(() => Exponential.Of(s_returns, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = Exponential.Of(s_returns[i]); }),
        ["log"] = new(() => Logarithm.Of(s_spots, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = Logarithm.Of(s_spots[i]); }),
        ["normal CDF"] = new(() => NormalCdf.Of(s_normals, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = NormalCdf.Of(s_normals[i]); }),
        ["option, flat volatility"] = new(
            () => EuropeanOption.AccumulateValue(s_terms, s_returns, s_spots, 3, 5, s_out),
            () => { for (var i = 0; i < Count; i++) s_out[i] = EuropeanOption.Profit(s_terms, s_returns[i], s_spots[i], 3, 5, s_out[i]); }),
        ["option, own volatility"] = new(
            () => EuropeanOption.AccumulateValue(s_terms, s_returns, s_spots, s_volatilities, 3, 5, s_out),
            () => { for (var i = 0; i < Count; i++) s_out[i] = EuropeanOption.Profit(s_terms, s_returns[i], s_spots[i], s_volatilities[i], 3, 5, s_out[i]); }),
        ["option, everything moves"] = new(
            () => MovedOption.AccumulateValue(s_moved, Market, 3, 5, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = MovedOption.Profit(s_moved, Market[i], 3, 5, s_out[i]); }),
        ["digital"] = new(
            () => DigitalOption.AccumulateValue(s_digital, Market, 3, 5, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = DigitalOption.Profit(s_digital, Market[i], 3, 5, s_out[i]); }),
        ["geometric average"] = new(
            () => GeometricAsianOption.AccumulateValue(s_geometric, Market, 3, 5, s_out),
            () => { for (var i = 0; i < Count; i++) s_out[i] = GeometricAsianOption.Profit(s_geometric, Market[i], 3, 5, s_out[i]); }),
        ["down-and-out call"] = new(
            () => BarrierOption.AccumulateValue(s_downOut, Market, 3, 5, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = BarrierOption.Profit(s_downOut, Market[i], 3, 5, s_out[i]); }),
        ["up-and-in call, daily, rebate"] = new(
            () => BarrierOption.AccumulateValue(s_upIn, Market, 3, 5, s_out), () => { for (var i = 0; i < Count; i++) s_out[i] = BarrierOption.Profit(s_upIn, Market[i], 3, 5, s_out[i]); }),
        ["lane sum"] = new(() => s_sum += LaneSum.Of(s_normals), () => s_sum += LaneSum.OfInTurn(s_normals)),
        ["selection of the worst 2.5%"] = new(
            () => s_sum += Selection.Greater(s_normals, 1.96, s_places, out _), () => s_sum += Selection.GreaterInTurn(s_normals, 1.96, s_places, out _)),
        ["histogram"] = new(
            () => Histogram.Accumulate(s_normals, -5, Bins / 10.0, s_counts), () => { for (var i = 0; i < Count; i++) s_counts[Histogram.BinOf(s_normals[i], -5, Bins / 10.0, Bins)]++; }),
    };

    private static MarketSpans Market => new(s_returns, s_spots, s_discounts, s_carries, s_volatilities);

    private delegate void PairFill(Span<double> first, Span<double> second);

    private static double[] Draws(PairFill fill)
    {
        var draws = new double[Count];
        fill(draws.AsSpan(0, Count / 2), draws.AsSpan(Count / 2));
        return draws;
    }

    private static void Each(Action<int, int> draw)
    {
        for (var i = 0; i < Count / 2; i++)
        {
            draw(i, 0);
            draw(i, 1);
        }
    }
}
