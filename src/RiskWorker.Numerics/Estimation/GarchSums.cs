using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// What a normal likelihood and its slope are made of, with r = 1/v and c = (e² r - 1) r: Σ ln v, Σ e² r, Σ e r, and Σ c d for each
/// of the variance's four derivatives d.
/// </summary>
/// <remarks>
/// Eight lanes, day t in lane t mod 8, each lane in turn from +0 and the lanes added as in <see cref="LaneSum"/>. Days that fill
/// up the last eight have e = 0, v = 1 and d = 0, and add nothing.
/// </remarks>
internal readonly record struct GarchSums(double Logarithms, double Ratios, double Errors, double Omega, double Alpha, double Beta, double Mean)
{
    /// <summary>Rows of the buffer: residuals, variances, and the variances' derivatives by omega, alpha, beta and the mean.</summary>
    public const int Rows = 6;

    private const int Sums = 7;

    /// <summary>The sums over <paramref name="width"/> days, a multiple of 8.</summary>
    /// <param name="rows">Six rows of that width.</param>
    /// <param name="width">Days, those that fill up included.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(OfInTurn))]
    public static GarchSums Of(ReadOnlySpan<double> rows, int width)
    {
        Require(rows, width);
        ref double from = ref MemoryMarshal.GetReference(rows);
        Vector512<double> one = Vector512.Create(1.0), logarithms = Vector512<double>.Zero, ratios = logarithms, errors = logarithms;
        Vector512<double> omega = logarithms, alpha = logarithms, beta = logarithms, mean = logarithms;
        nuint step = (nuint)width;
        for (nuint t = 0; t < step; t += 8)
        {
            Vector512<double> e = Vector512.LoadUnsafe(ref from, t), v = Vector512.LoadUnsafe(ref from, step + t);
            Vector512<double> r = one / v, er = e * r, ratio = e * er, c = (ratio - one) * r;
            logarithms += Logarithm.Of(v);
            ratios += ratio;
            errors += er;
            omega = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref from, (2 * step) + t), omega);
            alpha = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref from, (3 * step) + t), alpha);
            beta = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref from, (4 * step) + t), beta);
            mean = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref from, (5 * step) + t), mean);
        }

        return new(Tree(logarithms), Tree(ratios), Tree(errors), Tree(omega), Tree(alpha), Tree(beta), Tree(mean));
    }

    /// <summary>The scalar twin of <see cref="Of"/>.</summary>
    public static GarchSums OfInTurn(ReadOnlySpan<double> rows, int width)
    {
        Require(rows, width);
        Span<double> lanes = stackalloc double[Sums * 8];
        lanes.Clear();
        for (int t = 0; t < width; t++)
        {
            int lane = t % 8;
            double e = rows[t], v = rows[width + t];
            double r = 1.0 / v, er = e * r, ratio = e * er, c = (ratio - 1.0) * r;
            lanes[lane] += Logarithm.Of(v);
            lanes[8 + lane] += ratio;
            lanes[16 + lane] += er;
            for (int d = 0; d < 4; d++)
                lanes[((3 + d) * 8) + lane] = Math.FusedMultiplyAdd(c, rows[((2 + d) * width) + t], lanes[((3 + d) * 8) + lane]);
        }

        return new(Tree(lanes, 0), Tree(lanes, 1), Tree(lanes, 2), Tree(lanes, 3), Tree(lanes, 4), Tree(lanes, 5), Tree(lanes, 6));
    }

    private static double Tree(Vector512<double> lanes)
    {
        Vector256<double> four = lanes.GetLower() + lanes.GetUpper();
        Vector128<double> two = four.GetLower() + four.GetUpper();
        return two[0] + two[1];
    }

    private static double Tree(ReadOnlySpan<double> lanes, int sum)
    {
        ReadOnlySpan<double> l = lanes.Slice(sum * 8, 8);
        return l[0] + l[4] + (l[2] + l[6]) + (l[1] + l[5] + (l[3] + l[7]));
    }

    private static void Require(ReadOnlySpan<double> rows, int width)
    {
        if (width % 8 != 0 || rows.Length != Rows * (long)width)
            throw new ArgumentException($"rows has {rows.Length} elements; it must be {Rows} rows of {width}, a multiple of 8.", nameof(rows));
    }
}
