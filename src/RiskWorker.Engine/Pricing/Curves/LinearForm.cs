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
    public static LinearForm Of(int factor, double coefficient) => Of(factor, coefficient, factor, 0);

    /// <summary>The sum of two factors' levels, each times its coefficient.</summary>
    public static LinearForm Of(int factor, double coefficient, int other, double otherCoefficient) =>
        Combined(0, [(factor, coefficient), (other, otherCoefficient)]);

    /// <summary>This form and <paramref name="other"/> added, coefficient by coefficient.</summary>
    public LinearForm Plus(LinearForm other) => Combined(Constant + other.Constant, [.. Terms(1), .. other.Terms(1)]);

    /// <summary>This form less <paramref name="other"/>; equal forms give <see cref="Zero"/>.</summary>
    public LinearForm Minus(LinearForm other) => Combined(Constant - other.Constant, [.. Terms(1), .. other.Terms(-1)]);

    /// <summary>This form times <paramref name="multiple"/>.</summary>
    public LinearForm Times(double multiple) => Combined(Constant * multiple, Terms(multiple));

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

    private (int Factor, double Coefficient)[] Terms(double multiple) => [.. _factors.Select((f, i) => (f, _coefficients[i] * multiple))];

    private static LinearForm Combined(double constant, (int Factor, double Coefficient)[] terms)
    {
        var factors = new List<int>(terms.Length);
        var coefficients = new List<double>(terms.Length);
        // Sorting is stable: coefficients of one factor are added in the order in which they came.
        foreach (var (factor, coefficient) in terms.OrderBy(t => t.Factor))
        {
            ArgumentOutOfRangeException.ThrowIfNegative(factor);
            if (factors.Count > 0 && factors[^1] == factor) coefficients[^1] += coefficient;
            else
            {
                factors.Add(factor);
                coefficients.Add(coefficient);
            }
        }
        for (var i = factors.Count - 1; i >= 0; i--)
        {
            if (coefficients[i] != 0) continue;
            factors.RemoveAt(i);
            coefficients.RemoveAt(i);
        }
        return new(constant, [.. factors], [.. coefficients]);
    }
}
