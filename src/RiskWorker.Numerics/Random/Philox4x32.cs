namespace RiskWorker.Numerics.Random;

/// <summary>
/// The counter-based generator Philox4x32-10: four output words are a pure function of four counter and two key words.
/// </summary>
/// <remarks>
/// J. K. Salmon, M. A. Moraes, R. O. Dror, D. E. Shaw, Parallel random numbers: as easy as 1, 2, 3 (SC11, 2011). Words are
/// named from the least significant. Integers only: every form gives the same bits by construction.
/// </remarks>
public static class Philox4x32
{
    internal const int Rounds = 10;
    internal const uint Multiplier0 = 0xD2511F53;
    internal const uint Multiplier1 = 0xCD9E8D57;
    internal const uint Weyl0 = 0x9E3779B9;
    internal const uint Weyl1 = 0xBB67AE85;

    /// <summary>The block of four words that belongs to a counter and a key.</summary>
    public static (uint Word0, uint Word1, uint Word2, uint Word3) Block(
        (uint Word0, uint Word1, uint Word2, uint Word3) counter, (uint Word0, uint Word1) key)
    {
        (uint c0, uint c1, uint c2, uint c3) = counter;
        (uint k0, uint k1) = key;
        for (int round = 0; round < Rounds; round++)
        {
            ulong product0 = (ulong)Multiplier0 * c0;
            ulong product1 = (ulong)Multiplier1 * c2;
            c0 = (uint)(product1 >> 32) ^ c1 ^ k0;
            c1 = (uint)product1;
            c2 = (uint)(product0 >> 32) ^ c3 ^ k1;
            c3 = (uint)product0;
            k0 = unchecked(k0 + Weyl0);
            k1 = unchecked(k1 + Weyl1);
        }

        return (c0, c1, c2, c3);
    }
}
