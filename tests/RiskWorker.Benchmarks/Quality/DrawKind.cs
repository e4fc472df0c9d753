using MathNet.Numerics.Distributions;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Benchmarks.Quality;

/// <summary>Uniforms or normals, standardised for correlations, and carried to (0, 1) by a distribution function that is not the product's.</summary>
/// <param name="Name">Which.</param>
/// <param name="Seed">A seed of its own, so that two kinds are two samples.</param>
/// <param name="Fill">Draws a pair.</param>
/// <param name="Standardise">To mean 0 and variance 1.</param>
/// <param name="Probability">To (0, 1).</param>
internal sealed record DrawKind(string Name, ulong Seed, DrawKind.PairFill Fill, Func<double, double> Standardise, Func<double, double> Probability)
{
    public delegate void PairFill(DrawStream stream, ulong firstScenario, uint pair, Span<double> first, Span<double> second);

    public static DrawKind Uniforms { get; } = new("uniforms", 1, UniformDraws.FillPair, u => (u - 0.5) * Math.Sqrt(12), u => u);

    public static DrawKind Normals { get; } = new("normals", 2, NormalDraws.FillPair, z => z, z => Normal.CDF(0, 1, z));

    /// <summary>Both draws of a pair over consecutive scenarios, standardised, block by block as the engine fills them.</summary>
    public double[][] Series(DrawStream stream, uint pair, int scenarios)
    {
        double[] first = new double[scenarios], second = new double[scenarios];
        for (var s = 0; s < scenarios; s += Battery.Block) Fill(stream, (ulong)s, pair, first.AsSpan(s, Battery.Block), second.AsSpan(s, Battery.Block));
        return [first, second];
    }
}
