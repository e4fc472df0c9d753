using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>A function of one real number in two forms that agree to the last bit.</summary>
/// <remarks>
/// Both forms use additions, products, quotients, square roots and explicit fused multiply-adds only, in the same
/// order, so that neither the width nor the presence of vector hardware can move a bit. A NaN comes back as it came.
/// </remarks>
public interface IUnaryKernel
{
    /// <summary>The function at one point.</summary>
    static abstract double Of(double x);

    /// <summary>The function in eight lanes.</summary>
    static abstract Vector512<double> Of(Vector512<double> x);
}
