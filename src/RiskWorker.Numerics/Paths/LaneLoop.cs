using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>An operation on an element and what stands in its place of the destination, in two forms that agree to the last bit.</summary>
internal interface ILaneOperation
{
    double Of(double value, double total);

    Vector512<double> Of(Vector512<double> value, Vector512<double> total);
}

/// <summary>The loops of the paths: eight lanes at a time, the rest by the scalar form; and the sums over them.</summary>
internal static class LaneLoop
{
    /// <summary>to[i] = operation(from[i], to[i]); the same memory or apart.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Apply<TOperation>(TOperation operation, ReadOnlySpan<double> from, Span<double> to)
        where TOperation : struct, ILaneOperation
    {
        Spans.RequireLength(from.Length, to.Length, nameof(to));
        ref double source = ref MemoryMarshal.GetReference(from);
        ref double target = ref MemoryMarshal.GetReference(to);
        nuint i = 0, length = (nuint)from.Length;
        for (; i + 8 <= length; i += 8)
            operation.Of(Vector512.LoadUnsafe(ref source, i), Vector512.LoadUnsafe(ref target, i)).StoreUnsafe(ref target, i);
        for (; i < length; i++)
            Unsafe.Add(ref target, i) = operation.Of(Unsafe.Add(ref source, i), Unsafe.Add(ref target, i));
    }

    /// <summary>Σ a[i]·b[i], in the order of <see cref="LaneSum"/>, each product added by one fused multiply-add; lengths a multiple of eight.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(DotInTurn))]
    public static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        Spans.RequireLength(a.Length, b.Length, nameof(b));
        ref double left = ref MemoryMarshal.GetReference(a);
        ref double right = ref MemoryMarshal.GetReference(b);
        Vector512<double> lanes = Vector512<double>.Zero;
        for (nuint i = 0; i + 8 <= (nuint)a.Length; i += 8)
            lanes = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref left, i), Vector512.LoadUnsafe(ref right, i), lanes);
        Vector256<double> four = lanes.GetLower() + lanes.GetUpper();
        Vector128<double> two = four.GetLower() + four.GetUpper();
        return two[0] + two[1];
    }

    /// <summary>The scalar twin of <see cref="Dot"/>.</summary>
    public static double DotInTurn(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        Span<double> lane = stackalloc double[8];
        lane.Clear();
        for (int i = 0; i < a.Length; i++)
            lane[i % 8] = Math.FusedMultiplyAdd(a[i], b[i], lane[i % 8]);
        return lane[0] + lane[4] + (lane[2] + lane[6]) + (lane[1] + lane[5] + (lane[3] + lane[7]));
    }
}
