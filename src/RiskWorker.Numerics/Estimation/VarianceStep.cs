using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// One day of a process with <see cref="GarchParameters"/> in every scenario: with e = √v·z the move grows by mean + e, and v becomes
/// omega + alpha e² + beta v. Exponential weighting is the process of <see cref="EwmaVariance.AsProcess"/>.
/// </summary>
/// <remarks>Elementwise; a NaN stays one; allocates nothing.</remarks>
public static class VarianceStep
{
    /// <summary>The day in one scenario: the move and the variance after it.</summary>
    public static (double Move, double Variance) Advance(in GarchParameters process, double z, double variance, double move)
    {
        double error = Math.Sqrt(variance) * z;
        return (move + (error + process.Mean), process.Next(error * error, variance));
    }

    /// <summary>The day in all scenarios.</summary>
    /// <param name="process">The process.</param>
    /// <param name="z">Innovations of variance 1.</param>
    /// <param name="variance">Variances of this day, replaced by those of the next; as long as <paramref name="z"/>.</param>
    /// <param name="move">What the day is added to; as long as <paramref name="z"/>.</param>
    /// <exception cref="ArgumentException">Lengths differ.</exception>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Advance))]
    public static void Advance(in GarchParameters process, ReadOnlySpan<double> z, Span<double> variance, Span<double> move)
    {
        Spans.RequireLength(z.Length, variance.Length, nameof(variance));
        Spans.RequireLength(z.Length, move.Length, nameof(move));
        ref double innovations = ref MemoryMarshal.GetReference(z);
        ref double variances = ref MemoryMarshal.GetReference(variance);
        ref double moves = ref MemoryMarshal.GetReference(move);
        Vector512<double> mean = Vector512.Create(process.Mean), omega = Vector512.Create(process.Omega);
        Vector512<double> alpha = Vector512.Create(process.Alpha), beta = Vector512.Create(process.Beta);
        nuint s = 0, length = (nuint)z.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> v = Vector512.LoadUnsafe(ref variances, s);
            Vector512<double> error = Vector512.Sqrt(v) * Vector512.LoadUnsafe(ref innovations, s);
            (Vector512.LoadUnsafe(ref moves, s) + (error + mean)).StoreUnsafe(ref moves, s);
            Vector512<double> fresh = Vector512.FusedMultiplyAdd(alpha, error * error, omega);
            Vector512.FusedMultiplyAdd(beta, v, fresh).StoreUnsafe(ref variances, s);
        }

        for (int i = (int)s; i < z.Length; i++)
            (move[i], variance[i]) = Advance(process, z[i], variance[i], move[i]);
    }
}
