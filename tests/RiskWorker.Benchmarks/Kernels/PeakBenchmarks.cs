using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using BenchmarkDotNet.Attributes;

namespace RiskWorker.Benchmarks.Kernels;

/// <summary>What one core can do at most: twelve independent chains of fused multiply-adds that touch no memory, at the machine's own width.</summary>
public class PeakBenchmarks
{
    private const int Steps = 4096;
    private const int Chains = 12;

    /// <summary>Operations of one call.</summary>
    public static double Operations => 2.0 * Steps * Chains * (Vector512.IsHardwareAccelerated ? 8 : 4);

    [Benchmark]
    public double Peak() => Vector512.IsHardwareAccelerated ? Eight(Steps) : Four(Steps);

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static double Eight(int steps)
    {
        Vector512<double> a = Vector512.Create(0.999), b = Vector512.Create(1e-3);
        Vector512<double> x0 = b, x1 = a, x2 = b, x3 = a, x4 = b, x5 = a, x6 = b, x7 = a, x8 = b, x9 = a, xa = b, xb = a;
        for (var i = 0; i < steps; i++)
        {
            x0 = Vector512.FusedMultiplyAdd(x0, a, b);
            x1 = Vector512.FusedMultiplyAdd(x1, a, b);
            x2 = Vector512.FusedMultiplyAdd(x2, a, b);
            x3 = Vector512.FusedMultiplyAdd(x3, a, b);
            x4 = Vector512.FusedMultiplyAdd(x4, a, b);
            x5 = Vector512.FusedMultiplyAdd(x5, a, b);
            x6 = Vector512.FusedMultiplyAdd(x6, a, b);
            x7 = Vector512.FusedMultiplyAdd(x7, a, b);
            x8 = Vector512.FusedMultiplyAdd(x8, a, b);
            x9 = Vector512.FusedMultiplyAdd(x9, a, b);
            xa = Vector512.FusedMultiplyAdd(xa, a, b);
            xb = Vector512.FusedMultiplyAdd(xb, a, b);
        }
        return Vector512.Sum(x0 + x1 + x2 + x3 + x4 + x5 + x6 + x7 + x8 + x9 + xa + xb);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static double Four(int steps)
    {
        Vector256<double> a = Vector256.Create(0.999), b = Vector256.Create(1e-3);
        Vector256<double> x0 = b, x1 = a, x2 = b, x3 = a, x4 = b, x5 = a, x6 = b, x7 = a, x8 = b, x9 = a, xa = b, xb = a;
        for (var i = 0; i < steps; i++)
        {
            x0 = Vector256.FusedMultiplyAdd(x0, a, b);
            x1 = Vector256.FusedMultiplyAdd(x1, a, b);
            x2 = Vector256.FusedMultiplyAdd(x2, a, b);
            x3 = Vector256.FusedMultiplyAdd(x3, a, b);
            x4 = Vector256.FusedMultiplyAdd(x4, a, b);
            x5 = Vector256.FusedMultiplyAdd(x5, a, b);
            x6 = Vector256.FusedMultiplyAdd(x6, a, b);
            x7 = Vector256.FusedMultiplyAdd(x7, a, b);
            x8 = Vector256.FusedMultiplyAdd(x8, a, b);
            x9 = Vector256.FusedMultiplyAdd(x9, a, b);
            xa = Vector256.FusedMultiplyAdd(xa, a, b);
            xb = Vector256.FusedMultiplyAdd(xb, a, b);
        }
        return Vector256.Sum(x0 + x1 + x2 + x3 + x4 + x5 + x6 + x7 + x8 + x9 + xa + xb);
    }
}
