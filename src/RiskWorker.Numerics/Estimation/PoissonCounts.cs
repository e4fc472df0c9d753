using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Estimation;

/// <summary>
/// Poisson counts from uniforms by inversion: the smallest k with u ≤ F(k), from a table of F(k) = Σ_{i≤k} p_i with p₀ = e^(-mean) and
/// p_{k+1} = p_k · mean/(k + 1). One uniform a count; the count rises with u.
/// </summary>
/// <remarks>
/// The table ends where the next probability is below 2⁻⁵⁴ of the sum beyond the mean: a uniform above its last entry gives the count
/// after it. Relative errors of p_k grow by about an ulp a step; u itself has 2⁻⁵².
/// </remarks>
public sealed class PoissonCounts
{
    /// <summary>The highest mean: beyond it the table is long, and another method better.</summary>
    public const double HighestMean = 20;

    private const double Negligible = 5.551115123125783e-17; // 2^-54

    private readonly double[] _atMost;

    /// <summary>Tabulates the distribution.</summary>
    /// <param name="mean">0 to <see cref="HighestMean"/>.</param>
    public PoissonCounts(double mean)
    {
        if (!(mean >= 0 && mean <= HighestMean)) throw new ArgumentOutOfRangeException(nameof(mean), mean, $"The mean of a Poisson count lies between 0 and {HighestMean}.");
        Mean = mean;
        var table = new List<double>();
        var probability = Exponential.Of(-mean);
        var sum = 0.0;
        for (var k = 0; probability > Negligible || k < mean; k++)
        {
            sum += probability;
            table.Add(sum);
            probability *= mean / (k + 1);
        }
        _atMost = [.. table];
    }

    /// <summary>The mean.</summary>
    public double Mean { get; }

    /// <summary>P(N ≤ k) for k from 0 on, as tabulated.</summary>
    public ReadOnlySpan<double> AtMost => _atMost;

    /// <summary>The count of one uniform: how many entries of the table lie below it. NaN gives 0.</summary>
    public double Of(double uniform)
    {
        var count = 0;
        while (count < _atMost.Length && uniform > _atMost[count]) count++;
        return count;
    }

    /// <summary>The counts of uniforms, as numbers; allocates nothing.</summary>
    /// <param name="uniforms">In (0, 1).</param>
    /// <param name="counts">At least as long; may be the same memory, and may not overlap it otherwise.</param>
    /// <exception cref="ArgumentException">The counts have no room or overlap the uniforms in part.</exception>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    [ScalarTwin(nameof(Of))]
    public void Of(ReadOnlySpan<double> uniforms, Span<double> counts)
    {
        Spans.RequireRoom(uniforms.Length, counts.Length, nameof(counts));
        Spans.RequireSameOrApart(uniforms, counts, nameof(counts));
        ref double from = ref MemoryMarshal.GetReference(uniforms);
        ref double to = ref MemoryMarshal.GetReference(counts);
        Vector512<double> one = Vector512.Create(1.0);
        int i = 0;
        for (; i + 8 <= uniforms.Length; i += 8)
        {
            Vector512<double> u = Vector512.LoadUnsafe(ref from, (nuint)i), count = Vector512<double>.Zero;
            foreach (double threshold in _atMost)
            {
                Vector512<double> above = Vector512.GreaterThan(u, Vector512.Create(threshold));
                if (Vector512.EqualsAll(above.AsInt64(), Vector512<long>.Zero))
                    break;
                count += above & one;
            }

            count.StoreUnsafe(ref to, (nuint)i);
        }

        for (; i < uniforms.Length; i++)
            counts[i] = Of(uniforms[i]);
    }
}
