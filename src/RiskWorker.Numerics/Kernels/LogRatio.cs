namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// ln(a/b) of two positive numbers. What the quotient rounds by is added back: near 1 it would be as large as the logarithm's last digits,
/// and a short-dated option divides it by a small deviation.
/// </summary>
internal static class LogRatio
{
    public static double Of(double a, double b)
    {
        double quotient = a / b;
        return Logarithm.Of(quotient) + (Math.FusedMultiplyAdd(-quotient, b, a) / a);
    }
}
