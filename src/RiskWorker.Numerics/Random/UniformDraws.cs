using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Random;

/// <summary>
/// Uniform numbers u = (m + ½)·2^-52 with m the top 52 bits of a 64-bit word: never 0 or 1, symmetric about ½.
/// </summary>
/// <remarks>
/// Draw j of scenario i of a stream is a pure function of (stream, i, j): counter words 0 and 1 are the scenario, word 2
/// the pair j/2, word 3 the stream. The even draw takes output words 1:0, the odd one 3:2.
/// </remarks>
public static class UniformDraws
{
    // Bits 0x3FF and a 52-bit fraction m make 1 + m·2^-52; taking off 1 - 2^-53 is exact and leaves (m + ½)·2^-52.
    private const ulong OneBits = 0x3FF0000000000000UL;
    private const double OneLessHalf = 1.0 - 1.1102230246251565e-16;

    /// <summary>One draw of one scenario.</summary>
    public static double At(DrawStream stream, ulong scenario, uint draw)
    {
        (uint w0, uint w1, uint w2, uint w3) = Philox4x32.Block(
            ((uint)scenario, (uint)(scenario >> 32), draw >> 1, stream.Word), stream.Key);
        return (draw & 1) == 0 ? Uniform(((ulong)w1 << 32) | w0) : Uniform(((ulong)w3 << 32) | w2);
    }

    /// <summary>Both draws of a pair for consecutive scenarios; allocates nothing.</summary>
    /// <param name="stream">The stream.</param>
    /// <param name="firstScenario">Scenario of element 0; the last one may not pass 2^64 - 1.</param>
    /// <param name="pair">Draws 2·pair and 2·pair + 1.</param>
    /// <param name="first">Element s receives draw 2·pair of scenario firstScenario + s.</param>
    /// <param name="second">Element s receives draw 2·pair + 1; as long as <paramref name="first"/>, and apart from it.</param>
    /// <exception cref="ArgumentException">The spans differ in length or overlap.</exception>
    [ScalarTwin(nameof(At))]
    public static void FillPair(DrawStream stream, ulong firstScenario, uint pair, Span<double> first, Span<double> second)
    {
        Spans.RequireLength(first.Length, second.Length, nameof(second));
        if (first.Overlaps(second))
            throw new ArgumentException("The two destinations overlap; they must be apart.", nameof(second));
        if (pair > uint.MaxValue / 2)
            throw new ArgumentOutOfRangeException(nameof(pair), pair, $"The pair is {pair}; it must be 0 to {uint.MaxValue / 2}.");
        if (Avx512F.IsSupported)
            FillPair<Avx512WideProduct>(stream, firstScenario, pair, first, second);
        else if (Avx2.IsSupported)
            FillPair<Avx2WideProduct>(stream, firstScenario, pair, first, second);
        else
            FillPair<PortableWideProduct>(stream, firstScenario, pair, first, second);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    internal static void FillPair<TProduct>(
        DrawStream stream, ulong firstScenario, uint pair, Span<double> first, Span<double> second)
        where TProduct : struct, IWideProduct
    {
        ref double even = ref MemoryMarshal.GetReference(first);
        ref double odd = ref MemoryMarshal.GetReference(second);
        nuint length = (nuint)first.Length;
        (uint Word0, uint Word1) key = stream.Key;
        Vector512<ulong> scenario = Vector512.Create(firstScenario) + Vector512<ulong>.Indices;
        nuint s = 0;
        for (; s + 8 <= length; s += 8)
        {
            (Vector512<ulong> words10, Vector512<ulong> words32) = PhiloxLanes.Blocks<TProduct>(scenario, pair, stream.Word, key);
            Uniform(words10).StoreUnsafe(ref even, s);
            Uniform(words32).StoreUnsafe(ref odd, s);
            scenario += Vector512.Create(8UL);
        }

        for (; s < length; s++)
        {
            Unsafe.Add(ref even, s) = At(stream, firstScenario + s, 2 * pair);
            Unsafe.Add(ref odd, s) = At(stream, firstScenario + s, (2 * pair) + 1);
        }
    }

    private static double Uniform(ulong word) => BitConverter.UInt64BitsToDouble((word >> 12) | OneBits) - OneLessHalf;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Uniform(Vector512<ulong> word) =>
        ((word >> 12) | Vector512.Create(OneBits)).AsDouble() - Vector512.Create(OneLessHalf);
}
