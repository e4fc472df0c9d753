using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Interpolation;

/// <summary>
/// A smooth function on an interval as sixteen polynomials of degree 10 on pieces of equal width, each through the function's values at
/// eleven Chebyshev points. An argument outside takes the value at the end that it lies beyond; a NaN stays one.
/// </summary>
/// <remarks>
/// Sixteen coefficients of a power are two registers of eight, out of which one permutation takes the eight that eight arguments need:
/// without that instruction the scalar form runs instead, to the same bits.
/// </remarks>
public sealed class PiecewisePolynomial
{
    /// <summary>Number of pieces.</summary>
    public const int Pieces = 16;

    /// <summary>Degree on each piece.</summary>
    public const int Degree = 10;

    // Adding 1.5·2^52 rounds to an integer and leaves it in the low bits.
    private const double Integer = 6755399441055744.0;

    // So little narrower that the upper end still lies on the last piece.
    private const double Narrowed = Pieces * (1.0 - 1.7763568394002505e-15);

    // The coefficient of power k on piece i stands at 16 k + i.
    private readonly double[] coefficients = new double[Pieces * (Degree + 1)];
    private readonly double scale;

    /// <param name="function">The function, analytic about the interval; it may be asked a few units in the last place beyond the upper end.</param>
    /// <param name="low">Lower end.</param>
    /// <param name="high">Upper end, above the lower one.</param>
    /// <exception cref="ArgumentOutOfRangeException">An end is not finite, or the upper one is not above the lower one.</exception>
    /// <exception cref="ArgumentException">The function is not finite at one of the points.</exception>
    public PiecewisePolynomial(Func<double, double> function, double low, double high)
    {
        ArgumentNullException.ThrowIfNull(function);
        Low = TermRange.Finite(low, nameof(low));
        High = TermRange.Finite(high, nameof(high));
        if (high <= low)
            throw new ArgumentOutOfRangeException(nameof(high), high, $"The upper end is {high}; it must lie above the lower one, {low}.");
        scale = Narrowed / (high - low);
        ChebyshevGrid grid = ChebyshevGrid.Of(Degree);
        double[] values = new double[Degree + 1];
        for (int piece = 0; piece < Pieces; piece++)
        {
            for (int j = 0; j <= Degree; j++)
            {
                double x = low + ((piece + 0.5 + (0.5 * grid.Points[j])) / scale);
                values[j] = function(x);
                if (!double.IsFinite(values[j]))
                    throw new ArgumentException($"The function is {values[j]} at {x}; it must be finite from {low} to {high}.", nameof(function));
            }

            grid.Expand(values, 1, values);
            AddPowers(values, coefficients.AsSpan(piece));
        }
    }

    /// <summary>Lower end.</summary>
    public double Low { get; }

    /// <summary>Upper end.</summary>
    public double High { get; }

    /// <summary>The polynomial at one point.</summary>
    public double Of(double x)
    {
        x = x < Low ? Low : x;
        x = x > High ? High : x;
        double place = (x - Low) * scale;
        double shifted = place - 0.5 + Integer;
        int piece = (int)(BitConverter.DoubleToUInt64Bits(shifted) & (Pieces - 1));
        double half = place - (shifted - Integer) - 0.5;
        double t = half + half;
        double sum = coefficients[(Degree * Pieces) + piece];
        for (int k = Degree - 1; k >= 0; k--)
            sum = Math.FusedMultiplyAdd(sum, t, coefficients[(k * Pieces) + piece]);
        return sum;
    }

    /// <summary>destination[i] = the polynomial at source[i]; allocates nothing.</summary>
    /// <param name="source">Arguments.</param>
    /// <param name="destination">As long as <paramref name="source"/>; may be the same memory, and may not overlap it otherwise.</param>
    /// <exception cref="ArgumentException">The destination has another length or overlaps the source in part.</exception>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Of))]
    public void Of(ReadOnlySpan<double> source, Span<double> destination)
    {
        Spans.RequireLength(source.Length, destination.Length, nameof(destination));
        Spans.RequireSameOrApart(source, destination, nameof(destination));
        ref double from = ref MemoryMarshal.GetReference(source);
        ref double to = ref MemoryMarshal.GetReference(destination);
        nuint s = 0, length = (nuint)source.Length;
        if (Avx512F.IsSupported)
        {
            for (; s + 8 <= length; s += 8)
                Of(Vector512.LoadUnsafe(ref from, s)).StoreUnsafe(ref to, s);
        }

        for (; s < length; s++)
            Unsafe.Add(ref to, s) = Of(Unsafe.Add(ref from, s));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private Vector512<double> Of(Vector512<double> x)
    {
        ref double table = ref MemoryMarshal.GetArrayDataReference(coefficients);
        Vector512<double> low = Vector512.Create(Low), high = Vector512.Create(High), half = Vector512.Create(0.5), integer = Vector512.Create(Integer);
        x = Vector512.ConditionalSelect(Vector512.LessThan(x, low), low, x);
        x = Vector512.ConditionalSelect(Vector512.GreaterThan(x, high), high, x);
        Vector512<double> place = (x - low) * Vector512.Create(scale);
        Vector512<double> shifted = place - half + integer;
        Vector512<double> halved = place - (shifted - integer) - half;
        Vector512<double> t = halved + halved;
        Vector512<double> sum = Lookup(ref table, Degree, shifted.AsInt64());
        for (int k = Degree - 1; k >= 0; k--)
            sum = Vector512.FusedMultiplyAdd(sum, t, Lookup(ref table, k, shifted.AsInt64()));
        return sum;
    }

    // Through the Chebyshev series, whose high terms are small: powers taken from the values at once round each by itself, and cost a
    // digit (measured on the tables of the mixing variable).
    private static void AddPowers(ReadOnlySpan<double> series, Span<double> powers)
    {
        Span<double> before = stackalloc double[Degree + 1], current = stackalloc double[Degree + 1], next = stackalloc double[Degree + 1];
        before.Clear();
        current.Clear();
        current[0] = 1.0;
        for (int m = 0; m <= Degree; m++)
        {
            for (int k = 0; k <= m; k++)
                powers[k * Pieces] = Math.FusedMultiplyAdd(series[m], current[k], powers[k * Pieces]);

            // T_1 = t, then T_(m+1) = 2 t T_m - T_(m-1): whole numbers, exact.
            for (int k = 0; k <= Degree; k++)
                next[k] = (k == 0 ? 0.0 : (m == 0 ? 1.0 : 2.0) * current[k - 1]) - before[k];
            current.CopyTo(before);
            next.CopyTo(current);
        }
    }

    // The permutation reads the low four bits of an index, which are the piece.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector512<double> Lookup(ref double table, int power, Vector512<long> piece) => Avx512F.PermuteVar8x64x2(
        Vector512.LoadUnsafe(ref table, (nuint)(power * Pieces)), piece, Vector512.LoadUnsafe(ref table, (nuint)((power * Pieces) + 8)));
}
