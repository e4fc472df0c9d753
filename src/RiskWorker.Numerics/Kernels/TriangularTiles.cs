using System.Runtime.CompilerServices;

namespace RiskWorker.Numerics.Kernels;

/// <summary>The tiles of <see cref="TriangularProduct"/>: four rows by one strip of scenarios, summed in registers.</summary>
/// <remarks>
/// A strip's draws are first copied side by side, <see cref="Depth"/> rows at a time: in place they lie a row apart, which for
/// widths near a power of two puts all of them into the same few sets of the first-level cache. Between two depths the sums
/// rest in the moves, which rounds nothing. Depth and tile height are multiples of four, so that a tile meets the diagonal
/// within one depth.
/// </remarks>
internal readonly ref struct TriangularTiles(
    ref double lower, ref double draws, ref double moves, int rows, int rank, int width)
{
    private const int Depth = 128;
    private const int Height = 4;
    private const int Alignment = 64;

    private readonly ref double lower = ref lower;
    private readonly ref double draws = ref draws;
    private readonly ref double moves = ref moves;

    /// <summary>Does as many whole strips as fit from a column on, and returns the first column left.</summary>
    [SkipLocalsInit]
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public unsafe int Multiply<TStrip>(int column)
        where TStrip : struct, IStrip<TStrip>
    {
        byte* memory = stackalloc byte[(Depth * TStrip.Width * sizeof(double)) + Alignment];
        ref double packed = ref *(double*)(((nuint)memory + Alignment - 1) & ~(nuint)(Alignment - 1));
        for (; column + TStrip.Width <= width; column += TStrip.Width)
        {
            int start = 0;
            do
            {
                int end = Math.Min(start + Depth, rank);
                Pack<TStrip>(ref packed, start, end, column);
                int row = start;
                for (; row + Height <= rows; row += Height)
                    FourRows<TStrip>(ref packed, start, end, row, column);
                for (; row < rows; row++)
                    OneRow<TStrip>(ref packed, start, end, row, column);
                start = end;
            }
            while (start < rank);
        }

        return column;
    }

    private void Pack<TStrip>(ref double packed, int start, int end, int column)
        where TStrip : struct, IStrip<TStrip>
    {
        for (int j = start; j < end; j++)
            TStrip.Load(ref Draws(j, column)).Store(ref Unsafe.Add(ref packed, (nint)(j - start) * TStrip.Width));
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void FourRows<TStrip>(ref double packed, int start, int end, int row, int column)
        where TStrip : struct, IStrip<TStrip>
    {
        ref double l0 = ref Unsafe.Add(ref lower, ((nint)row * rank) + start);
        ref double l1 = ref Unsafe.Add(ref l0, rank);
        ref double l2 = ref Unsafe.Add(ref l1, rank);
        ref double l3 = ref Unsafe.Add(ref l2, rank);
        ref double x0 = ref Moves(row, column);
        ref double x1 = ref Unsafe.Add(ref x0, width);
        ref double x2 = ref Unsafe.Add(ref x1, width);
        ref double x3 = ref Unsafe.Add(ref x2, width);
        TStrip sum0 = default, sum1 = default, sum2 = default, sum3 = default;
        if (start > 0)
            (sum0, sum1, sum2, sum3) = (TStrip.Load(ref x0), TStrip.Load(ref x1), TStrip.Load(ref x2), TStrip.Load(ref x3));

        ref double z = ref packed;
        nint depth = end - start, common = Math.Min(row + 1, end) - start, j = 0;
        for (; j < common; j++)
        {
            TStrip strip = TStrip.Load(ref z);
            sum0 = strip.AddTo(sum0, Unsafe.Add(ref l0, j));
            sum1 = strip.AddTo(sum1, Unsafe.Add(ref l1, j));
            sum2 = strip.AddTo(sum2, Unsafe.Add(ref l2, j));
            sum3 = strip.AddTo(sum3, Unsafe.Add(ref l3, j));
            z = ref Unsafe.Add(ref z, TStrip.Width);
        }

        // The corner on the diagonal: one row fewer at each step.
        if (j < depth)
        {
            TStrip strip = TStrip.Load(ref z);
            sum1 = strip.AddTo(sum1, Unsafe.Add(ref l1, j));
            sum2 = strip.AddTo(sum2, Unsafe.Add(ref l2, j));
            sum3 = strip.AddTo(sum3, Unsafe.Add(ref l3, j));
        }

        if (++j < depth)
        {
            TStrip strip = TStrip.Load(ref Unsafe.Add(ref z, TStrip.Width));
            sum2 = strip.AddTo(sum2, Unsafe.Add(ref l2, j));
            sum3 = strip.AddTo(sum3, Unsafe.Add(ref l3, j));
        }

        if (++j < depth)
            sum3 = TStrip.Load(ref Unsafe.Add(ref z, 2 * TStrip.Width)).AddTo(sum3, Unsafe.Add(ref l3, j));

        sum0.Store(ref x0);
        sum1.Store(ref x1);
        sum2.Store(ref x2);
        sum3.Store(ref x3);
    }

    private void OneRow<TStrip>(ref double packed, int start, int end, int row, int column)
        where TStrip : struct, IStrip<TStrip>
    {
        ref double l = ref Unsafe.Add(ref lower, ((nint)row * rank) + start);
        ref double x = ref Moves(row, column);
        TStrip sum = start > 0 ? TStrip.Load(ref x) : default;
        for (nint j = 0, count = Math.Min(row + 1, end) - start; j < count; j++)
            sum = TStrip.Load(ref Unsafe.Add(ref packed, j * TStrip.Width)).AddTo(sum, Unsafe.Add(ref l, j));
        sum.Store(ref x);
    }

    private ref double Draws(int row, int column) => ref Unsafe.Add(ref draws, ((nint)row * width) + column);

    private ref double Moves(int row, int column) => ref Unsafe.Add(ref moves, ((nint)row * width) + column);
}
