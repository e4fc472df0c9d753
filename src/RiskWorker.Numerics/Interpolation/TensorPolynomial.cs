using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Interpolation;

/// <summary>
/// A polynomial in none to four variables on [-1, 1], each of a degree of its own, through values at the tensor product of their
/// Chebyshev points. Immutable.
/// </summary>
public sealed class TensorPolynomial
{
    /// <summary>Most variables.</summary>
    public const int MostVariables = 4;

    private readonly int[] _counts;
    private readonly double[] _coefficients;

    private TensorPolynomial(int[] counts, double[] coefficients) => (_counts, _coefficients) = (counts, coefficients);

    /// <summary>How many variables there are.</summary>
    public int Variables => _counts.Length;

    /// <summary>Coefficients by power of the first variable and Chebyshev polynomial of the others, the last variable's side by side.</summary>
    public ReadOnlySpan<double> Coefficients => _coefficients;

    /// <summary>The polynomial through <paramref name="values"/>.</summary>
    /// <param name="degrees">Degree in each variable, 1 to <see cref="ChebyshevGrid.MostDegree"/>; none makes a constant.</param>
    /// <param name="values">A value at each point, the last variable's points side by side, each variable's in the order of <see cref="ChebyshevGrid.Points"/>.</param>
    /// <exception cref="ArgumentException">There are too many variables or not as many values as points.</exception>
    public static TensorPolynomial Through(ReadOnlySpan<int> degrees, ReadOnlySpan<double> values)
    {
        if (degrees.Length > MostVariables)
            throw new ArgumentException($"There are {degrees.Length} variables; at most {MostVariables} can be.", nameof(degrees));
        int[] counts = new int[degrees.Length];
        int points = 1;
        for (int d = 0; d < counts.Length; d++) points *= counts[d] = degrees[d] + 1;
        if (values.Length != points)
            throw new ArgumentException($"There are {values.Length} values; the degrees ask for {points}.", nameof(values));
        double[] coefficients = values.ToArray();
        for (int d = 0, outer = 1, stride = points; d < counts.Length; d++)
        {
            var grid = ChebyshevGrid.Of(degrees[d]);
            int block = stride;
            stride /= counts[d];
            for (int o = 0; o < outer; o++)
            {
                for (int i = 0; i < stride; i++)
                {
                    var line = coefficients.AsSpan((o * block) + i, block - i);
                    if (d == 0) grid.Interpolate(line, stride, line);
                    else grid.Expand(line, stride, line);
                }
            }
            outer *= counts[d];
        }
        return new(counts, coefficients);
    }

    /// <summary>The value at one point.</summary>
    /// <param name="at">Every variable, in turn.</param>
    public double Value(ReadOnlySpan<double> at) => _counts.Length switch
    {
        0 => _coefficients[0],
        1 => PolynomialSum.AddInTurn(_coefficients, at[0], 0),
        2 => FourVariableSum.AddInTurn(_coefficients, 1, 1, _counts[1], at[0], at[0], at[0], at[1], 0),
        3 => FourVariableSum.AddInTurn(_coefficients, 1, _counts[1], _counts[2], at[0], at[0], at[1], at[2], 0),
        _ => FourVariableSum.AddInTurn(_coefficients, _counts[1], _counts[2], _counts[3], at[0], at[1], at[2], at[3], 0),
    };

    /// <summary>Writes the value in each scenario: the bits of <see cref="Value"/>.</summary>
    /// <param name="first">The first variable in each scenario; not read where there is none.</param>
    /// <param name="others">The further variables, a row as long as <paramref name="values"/> each.</param>
    /// <param name="values">Apart from the variables.</param>
    public void Fill(ReadOnlySpan<double> first, ReadOnlySpan<double> others, Span<double> values)
    {
        int length = values.Length;
        if (_counts.Length == 0)
        {
            values.Fill(_coefficients[0]);
            return;
        }
        values.Clear();
        if (_counts.Length == 1)
        {
            PolynomialSum.Add(_coefficients, first, values);
            return;
        }
        var second = others[..length];
        if (_counts.Length == 2)
        {
            FourVariableSum.Add(_coefficients, 1, 1, _counts[1], first, first, first, second, values);
            return;
        }
        var third = others.Slice(length, length);
        // A variable that is not there is one of a single term: the innermost loops stay the long ones.
        if (_counts.Length == 3) FourVariableSum.Add(_coefficients, 1, _counts[1], _counts[2], first, first, second, third, values);
        else FourVariableSum.Add(_coefficients, _counts[1], _counts[2], _counts[3], first, second, third, others.Slice(2 * length, length), values);
    }
}
