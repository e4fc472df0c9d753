using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>The one loop that carries a unary kernel over a span.</summary>
public static class UnaryKernel
{
    /// <summary>destination[i] = f(source[i]); what does not fill eight lanes goes through the scalar form.</summary>
    /// <param name="source">Arguments.</param>
    /// <param name="destination">At least as long as <paramref name="source"/>; may be the same memory, and may not overlap it otherwise.</param>
    /// <exception cref="ArgumentException">The destination is too short or overlaps the source in part.</exception>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Apply<TKernel>(ReadOnlySpan<double> source, Span<double> destination)
        where TKernel : struct, IUnaryKernel
    {
        Spans.RequireRoom(source.Length, destination.Length, nameof(destination));
        Spans.RequireSameOrApart(source, destination, nameof(destination));
        ref double from = ref MemoryMarshal.GetReference(source);
        ref double to = ref MemoryMarshal.GetReference(destination);
        nuint i = 0;
        nuint length = (nuint)source.Length;
        for (; i + 8 <= length; i += 8)
            TKernel.Of(Vector512.LoadUnsafe(ref from, i)).StoreUnsafe(ref to, i);
        for (; i < length; i++)
            Unsafe.Add(ref to, i) = TKernel.Of(Unsafe.Add(ref from, i));
    }
}
