using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Distributions;

/// <summary>ln(1 + x) that keeps its digits for small x.</summary>
internal static class LogOnePlus
{
    // What 1 + x loses of x is made good by the ratio of x to what arrived (W. Kahan's way, as in HP-15C Advanced Functions Handbook, 1982).
    public static double Of(double x)
    {
        double sum = 1.0 + x;
        double arrived = sum - 1.0;
        return arrived == 0.0 ? x : arrived == x ? Logarithm.Of(sum) : Logarithm.Of(sum) * (x / arrived);
    }
}
