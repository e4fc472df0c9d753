namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>
/// c + a_1 x_1 + a_2 x_2 + ... in the levels x of the run's factors: what a zero rate times its time is under either interpolation.
/// Factors ascend, none comes twice, no coefficient is 0, every number is finite and no zero is negative; so two forms are equal
/// when they are the same function, written with the same numbers, and equal forms give equal bits at all levels.
/// </summary>
public sealed class LinearForm : IEquatable<LinearForm>, IComparable<LinearForm>
{
    private readonly int[] _factors;
    private readonly double[] _coefficients;

    private LinearForm(double constant, int[] factors, double[] coefficients)
    {
        if (!double.IsFinite(constant) || !Array.TrueForAll(coefficients, double.IsFinite))
            throw new ArgumentException("A linear form has finite numbers only.");
        Constant = constant + 0.0; // -0 becomes 0
        (_factors, _coefficients) = (factors, coefficients);
    }

    /// <summary>The form that is 0 at all levels.</summary>
    public static LinearForm Zero { get; } = Of(0);

    /// <summary>c.</summary>
    public double Constant { get; }

    /// <summary>Places of the factors in the factor list, ascending.</summary>
    public ReadOnlySpan<int> Factors => _factors;

    /// <summary>Their coefficients, in the same order.</summary>
    public ReadOnlySpan<double> Coefficients => _coefficients;

    /// <summary>The form that is <paramref name="constant"/> at all levels.</summary>
    public static LinearForm Of(double constant) => new(constant, [], []);

    /// <summary><paramref name="coefficient"/> times the level of <paramref name="factor"/>.</summary>
    public static LinearForm Of(int factor, double coefficient)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(factor);
        return coefficient == 0 ? Zero : new(0, [factor], [coefficient]);
    }

    /// <summary>The sum of two factors' levels, each times its coefficient.</summary>
    public static LinearForm Of(int factor, double coefficient, int other, double otherCoefficient) =>
        Of(factor, coefficient).Plus(Of(other, otherCoefficient));

    /// <summary>This form and <paramref name="other"/> added, coefficient by coefficient.</summary>
    public LinearForm Plus(LinearForm other) => Combined(other, 1);

    /// <summary>This form less <paramref name="other"/>; equal forms give <see cref="Zero"/>.</summary>
    public LinearForm Minus(LinearForm other) => Combined(other, -1);

    /// <summary>This form times <paramref name="multiple"/>.</summary>
    public LinearForm Times(double multiple)
    {
        var (factors, coefficients) = (new List<int>(_factors.Length), new List<double>(_factors.Length));
        for (var i = 0; i < _factors.Length; i++) Add(factors, coefficients, _factors[i], _coefficients[i] * multiple);
        return new(Constant * multiple, [.. factors], [.. coefficients]);
    }

    /// <summary>Its value: fused multiply-adds onto the constant, factors ascending. NaN where a level that it needs is NaN.</summary>
    public double At(ReadOnlySpan<double> levels)
    {
        var value = Constant;
        for (var i = 0; i < _factors.Length; i++) value = Math.FusedMultiplyAdd(_coefficients[i], levels[_factors[i]], value);
        return value;
    }

    /// <inheritdoc/>
    public bool Equals(LinearForm? other) =>
        other is not null && Constant == other.Constant && Factors.SequenceEqual(other._factors) && Coefficients.SequenceEqual(other._coefficients);

    /// <inheritdoc/>
    public override bool Equals(object? obj) => Equals(obj as LinearForm);

    /// <inheritdoc/>
    public override int GetHashCode()
    {
        var hash = new HashCode();
        hash.Add(Constant);
        for (var i = 0; i < _factors.Length; i++)
        {
            hash.Add(_factors[i]);
            hash.Add(_coefficients[i]);
        }
        return hash.ToHashCode();
    }

    /// <summary>By factors, then by coefficients, then by the constant; a form whose factors begin another's comes first.</summary>
    public int CompareTo(LinearForm? other)
    {
        if (other is null) return 1;
        var order = Factors.SequenceCompareTo(other._factors);
        if (order == 0) order = Coefficients.SequenceCompareTo(other._coefficients);
        return order != 0 ? order : Constant.CompareTo(other.Constant);
    }

    /// <summary>As in '0.5 + 2 x[3]'.</summary>
    public override string ToString() =>
        string.Join(" + ", _factors.Select((f, i) => FormattableString.Invariant($"{_coefficients[i]} x[{f}]")).Prepend(FormattableString.Invariant($"{Constant}")));

    // Both lists ascend: one pass takes the smaller factor of the two, or both where they are equal.
    private LinearForm Combined(LinearForm other, int sign)
    {
        if (other._factors.Length == 0 && other.Constant == 0) return this;
        var (factors, coefficients) = (new List<int>(_factors.Length + other._factors.Length), new List<double>(_factors.Length + other._factors.Length));
        for (int i = 0, j = 0; i < _factors.Length || j < other._factors.Length;)
        {
            var mine = i < _factors.Length ? _factors[i] : int.MaxValue;
            var theirs = j < other._factors.Length ? other._factors[j] : int.MaxValue;
            var coefficient = (mine <= theirs ? _coefficients[i++] : 0) + (theirs <= mine ? sign * other._coefficients[j++] : 0);
            Add(factors, coefficients, Math.Min(mine, theirs), coefficient);
        }
        return new(Constant + (sign * other.Constant), [.. factors], [.. coefficients]);
    }

    private static void Add(List<int> factors, List<double> coefficients, int factor, double coefficient)
    {
        if (coefficient == 0) return;
        factors.Add(factor);
        coefficients.Add(coefficient);
    }
}
