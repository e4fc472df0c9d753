using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>Where a barrier is looked at inside a horizon: closes alone are simulated, so one that every moment may cross is moved towards the underlying.</summary>
internal static class BarrierSpacing
{
    /// <summary>
    /// The level that counts as crossing at a close: the barrier itself where closes are all that count, else the barrier moved by
    /// e^(±β σ), β = 0.5826 and σ the underlying's standard deviation of a day, which closes cross as often as every moment crosses the
    /// barrier (Broadie, Glasserman and Kou 1997, turned round).
    /// </summary>
    public static double Seen(WatchedBarrier barrier, FactorMoves moves)
    {
        if (!barrier.IsContinuous) return barrier.Level;
        var shift = BarrierOptionTerms.ContinuityCorrection * moves.DeviationOf([.. Terms(barrier.Underlying)]);
        return barrier.Level * Exponential.Of(barrier.IsUp ? -shift : shift);
    }

    private static IEnumerable<(int Factor, double Weight)> Terms(UnderlyingKey key)
    {
        if (key.Factor >= 0) yield return (key.Factor, 1);
        if (key.IsCross && key.Quote >= 0) yield return (key.Quote, -1);
    }
}
