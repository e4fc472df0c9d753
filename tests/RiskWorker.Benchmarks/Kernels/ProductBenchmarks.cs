using BenchmarkDotNet.Attributes;
using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Benchmarks.Kernels;

/// <summary>The triangular product of one tile of 256 scenarios, and its scalar twin.</summary>
public class ProductBenchmarks
{
    public const int Width = 256;

    private double[] _lower = [];
    private double[] _draws = [];
    private double[] _moves = [];

    [Params(40, 200)]
    public int Factors { get; set; }

    /// <summary>Multiplications and additions that the product of <paramref name="factors"/> needs; those with the zeros above the diagonal do not count.</summary>
    public static double UsefulOperations(int factors) => (double)factors * (factors + 1) * Width;

    [GlobalSetup]
    public void Fill()
    {
        var stream = new DrawStream(2, DrawPurpose.FactorMoves, 0);
        double[] Normals(int count) => [.. Enumerable.Range(0, count).Select(i => NormalDraws.At(stream, (ulong)i, 0))];
        (_lower, _draws, _moves) = (Normals(Factors * Factors), Normals(Factors * Width), new double[Factors * Width]);
    }

    [Benchmark]
    public void Lanes() => TriangularProduct.Multiply(_lower, Factors, Factors, _draws, _moves, Width);

    [Benchmark]
    public void Twin() => TriangularProduct.MultiplyInTurn(_lower, Factors, Factors, _draws, _moves, Width);
}
