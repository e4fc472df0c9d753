using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Random;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// The Brownian motion of a block of paths at every date, W, and the logarithms of the uniforms behind the extremes between
/// dates: free of spot, volatility and payoff. The mirrored path of a pair has -W and 1 - U.
/// </summary>
/// <remarks>
/// Step k of pair i is draw k of scenario i: every payoff with as many steps sees the same paths. Pricers own the upper half of the
/// sub-indices of <see cref="DrawPurpose.PathSteps"/>.
/// </remarks>
internal sealed class PathBlock
{
    /// <summary>Pairs in a block.</summary>
    public const int Pairs = 512;

    private const uint Normals = 0x800000;
    private const uint Uniforms = 0x800001;

    private readonly double[] origin = new double[Pairs];
    private readonly double[] motion;
    private readonly double[] logUniforms;
    private readonly double[] mirroredLogUniforms;
    private readonly double[] rootSteps;

    public PathBlock(PathSchedule schedule, bool withBridges)
    {
        rootSteps = new double[schedule.Count];
        for (int k = 0; k < rootSteps.Length; k++)
            rootSteps[k] = Math.Sqrt(schedule.Years[k] - (k == 0 ? 0.0 : schedule.Years[k - 1]));
        motion = new double[(schedule.Count + 1) * Pairs];
        logUniforms = new double[withBridges ? motion.Length : 0];
        mirroredLogUniforms = new double[logUniforms.Length];
    }

    /// <summary>W of every pair at a date.</summary>
    public ReadOnlySpan<double> Motion(int date) => motion.AsSpan(date * Pairs, Pairs);

    /// <summary>W of every pair at the date before, or today.</summary>
    public ReadOnlySpan<double> MotionBefore(int date) => date == 0 ? origin : Motion(date - 1);

    /// <summary>ln U of every pair between a date and the one before, of the path or its mirror.</summary>
    public ReadOnlySpan<double> LogUniform(int date, bool isMirrored) =>
        (isMirrored ? mirroredLogUniforms : logUniforms).AsSpan(date * Pairs, Pairs);

    /// <summary>Draws the pairs from <paramref name="first"/> on.</summary>
    public void Fill(ulong seed, ulong first)
    {
        var stream = new DrawStream(seed, DrawPurpose.PathSteps, Normals);
        int start = rootSteps[0] == 0.0 ? 1 : 0, steps = rootSteps.Length - start;
        motion.AsSpan(0, start * Pairs).Clear();
        for (int j = 0; j < steps; j += 2)
            NormalDraws.FillPair(stream, first, (uint)(j / 2), Row(motion, start + j), Row(motion, start + j + 1));
        Scale(Row(motion, start), rootSteps.Length > start ? rootSteps[start] : 0.0);
        for (int k = start + 1; k < rootSteps.Length; k++)
            Accumulate(rootSteps[k], Row(motion, k - 1), Row(motion, k));
        if (logUniforms.Length > 0)
            FillUniforms(new DrawStream(seed, DrawPurpose.PathSteps, Uniforms), first, start, steps);
    }

    private static Span<double> Row(double[] rows, int date) => rows.AsSpan(date * Pairs, Pairs);

    private static void Scale(Span<double> row, double factor) => LaneLoop.Apply(new Scaled(factor, 0.0), row, row);

    private static void Accumulate(double root, ReadOnlySpan<double> before, Span<double> row) =>
        LaneLoop.Apply(new ScaledSum(root), before, row);

    private void FillUniforms(DrawStream stream, ulong first, int start, int steps)
    {
        for (int j = 0; j < steps; j += 2)
            UniformDraws.FillPair(stream, first, (uint)(j / 2), Row(logUniforms, start + j), Row(logUniforms, start + j + 1));
        int from = start * Pairs;
        LaneLoop.Apply(new Scaled(-1.0, 1.0), logUniforms.AsSpan(from), mirroredLogUniforms.AsSpan(from));
        Logarithm.Of(logUniforms.AsSpan(from, steps * Pairs), logUniforms.AsSpan(from, steps * Pairs));
        Logarithm.Of(mirroredLogUniforms.AsSpan(from, steps * Pairs), mirroredLogUniforms.AsSpan(from, steps * Pairs));
    }
}
