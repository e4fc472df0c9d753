using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>e^(-t²/2) for |t| ≤ 40, the half square carried in two pieces.</summary>
internal static class GaussianFactor
{
    public static double Of(double t)
    {
        double half = 0.5 * t;
        double square = half * t;
        double lost = Math.FusedMultiplyAdd(half, t, -square);
        return Exponential.OfSum(-square, -lost);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<double> Of(Vector512<double> t)
    {
        Vector512<double> half = Vector512.Create(0.5) * t;
        Vector512<double> square = half * t;
        Vector512<double> lost = Vector512.FusedMultiplyAdd(half, t, -square);
        return Exponential.OfSum(-square, -lost);
    }
}
