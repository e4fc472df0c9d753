using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Adds a polynomial in four variables, evaluated at every scenario, to a profit: by powers of the first (Horner) and by Chebyshev
/// polynomials of the others. The coefficient of z^k T_l(w) T_m(u) T_n(v) stands at ((k·rows + l)·columns + m)·depth + n.
/// A variable of one row, column or layer alone is not read for its value. A NaN stays one; allocates nothing.
/// </summary>
/// <remarks>By powers of all variables the bound on rounding would grow with the sum of their degrees; this costs as many steps. Tables of smooth values show no difference.</remarks>
public static class FourVariableSum
{
    /// <summary>Most rows, columns or layers.</summary>
    public const int MostTerms = 21;

    private const int Strip = 32;

    /// <summary>profit + p(z, w, u, v).</summary>
    public static double AddInTurn(ReadOnlySpan<double> coefficients, int rows, int columns, int depth, double z, double w, double u, double v, double profit)
    {
        Span<double> ws = stackalloc double[rows], us = stackalloc double[columns], vs = stackalloc double[depth];
        Chebyshev(w, ws);
        Chebyshev(u, us);
        Chebyshev(v, vs);
        int block = rows * columns * depth;
        double sum = 0.0;
        for (int k = coefficients.Length - block; k >= 0; k -= block)
        {
            double outer = 0.0;
            for (int l = 0, at = k; l < rows; l++)
            {
                double middle = 0.0;
                for (int m = 0; m < columns; m++)
                {
                    double inner = 0.0;
                    for (int n = 0; n < depth; n++)
                        inner = Math.FusedMultiplyAdd(coefficients[at++], vs[n], inner);
                    middle = Math.FusedMultiplyAdd(us[m], inner, middle);
                }

                outer = Math.FusedMultiplyAdd(ws[l], middle, outer);
            }

            sum = Math.FusedMultiplyAdd(sum, z, outer);
        }

        return profit + sum;
    }

    /// <summary>profit[s] += p(z[s], w[s], u[s], v[s]).</summary>
    /// <param name="coefficients">As many as a multiple of rows·columns·depth.</param>
    /// <param name="rows">Chebyshev polynomials of w, from T_0; 1 to <see cref="MostTerms"/>.</param>
    /// <param name="columns">Those of u.</param>
    /// <param name="depth">Those of v.</param>
    /// <param name="z">First variable.</param>
    /// <param name="w">Second variable, as long as <paramref name="z"/>.</param>
    /// <param name="u">Third variable, as long as <paramref name="z"/>.</param>
    /// <param name="v">Fourth variable, as long as <paramref name="z"/>.</param>
    /// <param name="profit">As long as <paramref name="z"/>, and apart from the variables.</param>
    /// <exception cref="ArgumentException">A length does not fit.</exception>
    [MethodImpl(Workbench.Loop)]
    [ScalarTwin(nameof(AddInTurn))]
    public static void Add(
        ReadOnlySpan<double> coefficients, int rows, int columns, int depth, ReadOnlySpan<double> z, ReadOnlySpan<double> w, ReadOnlySpan<double> u, ReadOnlySpan<double> v, Span<double> profit)
    {
        RequireShape(coefficients.Length, rows, columns, depth);
        Spans.RequireLength(z.Length, w.Length, nameof(w));
        Spans.RequireLength(z.Length, u.Length, nameof(u));
        Spans.RequireLength(z.Length, v.Length, nameof(v));
        Spans.RequireLength(z.Length, profit.Length, nameof(profit));
        Span<double> room = stackalloc double[(rows + columns + depth) * Strip];
        Span<double> ws = room[..(rows * Strip)], us = room.Slice(rows * Strip, columns * Strip), vs = room[((rows + columns) * Strip)..];
        int s = 0;
        for (; s + Strip <= z.Length; s += Strip)
        {
            FillChebyshev(w.Slice(s, Strip), ws);
            FillChebyshev(u.Slice(s, Strip), us);
            FillChebyshev(v.Slice(s, Strip), vs);
            AddStrip(coefficients, rows, columns, depth, z.Slice(s, Strip), ws, us, vs, profit.Slice(s, Strip));
        }

        for (; s < z.Length; s++)
            profit[s] = AddInTurn(coefficients, rows, columns, depth, z[s], w[s], u[s], v[s], profit[s]);
    }

    private static void RequireShape(int coefficients, int rows, int columns, int depth)
    {
        if (Math.Min(rows, Math.Min(columns, depth)) < 1 || Math.Max(rows, Math.Max(columns, depth)) > MostTerms)
            throw new ArgumentException($"The terms are {rows}, {columns} and {depth}; each must be 1 to {MostTerms}.", nameof(rows));
        if (coefficients == 0 || coefficients % (rows * columns * depth) != 0)
            throw new ArgumentException($"There are {coefficients} coefficients; a positive multiple of {rows}·{columns}·{depth} is needed.", nameof(coefficients));
    }

    // T_0 = 1, T_1 = x, T_(k+1) = 2 x T_k - T_(k-1).
    private static void Chebyshev(double x, Span<double> terms)
    {
        terms[0] = 1.0;
        if (terms.Length > 1)
            terms[1] = x;
        for (int k = 2; k < terms.Length; k++)
            terms[k] = Math.FusedMultiplyAdd(x + x, terms[k - 1], -terms[k - 2]);
    }

    [MethodImpl(Workbench.Loop)]
    private static void FillChebyshev(ReadOnlySpan<double> x, Span<double> terms)
    {
        terms[..Strip].Fill(1.0);
        if (terms.Length == Strip)
            return;
        x.CopyTo(terms[Strip..]);
        ref double from = ref MemoryMarshal.GetReference(x);
        ref double to = ref MemoryMarshal.GetReference(terms);
        for (nuint k = 2 * Strip; k < (nuint)terms.Length; k += Strip)
        {
            for (nuint s = 0; s < Strip; s += 8)
            {
                Vector512<double> one = Vector512.LoadUnsafe(ref from, s), before = Vector512.LoadUnsafe(ref to, k + s - (2 * Strip));
                Vector512.FusedMultiplyAdd(one + one, Vector512.LoadUnsafe(ref to, k + s - Strip), -before).StoreUnsafe(ref to, k + s);
            }
        }
    }

    // Thirty-two scenarios side by side: four chains of steps hide most of a step's wait.
    [MethodImpl(Workbench.Loop)]
    private static void AddStrip(
        ReadOnlySpan<double> coefficients, int rows, int columns, int depth, ReadOnlySpan<double> z, ReadOnlySpan<double> ws, ReadOnlySpan<double> us, ReadOnlySpan<double> vs, Span<double> profit)
    {
        ref double first = ref MemoryMarshal.GetReference(z);
        ref double second = ref MemoryMarshal.GetReference(ws);
        ref double third = ref MemoryMarshal.GetReference(us);
        ref double fourth = ref MemoryMarshal.GetReference(vs);
        ref double to = ref MemoryMarshal.GetReference(profit);
        int block = rows * columns * depth;
        Vector512<double> s0 = Vector512<double>.Zero, s1 = s0, s2 = s0, s3 = s0;
        for (int k = coefficients.Length - block; k >= 0; k -= block)
        {
            int at = k;
            Vector512<double> o0 = Vector512<double>.Zero, o1 = o0, o2 = o0, o3 = o0;
            for (nuint l = 0; l < (nuint)(rows * Strip); l += Strip)
            {
                Vector512<double> m0 = Vector512<double>.Zero, m1 = m0, m2 = m0, m3 = m0;
                for (nuint m = 0; m < (nuint)(columns * Strip); m += Strip)
                {
                    Vector512<double> i0 = Vector512<double>.Zero, i1 = i0, i2 = i0, i3 = i0;
                    for (nuint n = 0; n < (nuint)(depth * Strip); n += Strip)
                    {
                        Vector512<double> c = Vector512.Create(coefficients[at++]);
                        i0 = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref fourth, n), i0);
                        i1 = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref fourth, n + 8), i1);
                        i2 = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref fourth, n + 16), i2);
                        i3 = Vector512.FusedMultiplyAdd(c, Vector512.LoadUnsafe(ref fourth, n + 24), i3);
                    }

                    m0 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref third, m), i0, m0);
                    m1 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref third, m + 8), i1, m1);
                    m2 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref third, m + 16), i2, m2);
                    m3 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref third, m + 24), i3, m3);
                }

                o0 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref second, l), m0, o0);
                o1 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref second, l + 8), m1, o1);
                o2 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref second, l + 16), m2, o2);
                o3 = Vector512.FusedMultiplyAdd(Vector512.LoadUnsafe(ref second, l + 24), m3, o3);
            }

            s0 = Vector512.FusedMultiplyAdd(s0, Vector512.LoadUnsafe(ref first), o0);
            s1 = Vector512.FusedMultiplyAdd(s1, Vector512.LoadUnsafe(ref first, 8), o1);
            s2 = Vector512.FusedMultiplyAdd(s2, Vector512.LoadUnsafe(ref first, 16), o2);
            s3 = Vector512.FusedMultiplyAdd(s3, Vector512.LoadUnsafe(ref first, 24), o3);
        }

        (Vector512.LoadUnsafe(ref to) + s0).StoreUnsafe(ref to);
        (Vector512.LoadUnsafe(ref to, 8) + s1).StoreUnsafe(ref to, 8);
        (Vector512.LoadUnsafe(ref to, 16) + s2).StoreUnsafe(ref to, 16);
        (Vector512.LoadUnsafe(ref to, 24) + s3).StoreUnsafe(ref to, 24);
    }
}
