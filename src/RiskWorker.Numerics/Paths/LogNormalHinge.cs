using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Paths;

/// <summary>E[(slope·G + offset)⁺] for a log-normal G: the formula of Black (1976), its certain cases included.</summary>
internal static class LogNormalHinge
{
    public static double Mean(double slope, double offset, double mean, double deviation)
    {
        double level = slope * mean;
        if (slope >= 0.0 && offset >= 0.0)
            return level + offset;
        if (slope <= 0.0 && offset <= 0.0)
            return 0.0;
        double forward = Math.Abs(level), strike = Math.Abs(offset);
        return EuropeanOption.Value(new EuropeanOptionTerms(forward, strike, 1.0, deviation, 0.0, 0.0, slope > 0.0), 0.0, forward);
    }
}
