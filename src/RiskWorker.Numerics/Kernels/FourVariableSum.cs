using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Adds a polynomial in four variables, evaluated at every scenario, to a profit: nested Horner, every step one fused multiply-add.
/// The coefficient of z^k w^l u^m v^n stands at ((k·rows + l)·columns + m)·depth + n; a variable of one power alone is not read for
/// its value. A NaN stays one; allocates nothing.
/// </summary>
public static class FourVariableSum
{
    /// <summary>profit + p(z, w, u, v).</summary>
    public static double AddInTurn(ReadOnlySpan<double> coefficients, int rows, int columns, int depth, double z, double w, double u, double v, double profit)
    {
        double sum = 0.0;
        int at = coefficients.Length - 1;
        while (at >= 0)
        {
            double outer = 0.0;
            for (int l = rows; l > 0; l--)
            {
                double middle = 0.0;
                for (int m = columns; m > 0; m--)
                {
                    double inner = coefficients[at--];
                    for (int n = depth - 1; n > 0; n--)
                        inner = Math.FusedMultiplyAdd(inner, v, coefficients[at--]);
                    middle = Math.FusedMultiplyAdd(middle, u, inner);
                }

                outer = Math.FusedMultiplyAdd(outer, w, middle);
            }

            sum = Math.FusedMultiplyAdd(sum, z, outer);
        }

        return profit + sum;
    }

    /// <summary>profit[s] += p(z[s], w[s], u[s], v[s]).</summary>
    /// <param name="coefficients">As many as a multiple of rows·columns·depth.</param>
    /// <param name="rows">Powers of w, from 0.</param>
    /// <param name="columns">Powers of u, from 0.</param>
    /// <param name="depth">Powers of v, from 0.</param>
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
        ref double first = ref MemoryMarshal.GetReference(z);
        ref double second = ref MemoryMarshal.GetReference(w);
        ref double third = ref MemoryMarshal.GetReference(u);
        ref double fourth = ref MemoryMarshal.GetReference(v);
        ref double to = ref MemoryMarshal.GetReference(profit);
        nuint s = 0, length = (nuint)z.Length;
        for (; s + 32 <= length; s += 32)
            AddStrip(coefficients, rows, columns, depth, ref Unsafe.Add(ref first, s), ref Unsafe.Add(ref second, s), ref Unsafe.Add(ref third, s), ref Unsafe.Add(ref fourth, s), ref Unsafe.Add(ref to, s));
        for (int i = (int)s; i < z.Length; i++)
            profit[i] = AddInTurn(coefficients, rows, columns, depth, z[i], w[i], u[i], v[i], profit[i]);
    }

    private static void RequireShape(int coefficients, int rows, int columns, int depth)
    {
        if (rows < 1 || columns < 1 || depth < 1)
            throw new ArgumentException($"The powers are {rows}, {columns} and {depth}; each must be at least 1.", nameof(rows));
        if (coefficients == 0 || coefficients % (rows * columns * depth) != 0)
            throw new ArgumentException($"There are {coefficients} coefficients; a positive multiple of {rows}·{columns}·{depth} is needed.", nameof(coefficients));
    }

    // Thirty-two scenarios side by side: four chains of steps hide most of a step's wait. The outer loops wait once in several steps.
    [MethodImpl(Workbench.Loop)]
    private static void AddStrip(
        ReadOnlySpan<double> coefficients, int rows, int columns, int depth, ref double z, ref double w, ref double u, ref double v, ref double profit)
    {
        Vector512<double> v0 = Vector512.LoadUnsafe(ref v), v1 = Vector512.LoadUnsafe(ref v, 8), v2 = Vector512.LoadUnsafe(ref v, 16), v3 = Vector512.LoadUnsafe(ref v, 24);
        Vector512<double> u0 = Vector512.LoadUnsafe(ref u), u1 = Vector512.LoadUnsafe(ref u, 8), u2 = Vector512.LoadUnsafe(ref u, 16), u3 = Vector512.LoadUnsafe(ref u, 24);
        Vector512<double> s0 = Vector512<double>.Zero, s1 = s0, s2 = s0, s3 = s0;
        int at = coefficients.Length - 1;
        while (at >= 0)
        {
            Vector512<double> o0 = Vector512<double>.Zero, o1 = o0, o2 = o0, o3 = o0;
            for (int l = rows; l > 0; l--)
            {
                Vector512<double> m0 = Vector512<double>.Zero, m1 = m0, m2 = m0, m3 = m0;
                for (int m = columns; m > 0; m--)
                {
                    Vector512<double> i0 = Vector512.Create(coefficients[at--]), i1 = i0, i2 = i0, i3 = i0;
                    for (int n = depth - 1; n > 0; n--)
                    {
                        Vector512<double> c = Vector512.Create(coefficients[at--]);
                        i0 = Vector512.FusedMultiplyAdd(i0, v0, c);
                        i1 = Vector512.FusedMultiplyAdd(i1, v1, c);
                        i2 = Vector512.FusedMultiplyAdd(i2, v2, c);
                        i3 = Vector512.FusedMultiplyAdd(i3, v3, c);
                    }

                    m0 = Vector512.FusedMultiplyAdd(m0, u0, i0);
                    m1 = Vector512.FusedMultiplyAdd(m1, u1, i1);
                    m2 = Vector512.FusedMultiplyAdd(m2, u2, i2);
                    m3 = Vector512.FusedMultiplyAdd(m3, u3, i3);
                }

                o0 = Vector512.FusedMultiplyAdd(o0, Vector512.LoadUnsafe(ref w), m0);
                o1 = Vector512.FusedMultiplyAdd(o1, Vector512.LoadUnsafe(ref w, 8), m1);
                o2 = Vector512.FusedMultiplyAdd(o2, Vector512.LoadUnsafe(ref w, 16), m2);
                o3 = Vector512.FusedMultiplyAdd(o3, Vector512.LoadUnsafe(ref w, 24), m3);
            }

            s0 = Vector512.FusedMultiplyAdd(s0, Vector512.LoadUnsafe(ref z), o0);
            s1 = Vector512.FusedMultiplyAdd(s1, Vector512.LoadUnsafe(ref z, 8), o1);
            s2 = Vector512.FusedMultiplyAdd(s2, Vector512.LoadUnsafe(ref z, 16), o2);
            s3 = Vector512.FusedMultiplyAdd(s3, Vector512.LoadUnsafe(ref z, 24), o3);
        }

        (Vector512.LoadUnsafe(ref profit) + s0).StoreUnsafe(ref profit);
        (Vector512.LoadUnsafe(ref profit, 8) + s1).StoreUnsafe(ref profit, 8);
        (Vector512.LoadUnsafe(ref profit, 16) + s2).StoreUnsafe(ref profit, 16);
        (Vector512.LoadUnsafe(ref profit, 24) + s3).StoreUnsafe(ref profit, 24);
    }
}
