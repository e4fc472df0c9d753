using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Correlated moves from independent draws: moves[i, s] = Σ lower[i, j]·draws[j, s] over j = 0 … min(i, rank - 1).
/// </summary>
/// <remarks>
/// Each sum is one chain of fused multiply-adds from +0 in ascending j: that order defines the bits, and the tiling in
/// registers only says which chains run side by side. Entries above the diagonal are never read. Allocates nothing.
/// </remarks>
public static class TriangularProduct
{
    /// <summary>Multiplies a lower trapezoidal matrix by a block of draws.</summary>
    /// <param name="lower">rows × rank, row by row.</param>
    /// <param name="rows">Factors.</param>
    /// <param name="rank">Independent draws a scenario; at most <paramref name="rows"/>.</param>
    /// <param name="draws">rank × width, row by row.</param>
    /// <param name="moves">rows × width, row by row; apart from the operands.</param>
    /// <param name="width">Scenarios.</param>
    /// <exception cref="ArgumentException">A span's length does not follow from the shape, or moves overlap an operand.</exception>
    [ScalarTwin(nameof(MultiplyInTurn))]
    public static void Multiply(
        ReadOnlySpan<double> lower, int rows, int rank, ReadOnlySpan<double> draws, Span<double> moves, int width)
    {
        Require(lower, rows, rank, draws, moves, width);
        var block = new Block(
            ref MemoryMarshal.GetReference(lower), ref MemoryMarshal.GetReference(draws), ref MemoryMarshal.GetReference(moves), rank, width);
        int s = 0;
        if (Vector512.IsHardwareAccelerated)
            s = block.Panels<Strip24>(rows, s);
        s = block.Panels<Strip8>(rows, s);
        Columns(lower, rows, rank, draws, moves, width, s);
    }

    /// <summary>The scalar twin of <see cref="Multiply"/>.</summary>
    public static void MultiplyInTurn(
        ReadOnlySpan<double> lower, int rows, int rank, ReadOnlySpan<double> draws, Span<double> moves, int width)
    {
        Require(lower, rows, rank, draws, moves, width);
        Columns(lower, rows, rank, draws, moves, width, 0);
    }

    private static void Columns(
        ReadOnlySpan<double> lower, int rows, int rank, ReadOnlySpan<double> draws, Span<double> moves, int width, int firstColumn)
    {
        for (int i = 0; i < rows; i++)
        {
            ReadOnlySpan<double> row = lower.Slice(i * rank, Math.Min(i + 1, rank));
            for (int s = firstColumn; s < width; s++)
            {
                double sum = 0.0;
                for (int j = 0; j < row.Length; j++)
                    sum = Math.FusedMultiplyAdd(row[j], draws[(j * width) + s], sum);
                moves[(i * width) + s] = sum;
            }
        }
    }

    private static void Require(
        ReadOnlySpan<double> lower, int rows, int rank, ReadOnlySpan<double> draws, ReadOnlySpan<double> moves, int width)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(rows);
        ArgumentOutOfRangeException.ThrowIfNegative(width);
        ArgumentOutOfRangeException.ThrowIfNegative(rank);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(rank, rows);
        Spans.RequireLength(checked(rows * rank), lower.Length, nameof(lower));
        Spans.RequireLength(checked(rank * width), draws.Length, nameof(draws));
        Spans.RequireLength(checked(rows * width), moves.Length, nameof(moves));
        if (moves.Overlaps(draws) || moves.Overlaps(lower))
            throw new ArgumentException("The moves overlap an operand; they must be apart.", nameof(moves));
    }

    private readonly ref struct Block(ref double lower, ref double draws, ref double moves, int rank, int width)
    {
        private readonly ref double lower = ref lower;
        private readonly ref double draws = ref draws;
        private readonly ref double moves = ref moves;

        /// <summary>Does as many whole strips as fit from a column on, and returns the first column left.</summary>
        public int Panels<TStrip>(int rows, int column)
            where TStrip : struct, IStrip<TStrip>
        {
            for (; column + TStrip.Width <= width; column += TStrip.Width)
            {
                int i = 0;
                for (; i + 4 <= rows; i += 4)
                    FourRows<TStrip>(i, column);
                for (; i < rows; i++)
                    OneRow<TStrip>(i, column);
            }

            return column;
        }

        private void FourRows<TStrip>(int row, int column)
            where TStrip : struct, IStrip<TStrip>
        {
            ref double l0 = ref Unsafe.Add(ref lower, (nint)row * rank);
            ref double l1 = ref Unsafe.Add(ref l0, rank);
            ref double l2 = ref Unsafe.Add(ref l1, rank);
            ref double l3 = ref Unsafe.Add(ref l2, rank);
            ref double z = ref Unsafe.Add(ref draws, column);
            TStrip sum0 = default, sum1 = default, sum2 = default, sum3 = default;
            nint common = Math.Min(row + 1, rank);
            nint j = 0;
            for (; j < common; j++)
            {
                TStrip strip = TStrip.Load(ref z);
                sum0 = strip.AddTo(sum0, Unsafe.Add(ref l0, j));
                sum1 = strip.AddTo(sum1, Unsafe.Add(ref l1, j));
                sum2 = strip.AddTo(sum2, Unsafe.Add(ref l2, j));
                sum3 = strip.AddTo(sum3, Unsafe.Add(ref l3, j));
                z = ref Unsafe.Add(ref z, width);
            }

            // The corner on the diagonal: one row fewer at each step.
            if (j < rank)
            {
                TStrip strip = TStrip.Load(ref z);
                sum1 = strip.AddTo(sum1, Unsafe.Add(ref l1, j));
                sum2 = strip.AddTo(sum2, Unsafe.Add(ref l2, j));
                sum3 = strip.AddTo(sum3, Unsafe.Add(ref l3, j));
            }

            if (++j < rank)
            {
                TStrip strip = TStrip.Load(ref Unsafe.Add(ref z, width));
                sum2 = strip.AddTo(sum2, Unsafe.Add(ref l2, j));
                sum3 = strip.AddTo(sum3, Unsafe.Add(ref l3, j));
            }

            if (++j < rank)
                sum3 = TStrip.Load(ref Unsafe.Add(ref z, 2 * (nint)width)).AddTo(sum3, Unsafe.Add(ref l3, j));

            ref double x = ref Unsafe.Add(ref moves, ((nint)row * width) + column);
            sum0.Store(ref x);
            sum1.Store(ref Unsafe.Add(ref x, width));
            sum2.Store(ref Unsafe.Add(ref x, 2 * (nint)width));
            sum3.Store(ref Unsafe.Add(ref x, 3 * (nint)width));
        }

        private void OneRow<TStrip>(int row, int column)
            where TStrip : struct, IStrip<TStrip>
        {
            ref double l = ref Unsafe.Add(ref lower, (nint)row * rank);
            ref double z = ref Unsafe.Add(ref draws, column);
            TStrip sum = default;
            for (nint j = 0, count = Math.Min(row + 1, rank); j < count; j++)
            {
                sum = TStrip.Load(ref z).AddTo(sum, Unsafe.Add(ref l, j));
                z = ref Unsafe.Add(ref z, width);
            }

            sum.Store(ref Unsafe.Add(ref moves, ((nint)row * width) + column));
        }
    }
}
