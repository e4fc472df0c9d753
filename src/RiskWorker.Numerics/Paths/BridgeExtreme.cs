using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// The exact largest point of a motion between two dates given its ends a and b: (a + b + √((b - a)² - 2 v² dt ln U))/2, the inverse of
/// the law e^(-2(m - a)(m - b)/(v² dt)) of a Brownian bridge's maximum. The smallest is that of the motion with the other sign.
/// </summary>
internal readonly struct BridgeExtreme(double volatility, double driftBefore, double drift, double twiceVariance)
{
    /// <summary>The larger of the largest point so far and that of this step.</summary>
    /// <param name="before">W at the earlier date.</param>
    /// <param name="after">W at the later date.</param>
    /// <param name="logUniform">ln U.</param>
    /// <param name="largest">Largest point so far.</param>
    public double Of(double before, double after, double logUniform, double largest)
    {
        double a = Math.FusedMultiplyAdd(volatility, before, driftBefore), b = Math.FusedMultiplyAdd(volatility, after, drift);
        double spread = b - a;
        double x = 0.5 * (a + b + Math.Sqrt(Math.FusedMultiplyAdd(-twiceVariance, logUniform, spread * spread)));
        return x > largest ? x : largest;
    }

    /// <summary>The same over a block.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Apply(ReadOnlySpan<double> before, ReadOnlySpan<double> after, ReadOnlySpan<double> logUniform, Span<double> largest)
    {
        Spans.RequireLength(largest.Length, before.Length, nameof(before));
        Spans.RequireLength(largest.Length, after.Length, nameof(after));
        Spans.RequireLength(largest.Length, logUniform.Length, nameof(logUniform));
        ref double from = ref MemoryMarshal.GetReference(before);
        ref double until = ref MemoryMarshal.GetReference(after);
        ref double uniform = ref MemoryMarshal.GetReference(logUniform);
        ref double to = ref MemoryMarshal.GetReference(largest);
        Vector512<double> scale = Vector512.Create(volatility), variance = Vector512.Create(-twiceVariance);
        nuint i = 0, length = (nuint)largest.Length;
        for (; i + 8 <= length; i += 8)
        {
            Vector512<double> a = Vector512.FusedMultiplyAdd(scale, Vector512.LoadUnsafe(ref from, i), Vector512.Create(driftBefore));
            Vector512<double> b = Vector512.FusedMultiplyAdd(scale, Vector512.LoadUnsafe(ref until, i), Vector512.Create(drift));
            Vector512<double> spread = b - a;
            Vector512<double> root = Vector512.Sqrt(Vector512.FusedMultiplyAdd(variance, Vector512.LoadUnsafe(ref uniform, i), spread * spread));
            Vector512<double> x = Vector512.Create(0.5) * (a + b + root), so = Vector512.LoadUnsafe(ref to, i);
            Vector512.ConditionalSelect(Vector512.GreaterThan(x, so), x, so).StoreUnsafe(ref to, i);
        }

        for (int j = (int)i; j < largest.Length; j++)
            largest[j] = Of(before[j], after[j], logUniform[j], largest[j]);
    }
}
