using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Rows of intermediate numbers for up to <see cref="Width"/> scenarios, a multiple of eight, small enough for the first-level cache.
/// </summary>
/// <remarks>
/// A formula with many exponentials and tails goes over them in short loops, one thing a loop. In one long loop it asks for more inlined
/// operations than the compiler grants, and where 512 bits are two halves those that are left over are calls (measured: 12 times slower).
/// For the same reason a loop is never inlined: once profiled its caller would take in all of them (measured: 8 times slower).
/// </remarks>
internal readonly ref struct Workbench(Span<double> room, int length)
{
    public const int Width = 128;

    /// <summary>How a method with one such loop is compiled: apart, and in full at once.</summary>
    public const MethodImplOptions Loop = MethodImplOptions.NoInlining | MethodImplOptions.AggressiveOptimization;

    private readonly Span<double> room = room;

    /// <summary>Scenarios in each row.</summary>
    public int Length { get; } = length;

    /// <summary>The number of the row of results, before all others.</summary>
    public const int Result = -1;

    /// <summary>The row of results.</summary>
    public Span<double> Values => this[Result];

    /// <summary>Row <paramref name="row"/>.</summary>
    public Span<double> this[int row] => room.Slice((row + 1) * Width, Length);

    /// <summary>Where row <paramref name="row"/> starts, for the loops.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public ref double Row(int row) => ref Unsafe.Add(ref MemoryMarshal.GetReference(room), (row + 1) * Width);

    /// <summary>Eight numbers of a row.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Load(int row, nuint first) => Vector512.LoadUnsafe(ref Row(row), first);

    /// <summary>Writes eight numbers of a row.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Store(int row, nuint first, Vector512<double> eight) => eight.StoreUnsafe(ref Row(row), first);

    /// <summary>e^x in place over <paramref name="count"/> rows from <paramref name="row"/> on.</summary>
    [MethodImpl(Loop)]
    public void Exponentials(int row, int count)
    {
        Span<double> rows = room.Slice((row + 1) * Width, count * Width);
        if (Length == Width)
        {
            Exponential.Of(rows, rows);
            return;
        }

        for (int r = row; r < row + count; r++)
            Exponential.Of(this[r], this[r]);
    }

    /// <summary>
    /// Adds the tails of <paramref name="count"/> terms to row <paramref name="sum"/>, in turn: the weights stand in rows from
    /// <paramref name="weight"/> on, the arguments d in rows from <paramref name="argument"/> on; see <see cref="WeightedTail.Add"/>.
    /// </summary>
    [MethodImpl(Workbench.Loop)]
    public void AddTails(int sum, int weight, int argument, int count)
    {
        ref double sums = ref Row(sum);
        ref double weights = ref Row(weight);
        ref double arguments = ref Row(argument);
        Vector512<double> zero = Vector512<double>.Zero, highest = Vector512.Create(WeightedTail.HighestD);
        for (nuint s = 0; s < (nuint)Length; s += 8)
        {
            Vector512<double> total = Vector512.LoadUnsafe(ref sums, s);
            nuint at = s;
            for (int term = 0; term < count; term++, at += Width)
            {
                Vector512<double> d = Vector512.LoadUnsafe(ref arguments, at), w = Vector512.LoadUnsafe(ref weights, at);
                Vector512<double> t = Vector512.Abs(d);
                t = Vector512.ConditionalSelect(Vector512.GreaterThan(t, highest), highest, t);
                w = Vector512.ConditionalSelect(Vector512.GreaterThan(d, zero), -w, w);
                total = Vector512.FusedMultiplyAdd(w, ScaledNormalTail.Of(t), total);
            }

            total.StoreUnsafe(ref sums, s);
        }
    }
}
