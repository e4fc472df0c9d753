using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>A <see cref="MarketPoint"/> for each scenario of a block, as five spans of one length.</summary>
public readonly ref struct MarketSpans
{
    /// <param name="x">Log-returns of the underlying.</param>
    /// <param name="spot">Its levels.</param>
    /// <param name="discount">rT.</param>
    /// <param name="carry">qT.</param>
    /// <param name="deviation">σ√T.</param>
    /// <exception cref="ArgumentException">A span is not as long as <paramref name="x"/>.</exception>
    public MarketSpans(
        ReadOnlySpan<double> x, ReadOnlySpan<double> spot, ReadOnlySpan<double> discount, ReadOnlySpan<double> carry, ReadOnlySpan<double> deviation)
    {
        Spans.RequireLength(x.Length, spot.Length, nameof(spot));
        Spans.RequireLength(x.Length, discount.Length, nameof(discount));
        Spans.RequireLength(x.Length, carry.Length, nameof(carry));
        Spans.RequireLength(x.Length, deviation.Length, nameof(deviation));
        X = x;
        Spot = spot;
        Discount = discount;
        Carry = carry;
        Deviation = deviation;
    }

    /// <summary>Log-returns of the underlying.</summary>
    public ReadOnlySpan<double> X { get; }

    /// <summary>Levels of the underlying.</summary>
    public ReadOnlySpan<double> Spot { get; }

    /// <summary>rT.</summary>
    public ReadOnlySpan<double> Discount { get; }

    /// <summary>qT.</summary>
    public ReadOnlySpan<double> Carry { get; }

    /// <summary>σ√T.</summary>
    public ReadOnlySpan<double> Deviation { get; }

    /// <summary>How many scenarios there are.</summary>
    public int Length => X.Length;

    /// <summary>One scenario.</summary>
    public MarketPoint this[int scenario] => new(X[scenario], Spot[scenario], Discount[scenario], Carry[scenario], Deviation[scenario]);

    /// <summary>Eight scenarios from <paramref name="first"/> on.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    internal MarketLanes Eight(nuint first) => new(
        Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(X), first),
        Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(Spot), first),
        Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(Discount), first),
        Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(Carry), first),
        Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(Deviation), first));

    /// <summary>Guards what a kernel writes to.</summary>
    internal void RequireProfit(ReadOnlySpan<double> profit)
    {
        Spans.RequireLength(Length, profit.Length, nameof(profit));
        if (profit.Overlaps(X) || profit.Overlaps(Spot) || profit.Overlaps(Discount) || profit.Overlaps(Carry) || profit.Overlaps(Deviation))
            throw new ArgumentException("The profit overlaps an argument; it must be apart.", nameof(profit));
    }
}

/// <summary>Eight <see cref="MarketPoint"/>s in lanes.</summary>
internal readonly struct MarketLanes(
    Vector512<double> x, Vector512<double> spot, Vector512<double> discount, Vector512<double> carry, Vector512<double> deviation)
{
    public readonly Vector512<double> X = x;
    public readonly Vector512<double> Spot = spot;
    public readonly Vector512<double> Discount = discount;
    public readonly Vector512<double> Carry = carry;
    public readonly Vector512<double> Deviation = deviation;
}
