using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Random;

/// <summary>Standard normals: Φ⁻¹ of the uniform draw of the same name, one for one.</summary>
public static class NormalDraws
{
    /// <summary>One draw of one scenario.</summary>
    public static double At(DrawStream stream, ulong scenario, uint draw) =>
        InverseNormal.Of(UniformDraws.At(stream, scenario, draw));

    /// <summary>
    /// Both draws of a pair for consecutive scenarios; spans and errors as in
    /// <see cref="UniformDraws.FillPair(DrawStream, ulong, uint, Span{double}, Span{double})"/>.
    /// </summary>
    [ScalarTwin(nameof(At))]
    public static void FillPair(DrawStream stream, ulong firstScenario, uint pair, Span<double> first, Span<double> second)
    {
        UniformDraws.FillPair(stream, firstScenario, pair, first, second);
        InverseNormal.Of(first, first);
        InverseNormal.Of(second, second);
    }
}
