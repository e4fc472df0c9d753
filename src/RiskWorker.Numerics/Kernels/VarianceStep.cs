using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// One day of paths whose variance answers to the day's shock: x = √v z, added to the path, then v ← omega + alpha x² + beta v.
/// Elementwise; a NaN stays one; allocates nothing.
/// </summary>
public static class VarianceStep
{
    /// <summary>The shock √v z, and the next day's variance.</summary>
    public static (double Shock, double Variance) Of(double z, double variance, in VarianceStepTerms terms)
    {
        double shock = Math.Sqrt(variance) * z;
        return (shock, Math.FusedMultiplyAdd(terms.Beta, variance, Math.FusedMultiplyAdd(terms.Alpha, shock * shock, terms.Omega)));
    }

    /// <summary>Takes every path one day further.</summary>
    /// <param name="z">Residuals of the day.</param>
    /// <param name="terms">How the variance answers.</param>
    /// <param name="variances">Variance of the day, then of the next one.</param>
    /// <param name="sums">Shocks so far, then with the day's; all spans are as long as it.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Of))]
    public static void Advance(ReadOnlySpan<double> z, in VarianceStepTerms terms, Span<double> variances, Span<double> sums)
    {
        Spans.RequireLength(sums.Length, z.Length, nameof(z));
        Spans.RequireLength(sums.Length, variances.Length, nameof(variances));
        ref double residuals = ref MemoryMarshal.GetReference(z);
        ref double variance = ref MemoryMarshal.GetReference(variances);
        ref double sum = ref MemoryMarshal.GetReference(sums);
        Vector512<double> omega = Vector512.Create(terms.Omega), alpha = Vector512.Create(terms.Alpha), beta = Vector512.Create(terms.Beta);
        nuint s = 0, length = (nuint)sums.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> v = Vector512.LoadUnsafe(ref variance, s);
            Vector512<double> shock = Vector512.Sqrt(v) * Vector512.LoadUnsafe(ref residuals, s);
            (Vector512.LoadUnsafe(ref sum, s) + shock).StoreUnsafe(ref sum, s);
            Vector512.FusedMultiplyAdd(beta, v, Vector512.FusedMultiplyAdd(alpha, shock * shock, omega)).StoreUnsafe(ref variance, s);
        }

        for (int i = (int)s; i < sums.Length; i++)
        {
            (double shock, variances[i]) = Of(z[i], variances[i], terms);
            sums[i] += shock;
        }
    }
}

/// <summary>How a variance answers to a shock: v ← omega + alpha x² + beta v.</summary>
public readonly record struct VarianceStepTerms(double Omega, double Alpha, double Beta);
