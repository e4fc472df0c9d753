using MathNet.Numerics.Distributions;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Benchmarks.Quality;

/// <summary>The tests of one kind of draws: 2^20 scenarios of 96 draws each, a little over 10^8 numbers.</summary>
internal sealed class Battery(DrawKind kind)
{
    public const int Block = 4096;
    public const int Scenarios = 1 << 20;
    public const int Pairs = 48;

    private const int Bins = 4096, Side = 64, Lanes = 8, Crossed = 16;
    private const double Total = 2.0 * Pairs * Scenarios;

    private static readonly int[] s_lags = [1, 2, 3, 8, 256, Block];
    private static readonly double[] s_tails = [4, 4.5, 5];
    private static readonly DrawStream s_stream = new(1, DrawPurpose.FactorMoves, 0);

    private readonly long[] _bins = new long[Bins];
    private readonly long[] _cells = new long[Side * Side];
    private readonly long[] _tails = new long[s_tails.Length + 1];
    private readonly double[] _lagged = new double[s_lags.Length];
    private readonly double[] _lanes = new double[Lanes * Lanes];
    private readonly List<double> _ks = [];
    private readonly List<double[]> _crossed = [];
    private double _blockSquares;

    public IReadOnlyList<QualityTest> Run()
    {
        for (uint pair = 0; pair < Pairs; pair++)
        {
            foreach (var draws in kind.Series(s_stream, pair, Scenarios)) Add(draws);
        }
        return [.. Distribution(), .. Dependence(), .. Streams()];
    }

    private void Add(double[] draws)
    {
        CountTails(draws);
        var values = Array.ConvertAll(draws, d => kind.Standardise(d));
        var probabilities = Array.ConvertAll(draws, d => kind.Probability(d));
        foreach (var u in probabilities) _bins[(int)(u * Bins)]++;
        for (var i = 0; i < probabilities.Length; i += 2) _cells[((int)(probabilities[i] * Side) * Side) + (int)(probabilities[i + 1] * Side)]++;
        for (var k = 0; k < s_lags.Length; k++) _lagged[k] += Product(values.AsSpan(s_lags[k]), values.AsSpan(0, Scenarios - s_lags[k]));
        AddLanes(values);
        AddBlocks(values);
        if (_crossed.Count < Crossed) _crossed.Add(values);
        _ks.Add(KolmogorovSmirnov.PValue(probabilities));
    }

    private void CountTails(double[] draws)
    {
        foreach (var z in draws)
        {
            var distance = Math.Abs(z);
            var tail = 0;
            while (tail < s_tails.Length && distance > s_tails[tail]) tail++;
            _tails[tail]++;
        }
    }

    private void AddLanes(double[] values)
    {
        for (var i = 0; i < values.Length; i += Lanes)
        {
            for (var a = 0; a < Lanes; a++)
            {
                for (var b = 0; b < a; b++) _lanes[(a * Lanes) + b] += values[i + a] * values[i + b];
            }
        }
    }

    private void AddBlocks(double[] values)
    {
        for (var first = 0; first < values.Length; first += Block)
        {
            var sum = 0.0;
            foreach (var value in values.AsSpan(first, Block)) sum += value;
            _blockSquares += sum * sum / Block;
        }
    }

    private IEnumerable<QualityTest> Distribution()
    {
        yield return QualityTest.EvenCounts($"chi-square over {Bins:N0} equal classes", _bins, Total);
        var line = _ks.ToArray();
        var mean = (line.Average() - 0.5) * Math.Sqrt(12.0 * line.Length);
        yield return new($"Kolmogorov-Smirnov of {line.Length} samples of 2^20: their p-values", mean, "KS of p-values", KolmogorovSmirnov.PValue(line));
        if (kind != DrawKind.Normals) yield break;
        double[] beyond = [1, .. s_tails.Select(t => 2 * Normal.CDF(0, 1, -t)), 0];
        yield return QualityTest.Counts($"tails: draws within 4, to 4.5, to 5, beyond ({_tails[1]:N0}, {_tails[2]:N0}, {_tails[3]:N0})", _tails, [.. _tails.Select((_, i) => Total * (beyond[i] - beyond[i + 1]))]);
    }

    private IEnumerable<QualityTest> Dependence()
    {
        yield return QualityTest.EvenCounts($"serial test: neighbouring scenarios in {Side} x {Side} cells", _cells, Total / 2);
        for (var k = 0; k < s_lags.Length; k++)
            yield return QualityTest.Normal($"serial correlation of scenarios {s_lags[k]:N0} apart", _lagged[k] / Math.Sqrt(2.0 * Pairs * (Scenarios - s_lags[k])));
        yield return QualityTest.Correlations("correlations of the 8 lanes, 28 pairs", from a in Enumerable.Range(0, Lanes) from b in Enumerable.Range(0, a) select _lanes[(a * Lanes) + b], Total / Lanes);
        yield return QualityTest.ChiSquare("variance of the sums of blocks", _blockSquares, (int)(Total / Block));
        yield return QualityTest.Correlations($"correlations of {Crossed} draws of a scenario, all pairs", PairsOf(_crossed), Scenarios);
    }

    private IEnumerable<QualityTest> Streams()
    {
        DrawStream[] streams =
        [
            .. Enum.GetValues<DrawPurpose>().Select(purpose => new DrawStream(1, purpose, 0)),
            new(1, DrawPurpose.FactorMoves, 1), new(1, DrawPurpose.FactorMoves, DrawStream.MaxSubIndex), new(2, DrawPurpose.FactorMoves, 0), new((1UL << 32) + 1, DrawPurpose.FactorMoves, 0),
        ];
        var series = streams.Select(s => Array.ConvertAll(kind.Series(s, 0, Scenarios)[0], d => kind.Standardise(d))).ToList();
        yield return QualityTest.Correlations($"correlations of {streams.Length} streams (purposes, sub-indices, seeds), all pairs", PairsOf(series), Scenarios);
    }

    private static IEnumerable<double> PairsOf(List<double[]> series) =>
        from a in Enumerable.Range(0, series.Count) from b in Enumerable.Range(0, a) select Product(series[a], series[b]);

    private static double Product(ReadOnlySpan<double> x, ReadOnlySpan<double> y)
    {
        var sum = 0.0;
        for (var i = 0; i < x.Length; i++) sum += x[i] * y[i];
        return sum;
    }
}
