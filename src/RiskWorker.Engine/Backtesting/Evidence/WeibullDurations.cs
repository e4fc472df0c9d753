using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Backtesting.Evidence;

/// <summary>
/// Times between exceptions, the first and the last cut off by the ends of the series, under a Weibull law: twice the logarithm of its
/// largest likelihood over that of the exponential law, its case of shape 1.
/// </summary>
/// <remarks>
/// Given the shape b the likeliest scale is known, and what is left, n ln(n/ΣD^b) + n ln b + (b - 1) Σ ln D - n with n and the last sum
/// over whole times alone, is concave in b. Where all whole times equal the longest of all it grows without bound: b ends at <see cref="SteepestShape"/>.
/// </remarks>
internal static class WeibullDurations
{
    private const double SteepestShape = 100;
    private const double Converged = 1e-10;
    private const int MostSteps = 100;

    /// <summary>The ratio and the likeliest shape.</summary>
    /// <param name="logs">ln of all times over the longest of them.</param>
    /// <param name="whole">Sum of those of the times that were not cut off.</param>
    /// <param name="count">How many these are, at least 1.</param>
    public static (double Ratio, double Shape) Ratio(ReadOnlySpan<double> logs, double whole, int count)
    {
        var shape = 1.0;
        for (var step = 0; step < MostSteps; step++)
        {
            var (sum, first, second) = Sums(logs, shape);
            var mean = first / sum;
            var slope = (count / shape) + whole - (count * mean);
            var curvature = (-count / (shape * shape)) - (count * ((second / sum) - (mean * mean)));
            var next = Math.Clamp(shape - (slope / curvature), shape / 4, Math.Min(4 * shape, SteepestShape));
            var isDone = Math.Abs(next - shape) <= Converged * shape;
            shape = next;
            if (isDone) break;
        }
        var ratio = 2 * (Likelihood(logs, whole, count, shape) - Likelihood(logs, whole, count, 1));
        return (Math.Max(ratio, 0), shape);
    }

    private static double Likelihood(ReadOnlySpan<double> logs, double whole, int count, double shape) =>
        (count * Logarithm.Of(shape * count / Sums(logs, shape).Sum)) + ((shape - 1) * whole);

    private static (double Sum, double First, double Second) Sums(ReadOnlySpan<double> logs, double shape)
    {
        var (sum, first, second) = (0.0, 0.0, 0.0);
        foreach (var log in logs)
        {
            var power = Exponential.Of(shape * log);
            sum += power;
            first += power * log;
            second += power * log * log;
        }
        return (sum, first, second);
    }
}
