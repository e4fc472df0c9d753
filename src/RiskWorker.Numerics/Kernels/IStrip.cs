using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>Adjacent scenarios of one row, held in registers.</summary>
internal interface IStrip<TSelf>
    where TSelf : struct, IStrip<TSelf>
{
    static abstract int Width { get; }

    static abstract TSelf Load(ref double from);

    void Store(ref double to);

    /// <summary>sum + factor·this, in one rounding an element.</summary>
    TSelf AddTo(TSelf sum, double factor);
}

/// <summary>Eight scenarios: four rows of them fill half of sixteen 256-bit registers.</summary>
internal readonly struct Strip8(Vector512<double> a) : IStrip<Strip8>
{
    private readonly Vector512<double> a = a;

    public static int Width => 8;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Strip8 Load(ref double from) => new(Vector512.LoadUnsafe(ref from));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Store(ref double to) => a.StoreUnsafe(ref to);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Strip8 AddTo(Strip8 sum, double factor) => new(Vector512.FusedMultiplyAdd(Vector512.Create(factor), a, sum.a));
}

/// <summary>Sixteen scenarios, for what twenty-four leave over.</summary>
internal readonly struct Strip16(Vector512<double> a, Vector512<double> b) : IStrip<Strip16>
{
    private readonly Vector512<double> a = a;
    private readonly Vector512<double> b = b;

    public static int Width => 16;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Strip16 Load(ref double from) => new(Vector512.LoadUnsafe(ref from), Vector512.LoadUnsafe(ref from, 8));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Store(ref double to)
    {
        a.StoreUnsafe(ref to);
        b.StoreUnsafe(ref to, 8);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Strip16 AddTo(Strip16 sum, double factor)
    {
        Vector512<double> f = Vector512.Create(factor);
        return new(Vector512.FusedMultiplyAdd(f, a, sum.a), Vector512.FusedMultiplyAdd(f, b, sum.b));
    }
}

/// <summary>Twenty-four scenarios: four rows of them fill 12 of thirty-two 512-bit registers.</summary>
internal readonly struct Strip24(Vector512<double> a, Vector512<double> b, Vector512<double> c) : IStrip<Strip24>
{
    private readonly Vector512<double> a = a;
    private readonly Vector512<double> b = b;
    private readonly Vector512<double> c = c;

    public static int Width => 24;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Strip24 Load(ref double from) =>
        new(Vector512.LoadUnsafe(ref from), Vector512.LoadUnsafe(ref from, 8), Vector512.LoadUnsafe(ref from, 16));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Store(ref double to)
    {
        a.StoreUnsafe(ref to);
        b.StoreUnsafe(ref to, 8);
        c.StoreUnsafe(ref to, 16);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Strip24 AddTo(Strip24 sum, double factor)
    {
        Vector512<double> f = Vector512.Create(factor);
        return new(
            Vector512.FusedMultiplyAdd(f, a, sum.a),
            Vector512.FusedMultiplyAdd(f, b, sum.b),
            Vector512.FusedMultiplyAdd(f, c, sum.c));
    }
}
