using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>The update y ← y + a·x, each element one fused multiply-add, so that the width of a vector is only a schedule.</summary>
internal static class Axpy
{
    /// <summary>Adds <paramref name="a"/> times <paramref name="x"/> to <paramref name="y"/>; both have one length.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Add(double a, ReadOnlySpan<double> x, Span<double> y)
    {
        var wideX = MemoryMarshal.Cast<double, Vector<double>>(x);
        var wideY = MemoryMarshal.Cast<double, Vector<double>>(y);
        var wideA = new Vector<double>(a);
        for (var i = 0; i < wideY.Length; i++) wideY[i] = Vector.FusedMultiplyAdd(wideA, wideX[i], wideY[i]);
        for (var i = wideY.Length * Vector<double>.Count; i < y.Length; i++) y[i] = Math.FusedMultiplyAdd(a, x[i], y[i]);
    }
}
