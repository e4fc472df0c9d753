namespace RiskWorker.Numerics.Kernels;

/// <summary>
/// What one scenario makes of the market that an option sees up to its expiry T: everything is a total over that time, so that a curve
/// or a surface is read once a scenario and no rate is multiplied by a time inside a kernel.
/// </summary>
/// <param name="X">Log-return of the underlying, ln(S/S₀).</param>
/// <param name="Spot">The same scenario's level, S.</param>
/// <param name="Discount">rT, the exponent of the discount factor e^(-rT).</param>
/// <param name="Carry">qT, the exponent of what holding the underlying pays: the forward is S e^(rT-qT).</param>
/// <param name="Deviation">σ√T; what is not positive counts as 0.</param>
public readonly record struct MarketPoint(double X, double Spot, double Discount, double Carry, double Deviation);
