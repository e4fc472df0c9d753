namespace RiskWorker.Domain.Market;

/// <summary>What a rate curve is between two tenors; beyond its ends the zero rate of the nearest tenor holds under either.</summary>
public enum CurveInterpolation
{
    /// <summary>The zero rate is linear in time.</summary>
    LinearZero,

    /// <summary>The logarithm of the discount factor is linear in time: the forward rate is constant between two tenors.</summary>
    LogLinearDiscount,
}
