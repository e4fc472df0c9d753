using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing;

/// <summary>How what an option sees up to its expiry follows from the factors' levels. Options with equal terms share one reading of the market.</summary>
/// <param name="Discount">rT.</param>
/// <param name="Carry">qT.</param>
/// <param name="Variance">σ²T.</param>
public sealed record MarketTerms(LinearForm Discount, LinearForm Carry, VarianceForm Variance) : IComparable<MarketTerms>
{
    /// <summary>The market at <paramref name="levels"/> for an underlying that has moved to <paramref name="spot"/> by the log-return <paramref name="x"/>.</summary>
    public MarketPoint At(ReadOnlySpan<double> levels, double x, double spot) => new(x, spot, Discount.At(levels), Carry.At(levels), Math.Sqrt(Variance.At(levels)));

    /// <summary>By discount, carry, then variance.</summary>
    public int CompareTo(MarketTerms? other)
    {
        if (other is null) return 1;
        var order = Discount.CompareTo(other.Discount);
        if (order == 0) order = Carry.CompareTo(other.Carry);
        return order != 0 ? order : Variance.CompareTo(other.Variance);
    }

    /// <summary>Every factor that one of the forms reads.</summary>
    public IEnumerable<int> Factors() => [.. Discount.Factors, .. Carry.Factors, .. Variance.Terms.Select(t => t.Factor)];
}
