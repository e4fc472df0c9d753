using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Sums in one fixed order: element i goes to lane i mod 8, each lane adds its elements in turn from +0, and the eight lanes
/// are added as ((0+4)+(2+6)) + ((1+5)+(3+7)). The width of the hardware is only a schedule.
/// </summary>
/// <remarks>An empty span gives 0; a NaN or infinities of both signs give NaN; allocates nothing.</remarks>
public static class LaneSum
{
    private const int Lanes = 8;

    /// <summary>The sum of the values.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(OfInTurn))]
    public static double Of(ReadOnlySpan<double> values)
    {
        ref double from = ref MemoryMarshal.GetReference(values);
        Vector512<double> lanes = Vector512<double>.Zero;
        int i = 0;
        for (; i + Lanes <= values.Length; i += Lanes)
            lanes += Vector512.LoadUnsafe(ref from, (nuint)i);
        return Tree(lanes + Rest(values[i..]));
    }

    /// <summary>The sum of the squares, each added by one fused multiply-add.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(OfSquaresInTurn))]
    public static double OfSquares(ReadOnlySpan<double> values)
    {
        ref double from = ref MemoryMarshal.GetReference(values);
        Vector512<double> lanes = Vector512<double>.Zero;
        int i = 0;
        for (; i + Lanes <= values.Length; i += Lanes)
        {
            Vector512<double> value = Vector512.LoadUnsafe(ref from, (nuint)i);
            lanes = Vector512.FusedMultiplyAdd(value, value, lanes);
        }

        Vector512<double> rest = Rest(values[i..]);
        return Tree(Vector512.FusedMultiplyAdd(rest, rest, lanes));
    }

    /// <summary>The scalar twin of <see cref="Of"/>.</summary>
    public static double OfInTurn(ReadOnlySpan<double> values)
    {
        Span<double> lanes = stackalloc double[Lanes];
        lanes.Clear();
        for (int i = 0; i < values.Length; i++)
            lanes[i % Lanes] += values[i];
        return Tree(lanes);
    }

    /// <summary>The scalar twin of <see cref="OfSquares"/>.</summary>
    public static double OfSquaresInTurn(ReadOnlySpan<double> values)
    {
        Span<double> lanes = stackalloc double[Lanes];
        lanes.Clear();
        for (int i = 0; i < values.Length; i++)
            lanes[i % Lanes] = Math.FusedMultiplyAdd(values[i], values[i], lanes[i % Lanes]);
        return Tree(lanes);
    }

    // A lane begins at +0 and so is never -0: adding the +0 of an absent element leaves its bits.
    private static Vector512<double> Rest(ReadOnlySpan<double> values)
    {
        Span<double> rest = stackalloc double[Lanes];
        rest.Clear();
        values.CopyTo(rest);
        return Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(rest));
    }

    private static double Tree(Vector512<double> lanes)
    {
        Vector256<double> four = lanes.GetLower() + lanes.GetUpper();
        Vector128<double> two = four.GetLower() + four.GetUpper();
        return two[0] + two[1];
    }

    private static double Tree(ReadOnlySpan<double> lanes) =>
        lanes[0] + lanes[4] + (lanes[2] + lanes[6]) + (lanes[1] + lanes[5] + (lanes[3] + lanes[7]));
}
