using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// The sum of N₁ and N₂ jumps of two kinds with normal sizes, from their counts and one standard normal g:
/// N₁ m₁ + N₂ m₂ + √(N₁ v₁ + N₂ v₂) g. Elementwise; a NaN stays one; allocates nothing.
/// </summary>
public static class CompoundJump
{
    /// <summary>x + N₁ m₁ + N₂ m₂ + √(N₁ v₁ + N₂ v₂) g.</summary>
    public static double Add(double first, double second, double normal, in CompoundJumpTerms terms, double x)
    {
        var deviation = Math.Sqrt(Math.FusedMultiplyAdd(first, terms.FirstVariance, second * terms.SecondVariance));
        return Math.FusedMultiplyAdd(deviation, normal, Math.FusedMultiplyAdd(first, terms.FirstMean, Math.FusedMultiplyAdd(second, terms.SecondMean, x)));
    }

    /// <summary>x[s] += the jumps of lane s.</summary>
    /// <param name="first">Counts of the one kind.</param>
    /// <param name="second">Counts of the other.</param>
    /// <param name="normals">Standard normals.</param>
    /// <param name="terms">Means and variances of the sizes.</param>
    /// <param name="x">What they are added to; all spans are as long as it.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Add))]
    public static void Add(ReadOnlySpan<double> first, ReadOnlySpan<double> second, ReadOnlySpan<double> normals, in CompoundJumpTerms terms, Span<double> x)
    {
        Spans.RequireLength(x.Length, first.Length, nameof(first));
        Spans.RequireLength(x.Length, second.Length, nameof(second));
        Spans.RequireLength(x.Length, normals.Length, nameof(normals));
        ref double ones = ref MemoryMarshal.GetReference(first);
        ref double others = ref MemoryMarshal.GetReference(second);
        ref double draws = ref MemoryMarshal.GetReference(normals);
        ref double to = ref MemoryMarshal.GetReference(x);
        Vector512<double> m1 = Vector512.Create(terms.FirstMean), m2 = Vector512.Create(terms.SecondMean);
        Vector512<double> v1 = Vector512.Create(terms.FirstVariance), v2 = Vector512.Create(terms.SecondVariance);
        nuint s = 0, length = (nuint)x.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> n1 = Vector512.LoadUnsafe(ref ones, s), n2 = Vector512.LoadUnsafe(ref others, s);
            Vector512<double> deviation = Vector512.Sqrt(Vector512.FusedMultiplyAdd(n1, v1, n2 * v2));
            Vector512<double> mean = Vector512.FusedMultiplyAdd(n1, m1, Vector512.FusedMultiplyAdd(n2, m2, Vector512.LoadUnsafe(ref to, s)));
            Vector512.FusedMultiplyAdd(deviation, Vector512.LoadUnsafe(ref draws, s), mean).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < x.Length; i++)
            x[i] = Add(first[i], second[i], normals[i], terms, x[i]);
    }
}

/// <summary>Means and variances of the sizes of two kinds of jumps.</summary>
public readonly record struct CompoundJumpTerms(double FirstMean, double FirstVariance, double SecondMean, double SecondVariance);
