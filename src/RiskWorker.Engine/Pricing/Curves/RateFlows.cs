using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>
/// Turns a bond, floater or swap into its flows as of a valuation date: the sum of their values is the dirty value of one unit before
/// its multiplier (for a swap, the leg received less the leg paid), exactly, at any levels.
/// </summary>
/// <remarks>
/// <para>
/// What is paid on the valuation date or before is left out: the close of a date has paid what falls due on it, and the period that
/// starts on it runs. Discounting is on the instrument's curve, plus its spread, at <see cref="CurveTime"/>.
/// </para>
/// <para>
/// A floating coupon whose period has begun is the last fixing plus the spread of the leg. A later one, over t1 to t2, is projected:
/// N (P(t1)/P(t2) - 1), with P the discount factors of the projection curve, paid at t2 and discounted on the other curve, plus the
/// leg's spread. The day count is not in it: the forward rate is (P(t1)/P(t2) - 1) over the period's fraction, the coupon multiplies
/// by the same fraction. It is the difference of two exponentials; where projection and discount are one curve they telescope from
/// coupon to coupon when flows are merged by exponent alone (<see cref="ExponentialFlow.Merged"/>).
/// </para>
/// </remarks>
public static class RateFlows
{
    /// <summary>The flows of <paramref name="instrument"/>, by payment date; none on the day of maturity itself.</summary>
    /// <param name="instrument">A bond, floater or swap.</param>
    /// <param name="valuation">Valuation date.</param>
    /// <param name="curves">The run's curves.</param>
    /// <param name="flows">The flows; none where a reason is returned.</param>
    /// <returns>Null when the instrument has flows that can be valued, else why not.</returns>
    public static Unpriced? Of(Instrument instrument, DateOnly valuation, CurveSet curves, out RateFlow[] flows)
    {
        var list = new FlowList(valuation, valuation);
        var fault = Add(list, instrument, valuation, curves);
        flows = fault is null ? list.Merged() : [];
        return fault;
    }

    /// <summary>
    /// The flows as of <paramref name="valuation"/> of what is held since <paramref name="known"/>, on whose close rates are known: one that
    /// is fixed in between takes the curve of its own date.
    /// </summary>
    /// <param name="instrument">A bond, floater or swap, alive on <paramref name="known"/>.</param>
    /// <param name="known">The earlier date.</param>
    /// <param name="valuation">The later date.</param>
    /// <param name="curves">The run's curves.</param>
    /// <param name="flows">The flows; meaningless where a reason is returned.</param>
    /// <returns>Null when the instrument has flows that can be valued, else why not.</returns>
    public static Unpriced? Between(Instrument instrument, DateOnly known, DateOnly valuation, CurveSet curves, out PassedFlows flows)
    {
        var list = new FlowList(known, valuation);
        var fault = Add(list, instrument, known, curves);
        flows = list.Passed();
        return fault;
    }

    /// <summary>Value of <paramref name="flows"/> at <paramref name="levels"/>, accrued interest included: merged by exponent, then summed.</summary>
    public static double DirtyValue(IEnumerable<RateFlow> flows, ReadOnlySpan<double> levels) =>
        ExponentialFlow.Sum(ExponentialFlow.Merged(flows.Select(f => f.Flow)), levels);

    /// <summary>The quoted value: dirty less accrued interest.</summary>
    public static double CleanValue(double dirty, double accrued) => dirty - accrued;

    private static Unpriced? Matured(DateOnly maturity, DateOnly valuation) =>
        maturity < valuation ? new(UnpricedReason.Expired, $"it matured on {maturity:yyyy-MM-dd}") : null;

    private static Unpriced? Add(FlowList list, Instrument instrument, DateOnly known, CurveSet curves) => instrument switch
    {
        Bond b => Matured(b.Maturity, known) ?? list.Discounting(b, b.Curve, b.Spread, curves) ?? Add(list, b),
        Floater f => Matured(f.Maturity, known) ?? list.Discounting(f, f.Curve, f.Spread, curves) ?? Add(list, f, curves),
        Swap s => Matured(s.Maturity, known) ?? list.Discounting(s, s.Curve, null, curves) ?? Add(list, s, curves),
        _ => new(UnpricedReason.NotModelled, $"the kind '{instrument.Kind}' has no rate flows"),
    };

    private static Unpriced? Add(FlowList list, Bond bond)
    {
        list.AddFixed(PaymentSchedule.Of(bond.Issue, bond.Maturity, bond.Leg.Frequency), AccrualRule.OfSecurity(bond.Leg.DayCount, bond.Leg.Frequency), bond.Leg.Coupon, bond.Notional);
        list.Add(bond.Maturity, bond.Notional);
        return null;
    }

    private static Unpriced? Add(FlowList list, Floater floater, CurveSet curves)
    {
        list.Add(floater.Maturity, floater.Notional);
        return curves.Rates(floater.Leg.Projection, "projection", floater.Currency, out var projection)
            ?? list.AddFloating(PaymentSchedule.Of(floater.Issue, floater.Maturity, floater.Leg.Frequency), AccrualRule.OfSecurity(floater.Leg.DayCount, floater.Leg.Frequency), floater.Leg, projection, floater.Notional);
    }

    private static Unpriced? Add(FlowList list, Swap swap, CurveSet curves)
    {
        var sign = swap.Receive == ReceivedLeg.Fixed ? 1 : -1;
        var (@fixed, floating) = (swap.Fixed, swap.Floating);
        list.AddFixed(PaymentSchedule.Of(swap.Issue, swap.Maturity, @fixed.Frequency), AccrualRule.OfSwap(@fixed.DayCount, @fixed.Frequency), @fixed.Coupon, sign * swap.Notional);
        return curves.Rates(floating.Projection, "projection", swap.Currency, out var projection)
            ?? list.AddFloating(PaymentSchedule.Of(swap.Issue, swap.Maturity, floating.Frequency), AccrualRule.OfSwap(floating.DayCount, floating.Frequency), floating, projection, -sign * swap.Notional);
    }
}
