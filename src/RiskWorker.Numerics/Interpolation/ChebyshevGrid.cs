namespace RiskWorker.Numerics.Interpolation;

/// <summary>
/// Chebyshev points of the second kind on [-1, 1], cos(pi j / n) for j = 0 ... n, and the polynomial of degree n through values at them.
/// Interpolation there converges geometrically for an analytic function (Trefethen, Approximation Theory and Approximation Practice, 2013, ch. 8).
/// </summary>
/// <remarks>
/// Cosines are summed from their series: the C library's differ by machine. The polynomial comes out in powers of z, which costs
/// half the operations of Clenshaw's recurrence to evaluate and loses about n binary digits: hence <see cref="MostDegree"/>.
/// </remarks>
public sealed class ChebyshevGrid
{
    /// <summary>Highest degree: rounding then stays below 3e-10 of values near 1.</summary>
    public const int MostDegree = 20;

    private static readonly Lazy<ChebyshevGrid>[] s_grids = [.. Enumerable.Range(1, MostDegree).Select(n => new Lazy<ChebyshevGrid>(() => new(n)))];

    // Row k, column j: coefficient of z^k in the polynomial that is 1 at point j and 0 at the others.
    private readonly double[] _powers;

    // Row m, column j: coefficient of T_m in the same polynomial.
    private readonly double[] _series;

    private ChebyshevGrid(int degree)
    {
        Degree = degree;
        Points = PointsOf(degree);
        _powers = PowersOf(degree);
        _series = new double[(degree + 1) * (degree + 1)];
        for (var m = 0; m <= degree; m++)
        {
            for (var j = 0; j <= degree; j++) _series[(m * (degree + 1)) + j] = Weight(degree, m, j);
        }
    }

    /// <summary>The grid of degree <paramref name="degree"/>, 1 to <see cref="MostDegree"/>; made once.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The degree lies outside that range.</exception>
    public static ChebyshevGrid Of(int degree)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(degree, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(degree, MostDegree);
        return s_grids[degree - 1].Value;
    }

    /// <summary>The degree n.</summary>
    public int Degree { get; }

    /// <summary>The n + 1 points, from 1 down to -1; not to be written to.</summary>
    public double[] Points { get; }

    /// <summary>The points cos(pi j / n), from 1 down to -1; any n of 1 or more.</summary>
    public static double[] PointsOf(int degree)
    {
        var points = new double[degree + 1];
        for (var j = 0; j < points.Length; j++) points[j] = CosineOfTurn(j, 2 * degree);
        return points;
    }

    /// <summary>Coefficients of the interpolating polynomial by power of z, lowest first.</summary>
    /// <param name="values">Values at the points, <paramref name="stride"/> apart.</param>
    /// <param name="stride">Distance of two values.</param>
    /// <param name="coefficients">n + 1 elements, <paramref name="stride"/> apart; may be the memory of <paramref name="values"/>.</param>
    public void Interpolate(ReadOnlySpan<double> values, int stride, Span<double> coefficients) => Multiply(_powers, values, stride, coefficients);

    /// <summary>Coefficients of the interpolating polynomial by Chebyshev polynomial T_0, T_1, ...</summary>
    /// <param name="values">Values at the points, <paramref name="stride"/> apart.</param>
    /// <param name="stride">Distance of two values.</param>
    /// <param name="coefficients">n + 1 elements, <paramref name="stride"/> apart; may be the memory of <paramref name="values"/>.</param>
    public void Expand(ReadOnlySpan<double> values, int stride, Span<double> coefficients) => Multiply(_series, values, stride, coefficients);

    private void Multiply(double[] matrix, ReadOnlySpan<double> values, int stride, Span<double> coefficients)
    {
        Span<double> sums = stackalloc double[MostDegree + 1];
        var count = Degree + 1;
        for (var k = 0; k < count; k++)
        {
            var sum = 0.0;
            for (var j = 0; j < count; j++) sum = Math.FusedMultiplyAdd(matrix[(k * count) + j], values[j * stride], sum);
            sums[k] = sum;
        }
        for (var k = 0; k < count; k++) coefficients[k * stride] = sums[k];
    }

    // The cardinal function of point j is (2/n) sum'' over m of T_m(z_j) T_m(z), halves at m = 0, n and at the end points.
    private static double[] PowersOf(int degree)
    {
        var count = degree + 1;
        var powers = new double[count * count];
        var (before, current, next) = (new double[count], new double[count], new double[count]);
        for (var m = 0; m < count; m++)
        {
            if (m == 0) current[0] = 1;
            else
            {
                // T_1 = z, then T_m = 2 z T_(m-1) - T_(m-2): whole numbers, exact.
                for (var k = 0; k < count; k++) next[k] = (k == 0 ? 0 : (m == 1 ? 1 : 2) * current[k - 1]) - before[k];
                (before, current, next) = (current, next, before);
            }
            for (var j = 0; j < count; j++)
            {
                var weight = Weight(degree, m, j);
                for (var k = 0; k < count; k++) powers[(k * count) + j] = Math.FusedMultiplyAdd(weight, current[k], powers[(k * count) + j]);
            }
        }
        return powers;
    }

    private static double Weight(int degree, int m, int j)
    {
        var halves = (m == 0 || m == degree ? 0.5 : 1) * (j == 0 || j == degree ? 0.5 : 1);
        return 2.0 / degree * halves * CosineOfTurn(j * m, 2 * degree);
    }

    /// <summary>cos(2 pi part / whole), reduced to an eighth of a turn.</summary>
    private static double CosineOfTurn(int part, int whole)
    {
        part %= whole;
        if (2 * part > whole) part = whole - part;
        if (4 * part == whole) return 0;
        if (4 * part > whole) return -CosineOfTurn((whole / 2) - part, whole);
        var angle = 2 * Math.PI * part / whole;
        return 8 * part <= whole ? Cosine(angle) : Sine((Math.PI / 2) - angle);
    }

    private static double Cosine(double angle) => Series(-angle * angle, 1, 1);

    private static double Sine(double angle) => angle * Series(-angle * angle, 1, 2);

    // 1 + s/(d(d+1)) (1 + s/((d+2)(d+3)) (1 + ...)) for s = -angle², angle at most pi/4: eleven terms leave nothing.
    private static double Series(double square, double sum, int first)
    {
        for (var term = 10; term >= 0; term--)
        {
            double divisor = first + (2 * term);
            sum = Math.FusedMultiplyAdd(square / (divisor * (divisor + 1)), sum, 1);
        }
        return sum;
    }
}
