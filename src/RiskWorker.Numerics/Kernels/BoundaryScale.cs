using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Maps the interval from a boundary that scenarios move to a fixed end onto [-1, 1], the boundary to -1. What lies beyond the boundary
/// falls below -1, whichever side the end is on. Elementwise; a NaN stays one; allocates nothing.
/// </summary>
public static class BoundaryScale
{
    /// <summary>2 (x - boundary)/(end - boundary) - 1.</summary>
    public static double Of(double x, double boundary, double end) => Math.FusedMultiplyAdd(2.0, (x - boundary) / (end - boundary), -1.0);

    /// <summary>u[s] = 2 (x[s] - boundary[s])/(end - boundary[s]) - 1.</summary>
    /// <param name="x">Where.</param>
    /// <param name="boundary">The boundary of each scenario, as long as <paramref name="x"/>.</param>
    /// <param name="end">The other end, not on any boundary.</param>
    /// <param name="u">As long as <paramref name="x"/>; may be the memory of an argument.</param>
    [ScalarTwin(nameof(Of))]
    public static void Apply(ReadOnlySpan<double> x, ReadOnlySpan<double> boundary, double end, Span<double> u)
    {
        Spans.RequireLength(x.Length, boundary.Length, nameof(boundary));
        Spans.RequireLength(x.Length, u.Length, nameof(u));
        ref double from = ref MemoryMarshal.GetReference(x);
        ref double edges = ref MemoryMarshal.GetReference(boundary);
        ref double to = ref MemoryMarshal.GetReference(u);
        Vector512<double> ends = Vector512.Create(end), two = Vector512.Create(2.0), minusOne = Vector512.Create(-1.0);
        nuint s = 0, length = (nuint)x.Length;
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> edge = Vector512.LoadUnsafe(ref edges, s);
            Vector512.FusedMultiplyAdd(two, (Vector512.LoadUnsafe(ref from, s) - edge) / (ends - edge), minusOne).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < x.Length; i++)
            u[i] = Of(x[i], boundary[i], end);
    }
}
