using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>Gathers the flows of one instrument, discounted on its curve and spread; what is due by the valuation date is left out.</summary>
internal sealed class FlowList(DateOnly valuation)
{
    private readonly List<RateFlow> _flows = [];
    private RateCurve _curve = RateCurve.Flat(0);
    private RateCurve _spread = RateCurve.Flat(0);

    /// <summary>Takes the curve and the spread that discount, or says why they cannot.</summary>
    public Unpriced? Discounting(Instrument instrument, RateTerm curve, RateTerm? spread, CurveSet curves) =>
        curves.Rates(curve, "curve", instrument.Currency, out _curve)
        ?? (spread is { } over ? curves.Spreads(over, "spread", instrument.Currency, out _spread) : null);

    /// <summary>An amount that is known today.</summary>
    public void Add(DateOnly paid, double amount)
    {
        if (paid > valuation) _flows.Add(new(paid, null, new(amount, Discount(paid))));
    }

    /// <summary>The coupons of a fixed leg.</summary>
    public void AddFixed(AccrualPeriod[] periods, AccrualRule rule, double coupon, double notional)
    {
        foreach (var period in periods) Add(period.End, notional * coupon * rule.Of(period));
    }

    /// <summary>The coupons of a floating leg, or why one of them is not known.</summary>
    public Unpriced? AddFloating(AccrualPeriod[] periods, AccrualRule rule, FloatLeg leg, RateCurve projection, double notional)
    {
        foreach (var period in periods.Where(p => p.End > valuation))
        {
            Add(period.End, notional * leg.Spread * rule.Of(period));
            if (period.Start > valuation) AddProjected(period, projection, notional);
            else if (leg.LastFixing is { } fixing) Add(period.End, notional * fixing * rule.Of(period));
            else return new(UnpricedReason.MissingFixing, $"its last_fixing is missing, the rate of the period from {period.Start:yyyy-MM-dd}");
        }
        return null;
    }

    /// <summary>All of them, equal ones merged, by payment date.</summary>
    public RateFlow[] Merged() => RateFlow.Merged(_flows);

    private void AddProjected(AccrualPeriod period, RateCurve projection, double notional)
    {
        // e^(-discount(t2)) P(t1)/P(t2), in this order: where both curves are one, their difference is zero to the bit.
        var discount = Discount(period.End);
        var growth = discount.Minus(Exponent(projection, period.End)).Plus(Exponent(projection, period.Start));
        _flows.Add(new(period.End, period.Start, new(notional, growth)));
        _flows.Add(new(period.End, null, new(-notional, discount)));
    }

    private LinearForm Discount(DateOnly date) => Exponent(_curve, date).Plus(Exponent(_spread, date));

    private LinearForm Exponent(RateCurve curve, DateOnly date) => curve.ExponentAt(CurveTime.Between(valuation, date));
}
