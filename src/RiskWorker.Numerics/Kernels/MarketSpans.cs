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

    /// <summary>The <paramref name="length"/> scenarios from <paramref name="first"/> on.</summary>
    public MarketSpans Slice(int first, int length) => new(
        X.Slice(first, length), Spot.Slice(first, length), Discount.Slice(first, length), Carry.Slice(first, length), Deviation.Slice(first, length));

    /// <summary>Guards what a kernel writes to.</summary>
    internal void RequireProfit(ReadOnlySpan<double> profit)
    {
        Spans.RequireLength(Length, profit.Length, nameof(profit));
        if (profit.Overlaps(X) || profit.Overlaps(Spot) || profit.Overlaps(Discount) || profit.Overlaps(Carry) || profit.Overlaps(Deviation))
            throw new ArgumentException("The profit overlaps an argument; it must be apart.", nameof(profit));
    }
}
