using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace RiskWorker.Numerics.Random;

/// <summary>The 64-bit products of the low 32 bits of eight lanes; the high 32 bits of the operands do not matter.</summary>
internal interface IWideProduct
{
    static abstract Vector512<ulong> Of(Vector512<ulong> a, Vector512<ulong> b);
}

/// <summary>One instruction for eight lanes.</summary>
internal readonly struct Avx512WideProduct : IWideProduct
{
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ulong> Of(Vector512<ulong> a, Vector512<ulong> b) => Avx512F.Multiply(a.AsUInt32(), b.AsUInt32());
}

/// <summary>One instruction for four lanes.</summary>
internal readonly struct Avx2WideProduct : IWideProduct
{
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ulong> Of(Vector512<ulong> a, Vector512<ulong> b) => Vector512.Create(
        Avx2.Multiply(a.GetLower().AsUInt32(), b.GetLower().AsUInt32()),
        Avx2.Multiply(a.GetUpper().AsUInt32(), b.GetUpper().AsUInt32()));
}

/// <summary>Any hardware: the product of two masked 64-bit lanes.</summary>
internal readonly struct PortableWideProduct : IWideProduct
{
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector512<ulong> Of(Vector512<ulong> a, Vector512<ulong> b)
    {
        Vector512<ulong> low = Vector512.Create(0xFFFFFFFFUL);
        return (a & low) * (b & low);
    }
}
