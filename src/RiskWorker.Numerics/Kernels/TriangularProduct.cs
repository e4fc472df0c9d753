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
        var tiles = new TriangularTiles(
            ref MemoryMarshal.GetReference(lower), ref MemoryMarshal.GetReference(draws), ref MemoryMarshal.GetReference(moves),
            rows, rank, width);
        int s = 0;
        if (Vector512.IsHardwareAccelerated)
        {
            s = tiles.Multiply<Strip24>(s);
            s = tiles.Multiply<Strip16>(s);
        }

        s = tiles.Multiply<Strip8>(s);
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
}
