using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// Adds polynomials in one or two variables, evaluated at every scenario, to a profit. By powers, highest first (Horner),
/// every step one fused multiply-add; a NaN stays one; allocates nothing.
/// </summary>
public static class PolynomialSum
{
    /// <summary>profit + p(z), with p's coefficients lowest power first.</summary>
    public static double AddInTurn(ReadOnlySpan<double> coefficients, double z, double profit)
    {
        double sum = coefficients[^1];
        for (int k = coefficients.Length - 2; k >= 0; k--)
            sum = Math.FusedMultiplyAdd(sum, z, coefficients[k]);
        return profit + sum;
    }

    /// <summary>profit + p(z, w): the coefficient of z^k w^m stands at k·columns + m.</summary>
    public static double AddInTurn(ReadOnlySpan<double> coefficients, int columns, double z, double w, double profit)
    {
        double sum = 0.0;
        for (int k = coefficients.Length - columns; k >= 0; k -= columns)
        {
            double inner = coefficients[k + columns - 1];
            for (int m = columns - 2; m >= 0; m--)
                inner = Math.FusedMultiplyAdd(inner, w, coefficients[k + m]);
            sum = Math.FusedMultiplyAdd(sum, z, inner);
        }

        return profit + sum;
    }

    /// <summary>profit[s] += p(z[s]).</summary>
    /// <param name="coefficients">Lowest power first; at least one.</param>
    /// <param name="z">Where.</param>
    /// <param name="profit">As long as <paramref name="z"/>.</param>
    [ScalarTwin(nameof(AddInTurn))]
    public static void Add(ReadOnlySpan<double> coefficients, ReadOnlySpan<double> z, Span<double> profit)
    {
        Spans.RequireRoom(1, coefficients.Length, nameof(coefficients));
        Spans.RequireLength(z.Length, profit.Length, nameof(profit));
        ref double at = ref MemoryMarshal.GetReference(z);
        ref double to = ref MemoryMarshal.GetReference(profit);
        nuint s = 0, length = (nuint)z.Length;
        for (; s + 40 <= length; s += 40)
            AddStrip(coefficients, ref Unsafe.Add(ref at, s), ref Unsafe.Add(ref to, s));
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> x = Vector512.LoadUnsafe(ref at, s), sum = Vector512.Create(coefficients[^1]);
            for (int k = coefficients.Length - 2; k >= 0; k--)
                sum = Vector512.FusedMultiplyAdd(sum, x, Vector512.Create(coefficients[k]));
            (Vector512.LoadUnsafe(ref to, s) + sum).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < z.Length; i++)
            profit[i] = AddInTurn(coefficients, z[i], profit[i]);
    }

    /// <summary>profit[s] += p(z[s], w[s]).</summary>
    /// <param name="coefficients">The coefficient of z^k w^m stands at k·columns + m.</param>
    /// <param name="columns">Powers of w, from 0; divides the number of coefficients.</param>
    /// <param name="z">First variable.</param>
    /// <param name="w">Second variable, as long as <paramref name="z"/>.</param>
    /// <param name="profit">As long as <paramref name="z"/>.</param>
    [ScalarTwin(nameof(AddInTurn))]
    public static void Add(ReadOnlySpan<double> coefficients, int columns, ReadOnlySpan<double> z, ReadOnlySpan<double> w, Span<double> profit)
    {
        Spans.RequireRoom(columns, coefficients.Length, nameof(coefficients));
        Spans.RequireLength(z.Length, w.Length, nameof(w));
        Spans.RequireLength(z.Length, profit.Length, nameof(profit));
        ref double first = ref MemoryMarshal.GetReference(z);
        ref double second = ref MemoryMarshal.GetReference(w);
        ref double to = ref MemoryMarshal.GetReference(profit);
        nuint s = 0, length = (nuint)z.Length;
        for (; s + 32 <= length; s += 32)
            AddStrip(coefficients, columns, ref Unsafe.Add(ref first, s), ref Unsafe.Add(ref second, s), ref Unsafe.Add(ref to, s));
        for (; s + 8 <= length; s += 8)
        {
            Vector512<double> x = Vector512.LoadUnsafe(ref first, s), y = Vector512.LoadUnsafe(ref second, s), sum = Vector512<double>.Zero;
            for (int k = coefficients.Length - columns; k >= 0; k -= columns)
            {
                Vector512<double> inner = Vector512.Create(coefficients[k + columns - 1]);
                for (int m = columns - 2; m >= 0; m--)
                    inner = Vector512.FusedMultiplyAdd(inner, y, Vector512.Create(coefficients[k + m]));
                sum = Vector512.FusedMultiplyAdd(sum, x, inner);
            }

            (Vector512.LoadUnsafe(ref to, s) + sum).StoreUnsafe(ref to, s);
        }

        for (int i = (int)s; i < z.Length; i++)
            profit[i] = AddInTurn(coefficients, columns, z[i], w[i], profit[i]);
    }

    // Forty scenarios side by side: one step waits four cycles for the step before it, and two are begun in a cycle.
    private static void AddStrip(ReadOnlySpan<double> coefficients, ref double z, ref double profit)
    {
        Vector512<double> z0 = Vector512.LoadUnsafe(ref z), z1 = Vector512.LoadUnsafe(ref z, 8), z2 = Vector512.LoadUnsafe(ref z, 16), z3 = Vector512.LoadUnsafe(ref z, 24), z4 = Vector512.LoadUnsafe(ref z, 32);
        Vector512<double> p0 = Vector512.Create(coefficients[^1]), p1 = p0, p2 = p0, p3 = p0, p4 = p0;
        for (int k = coefficients.Length - 2; k >= 0; k--)
        {
            Vector512<double> c = Vector512.Create(coefficients[k]);
            p0 = Vector512.FusedMultiplyAdd(p0, z0, c);
            p1 = Vector512.FusedMultiplyAdd(p1, z1, c);
            p2 = Vector512.FusedMultiplyAdd(p2, z2, c);
            p3 = Vector512.FusedMultiplyAdd(p3, z3, c);
            p4 = Vector512.FusedMultiplyAdd(p4, z4, c);
        }

        (Vector512.LoadUnsafe(ref profit) + p0).StoreUnsafe(ref profit);
        (Vector512.LoadUnsafe(ref profit, 8) + p1).StoreUnsafe(ref profit, 8);
        (Vector512.LoadUnsafe(ref profit, 16) + p2).StoreUnsafe(ref profit, 16);
        (Vector512.LoadUnsafe(ref profit, 24) + p3).StoreUnsafe(ref profit, 24);
        (Vector512.LoadUnsafe(ref profit, 32) + p4).StoreUnsafe(ref profit, 32);
    }

    private static void AddStrip(ReadOnlySpan<double> coefficients, int columns, ref double z, ref double w, ref double profit)
    {
        Vector512<double> z0 = Vector512.LoadUnsafe(ref z), z1 = Vector512.LoadUnsafe(ref z, 8), z2 = Vector512.LoadUnsafe(ref z, 16), z3 = Vector512.LoadUnsafe(ref z, 24);
        Vector512<double> w0 = Vector512.LoadUnsafe(ref w), w1 = Vector512.LoadUnsafe(ref w, 8), w2 = Vector512.LoadUnsafe(ref w, 16), w3 = Vector512.LoadUnsafe(ref w, 24);
        Vector512<double> p0 = Vector512<double>.Zero, p1 = p0, p2 = p0, p3 = p0;
        for (int k = coefficients.Length - columns; k >= 0; k -= columns)
        {
            Vector512<double> q0 = Vector512.Create(coefficients[k + columns - 1]), q1 = q0, q2 = q0, q3 = q0;
            for (int m = columns - 2; m >= 0; m--)
            {
                Vector512<double> c = Vector512.Create(coefficients[k + m]);
                q0 = Vector512.FusedMultiplyAdd(q0, w0, c);
                q1 = Vector512.FusedMultiplyAdd(q1, w1, c);
                q2 = Vector512.FusedMultiplyAdd(q2, w2, c);
                q3 = Vector512.FusedMultiplyAdd(q3, w3, c);
            }

            p0 = Vector512.FusedMultiplyAdd(p0, z0, q0);
            p1 = Vector512.FusedMultiplyAdd(p1, z1, q1);
            p2 = Vector512.FusedMultiplyAdd(p2, z2, q2);
            p3 = Vector512.FusedMultiplyAdd(p3, z3, q3);
        }

        (Vector512.LoadUnsafe(ref profit) + p0).StoreUnsafe(ref profit);
        (Vector512.LoadUnsafe(ref profit, 8) + p1).StoreUnsafe(ref profit, 8);
        (Vector512.LoadUnsafe(ref profit, 16) + p2).StoreUnsafe(ref profit, 16);
        (Vector512.LoadUnsafe(ref profit, 24) + p3).StoreUnsafe(ref profit, 24);
    }
}
