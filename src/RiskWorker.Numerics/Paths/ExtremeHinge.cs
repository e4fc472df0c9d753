using RiskWorker.Numerics.Kernels;
using RiskWorker.Numerics.Quadrature;

namespace RiskWorker.Numerics.Paths;

/// <summary>
/// E[(S·max - E)⁺], or E[(E - S·min)⁺], over the continuous extreme of a log-normal growth with constant drift: the integral of
/// S e^(±m) P(M &gt; m) over the extremes beyond E, with the law of the maximum M of a drifted Brownian motion (Borodin and Salminen
/// 2002), Φ((νT - m)/v√T) + e^(2νm/v²) Φ(-(m + νT)/v√T). No carry is special, where the closed forms divide by it.
/// </summary>
internal static class ExtremeHinge
{
    // Beyond so many deviations about its drift the law is 1 or 0 to the last bit.
    private const double Width = 10.0;

    private static readonly GaussLegendre s_rule = new(96);

    /// <param name="sign">+1 for the maximum, -1 for the minimum.</param>
    /// <param name="spot">S.</param>
    /// <param name="level">E; positive.</param>
    /// <param name="drift">ν: of the log growth, a year.</param>
    /// <param name="volatility">v.</param>
    /// <param name="years">T.</param>
    public static double Mean(double sign, double spot, double level, double drift, double volatility, double years)
    {
        double mean = sign * drift * years, deviation = volatility * Math.Sqrt(years);
        double start = Math.Max(sign * Logarithm.Of(level / spot), 0.0), centre = Math.Max(mean, 0.0);
        double low = Math.Max(start, centre - (Width * deviation));
        double high = centre + (Width * deviation) + (sign > 0.0 ? deviation * deviation : 0.0);
        double certain = sign * spot * (Exponential.Of(sign * low) - Exponential.Of(sign * start));
        double now = Math.Max(sign * (spot - level), 0.0);
        return now + certain + (high > low ? Integral(sign, spot, low, high, mean, deviation) : 0.0);
    }

    private static double Integral(double sign, double spot, double low, double high, double mean, double deviation)
    {
        double sum = 0.0;
        for (int j = 0; j < s_rule.Points.Length; j++)
        {
            double m = Math.FusedMultiplyAdd(high - low, s_rule.Points[j], low);
            sum = Math.FusedMultiplyAdd(s_rule.Weights[j] * Exponential.Of(sign * m), Beyond(m, mean, deviation), sum);
        }

        return spot * (high - low) * sum;
    }

    /// <summary>P(M &gt; m), the second term written so that it cannot overflow.</summary>
    private static double Beyond(double m, double mean, double deviation)
    {
        double a = (m - mean) / deviation, t = (m + mean) / deviation;
        if (t < 0.0)
            return NormalCdf.Of(-a) + (Exponential.Of(2.0 * mean * m / (deviation * deviation)) * NormalCdf.Of(-t));
        double near = Math.Min(t, ScaledNormalTail.Highest), tail = ScaledNormalTail.Of(near) * (t > near ? near / t : 1.0);
        return Math.FusedMultiplyAdd(Exponential.Of(-0.5 * a * a), tail, NormalCdf.Of(-a));
    }
}
