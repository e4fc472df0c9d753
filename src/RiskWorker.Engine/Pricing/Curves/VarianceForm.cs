using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>
/// Total variance to an expiry, sigma^2 T: a constant plus the sum of weight times the square of a volatility factor's level, factors ascending.
/// </summary>
public sealed class VarianceForm : IEquatable<VarianceForm>, IComparable<VarianceForm>
{
    private readonly (int Factor, double Weight)[] _terms;

    internal VarianceForm(double constant, params (int Factor, double Weight)[] terms)
    {
        Constant = constant;
        _terms = [.. terms.Where(t => t.Weight != 0).OrderBy(t => t.Factor)];
    }

    /// <summary>The part that no factor moves: that of a flat volatility.</summary>
    public double Constant { get; }

    /// <summary>Places of the volatility factors, ascending, and their weights.</summary>
    public IReadOnlyList<(int Factor, double Weight)> Terms => _terms;

    /// <summary>The same as a span, for loops over scenarios.</summary>
    internal ReadOnlySpan<(int Factor, double Weight)> Span => _terms;

    /// <summary>Its value: fused multiply-adds onto the constant, factors ascending. NaN where a level that it needs is NaN.</summary>
    public double At(ReadOnlySpan<double> levels)
    {
        var value = Constant;
        foreach (var (factor, weight) in _terms) value = Elementwise.AddSquare(levels[factor], weight, value);
        return value;
    }

    /// <inheritdoc/>
    public bool Equals(VarianceForm? other) => other is not null && CompareTo(other) == 0;

    /// <inheritdoc/>
    public override bool Equals(object? obj) => Equals(obj as VarianceForm);

    /// <inheritdoc/>
    public override int GetHashCode() => HashCode.Combine(Constant, _terms.Length, _terms.Length > 0 ? _terms[0] : default);

    /// <summary>By number of factors, then factor by factor with its weight, then by the constant.</summary>
    public int CompareTo(VarianceForm? other)
    {
        if (other is null) return 1;
        var order = _terms.Length.CompareTo(other._terms.Length);
        for (var i = 0; order == 0 && i < _terms.Length; i++) order = _terms[i].CompareTo(other._terms[i]);
        return order != 0 ? order : Constant.CompareTo(other.Constant);
    }
}
