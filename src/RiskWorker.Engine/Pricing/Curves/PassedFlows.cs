namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>The flows of a linear rate product as seen from a later date than the one on which its rates are known.</summary>
/// <param name="Alive">Flows after the later date, by payment date.</param>
/// <param name="Paid">Known amounts due after the earlier and not after the later date.</param>
/// <param name="FirstPaid">The first date between the two on which anything is due; null where nothing is.</param>
/// <param name="Resets">Rates that are fixed in between, by date.</param>
public sealed record PassedFlows(IReadOnlyList<RateFlow> Alive, double Paid, DateOnly? FirstPaid, IReadOnlyList<PassedReset> Resets);

/// <summary>A rate that is fixed between the two dates; the coupon is what the amount grows by, less the amount.</summary>
/// <param name="Fixes">When it is fixed.</param>
/// <param name="Growth">Minus the logarithm of what the amount grows by, in the levels of that date.</param>
/// <param name="Amount">The amount that grows.</param>
/// <param name="Discount">Minus the logarithm of the discount factor from the later date to the payment; null where it is paid by then.</param>
public readonly record struct PassedReset(DateOnly Fixes, LinearForm Growth, double Amount, LinearForm? Discount);
