using MathNet.Numerics.Distributions;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Benchmarks.Quality;

/// <summary>Uniforms or normals, standardised for correlations, and carried to (0, 1) by a distribution function that is not the product's.</summary>
internal sealed record DrawKind(string Name, DrawKind.PairFill Fill, Func<double, double> Standardise, Func<double, double> Probability)
{
    public delegate void PairFill(DrawStream stream, ulong firstScenario, uint pair, Span<double> first, Span<double> second);

    public static DrawKind Uniforms { get; } = new("uniforms", UniformDraws.FillPair, u => (u - 0.5) * Math.Sqrt(12), u => u);

    public static DrawKind Normals { get; } = new("normals", NormalDraws.FillPair, z => z, z => Normal.CDF(0, 1, z));

    /// <summary>Both draws of a pair over consecutive scenarios, standardised, block by block as the engine fills them.</summary>
    public double[][] Series(DrawStream stream, uint pair, int scenarios)
    {
        double[] first = new double[scenarios], second = new double[scenarios];
        for (var s = 0; s < scenarios; s += Battery.Block) Fill(stream, (ulong)s, pair, first.AsSpan(s, Battery.Block), second.AsSpan(s, Battery.Block));
        return [first, second];
    }
}
