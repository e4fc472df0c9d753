using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Random;

/// <summary>Philox4x32-10 in eight 64-bit lanes, one consecutive scenario each.</summary>
internal static class PhiloxLanes
{
    /// <summary>Words 1:0 and 3:2 of the blocks of eight scenarios, each pair of words as one 64-bit number.</summary>
    /// <remarks>
    /// A lane holds one 32-bit word in its low half. What the rounds leave in the high half is never read: the product
    /// takes low halves only, and the last step masks.
    /// </remarks>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static (Vector512<ulong> First, Vector512<ulong> Second) Blocks<TProduct>(
        Vector512<ulong> scenario, uint pair, uint stream, (uint Word0, uint Word1) key)
        where TProduct : struct, IWideProduct
    {
        Vector512<ulong> multiplier0 = Vector512.Create((ulong)Philox4x32.Multiplier0);
        Vector512<ulong> multiplier1 = Vector512.Create((ulong)Philox4x32.Multiplier1);
        Vector512<ulong> c0 = scenario, c1 = scenario >> 32;
        Vector512<ulong> c2 = Vector512.Create((ulong)pair), c3 = Vector512.Create((ulong)stream);
        (uint k0, uint k1) = key;
        for (int round = 0; round < Philox4x32.Rounds; round++)
        {
            Vector512<ulong> product0 = TProduct.Of(multiplier0, c0);
            Vector512<ulong> product1 = TProduct.Of(multiplier1, c2);
            c0 = (product1 >> 32) ^ c1 ^ Vector512.Create((ulong)k0);
            c2 = (product0 >> 32) ^ c3 ^ Vector512.Create((ulong)k1);
            c1 = product1;
            c3 = product0;
            k0 = unchecked(k0 + Philox4x32.Weyl0);
            k1 = unchecked(k1 + Philox4x32.Weyl1);
        }

        Vector512<ulong> low = Vector512.Create(0xFFFFFFFFUL);
        return ((c1 << 32) | (c0 & low), (c3 << 32) | (c2 & low));
    }
}
