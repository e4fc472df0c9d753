using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Numerics.Options;

/// <summary>The limit of an American put of strike 1 without volatility: the best of exercising at once, at expiry and between.</summary>
internal static class DeterministicExercise
{
    /// <summary>The largest of 0 and e^(-rt) - S e^(-qt) over 0 ≤ t ≤ T.</summary>
    public static double PutValue(double spot, double years, double rate, double carryYield)
    {
        double best = Math.Max(0.0, Math.Max(At(0.0, spot, rate, carryYield), At(years, spot, rate, carryYield)));
        double ratio = rate / (carryYield * spot);
        if (rate == carryYield || !(ratio > 0.0) || double.IsInfinity(ratio))
            return best;
        double turning = Logarithm.Of(ratio) / (rate - carryYield);
        return turning > 0.0 && turning < years ? Math.Max(best, At(turning, spot, rate, carryYield)) : best;
    }

    private static double At(double time, double spot, double rate, double carryYield) =>
        Math.FusedMultiplyAdd(-spot, Exponential.Of(-carryYield * time), Exponential.Of(-rate * time));
}
