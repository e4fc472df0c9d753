using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>What a look at a close has to see of a path that counts at every moment: only closes are simulated inside a horizon.</summary>
internal static class LookSpacing
{
    /// <summary>
    /// The level that counts as crossing a barrier, or what a level is multiplied by before it is an extreme. Where every moment counts a
    /// barrier is moved towards the underlying, and an extreme away from it, by e^(±β σ), β = 0.5826 and σ the underlying's standard deviation
    /// of a day (Broadie, Glasserman and Kou 1997 and 1999, turned round): closes then cross, or reach, as often or far as every moment does.
    /// </summary>
    public static double NumberOf(WatchedPath path, FactorMoves moves)
    {
        var shift = path.IsContinuous ? BarrierOptionTerms.ContinuityCorrection * moves.DeviationOf([.. Terms(path.Underlying)]) : 0;
        return path.Kind switch
        {
            LookKind.CrossedUp => path.Barrier * Exponential.Of(-shift),
            LookKind.CrossedDown => path.Barrier * Exponential.Of(shift),
            LookKind.Highest => Exponential.Of(shift),
            LookKind.Lowest => Exponential.Of(-shift),
            _ => 0,
        };
    }

    private static IEnumerable<(int Factor, double Weight)> Terms(UnderlyingKey key)
    {
        if (key.Factor >= 0) yield return (key.Factor, 1);
        if (key.IsCross && key.Quote >= 0) yield return (key.Quote, -1);
    }
}
