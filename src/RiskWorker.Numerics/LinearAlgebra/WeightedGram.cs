using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace RiskWorker.Numerics.LinearAlgebra;

/// <summary>Weighted cross products of rows: G[i, j] = Σ_t w_t x[i, t] x[j, t].</summary>
/// <remarks>
/// For i ≤ j each entry is the chain g ← fma(w_t·x[i, t], x[j, t], g) over t ascending from g = 0, whatever the width of a vector;
/// rows that are equal therefore have equal entries to the bit.
/// </remarks>
public static class WeightedGram
{
    private const int PanelWidth = 16;

    /// <summary>The symmetric n × n matrix, row-major, of <paramref name="rows"/> (n × T, row-major) under <paramref name="weights"/> (T).</summary>
    /// <exception cref="ArgumentException">The rows are not n times the number of weights.</exception>
    public static double[] Of(ReadOnlySpan<double> rows, int n, ReadOnlySpan<double> weights)
    {
        var length = weights.Length;
        if (rows.Length != (long)n * length)
            throw new ArgumentException($"rows has {rows.Length} elements; {n} rows under {length} weights have {(long)n * length}.", nameof(rows));
        var gram = new double[n * n];
        var weighted = new double[length];
        for (var first = 0; first < n; first += PanelWidth)
        {
            var panel = Panel(rows, n, length, first);
            var width = Math.Min(PanelWidth, n - first);
            for (var i = 0; i < first + width; i++)
            {
                for (var t = 0; t < length; t++) weighted[t] = weights[t] * rows[(i * length) + t];
                Store(gram, n, i, first, width, weighted, panel);
            }
        }
        return gram;
    }

    /// <summary>Sixteen rows side by side for each t, missing ones as zeros: a step of the sum reads memory in order.</summary>
    private static double[] Panel(ReadOnlySpan<double> rows, int n, int length, int first)
    {
        var panel = new double[length * PanelWidth];
        for (var j = first; j < Math.Min(first + PanelWidth, n); j++)
        {
            for (var t = 0; t < length; t++) panel[(t * PanelWidth) + j - first] = rows[(j * length) + t];
        }
        return panel;
    }

    private static void Store(double[] gram, int n, int i, int first, int width, double[] weighted, double[] panel)
    {
        Span<double> sums = stackalloc double[PanelWidth];
        Accumulate(weighted, panel, sums);
        for (var j = Math.Max(i, first); j < first + width; j++)
        {
            gram[(i * n) + j] = sums[j - first];
            gram[(j * n) + i] = sums[j - first];
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Accumulate(double[] weighted, double[] panel, Span<double> sums)
    {
        var (a, b, c, d) = (Vector256<double>.Zero, Vector256<double>.Zero, Vector256<double>.Zero, Vector256<double>.Zero);
        var columns = MemoryMarshal.Cast<double, Vector256<double>>(panel.AsSpan());
        for (var t = 0; t < weighted.Length; t++)
        {
            var x = Vector256.Create(weighted[t]);
            var step = columns.Slice(t * 4, 4);
            a = Vector256.FusedMultiplyAdd(x, step[0], a);
            b = Vector256.FusedMultiplyAdd(x, step[1], b);
            c = Vector256.FusedMultiplyAdd(x, step[2], c);
            d = Vector256.FusedMultiplyAdd(x, step[3], d);
        }
        a.CopyTo(sums);
        b.CopyTo(sums[4..]);
        c.CopyTo(sums[8..]);
        d.CopyTo(sums[12..]);
    }
}
