using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing.Curves;

/// <summary>
/// Gathers the flows of one instrument, discounted on its curve and spread to the valuation date; what is due by the date on which rates are
/// known is left out, what is due between the two dates is paid.
/// </summary>
/// <param name="known">The date on which rates are known.</param>
/// <param name="valuation">The valuation date: the same, or later.</param>
internal sealed class FlowList(DateOnly known, DateOnly valuation)
{
    private readonly List<RateFlow> _flows = [];
    private readonly List<PassedReset> _resets = [];
    private double _paid;
    private DateOnly? _firstPaid;
    private RateCurve _curve = RateCurve.Flat(0);
    private RateCurve _spread = RateCurve.Flat(0);

    /// <summary>Takes the curve and the spread that discount, or says why they cannot.</summary>
    public Unpriced? Discounting(Instrument instrument, RateTerm curve, RateTerm? spread, CurveSet curves) =>
        curves.Rates(curve, "curve", instrument.Currency, out _curve)
        ?? (spread is { } over ? curves.Spreads(over, "spread", instrument.Currency, out _spread) : null);

    /// <summary>An amount that is known.</summary>
    public void Add(DateOnly paid, double amount)
    {
        if (paid > valuation) _flows.Add(new(paid, null, new(amount, Discount(paid))));
        else if (paid > known) Pay(paid, amount);
    }

    /// <summary>The coupons of a fixed leg.</summary>
    public void AddFixed(AccrualPeriod[] periods, AccrualRule rule, double coupon, double notional)
    {
        foreach (var period in periods) Add(period.End, notional * coupon * rule.Of(period));
    }

    /// <summary>The coupons of a floating leg, or why one of them is not known.</summary>
    public Unpriced? AddFloating(AccrualPeriod[] periods, AccrualRule rule, FloatLeg leg, RateCurve projection, double notional)
    {
        foreach (var period in periods.Where(p => p.End > known))
        {
            Add(period.End, notional * leg.Spread * rule.Of(period));
            if (period.Start > known && period.Start >= valuation) AddProjected(period, projection, notional);
            else if (period.Start > known) AddReset(period, projection, notional);
            else if (leg.LastFixing is { } fixing) Add(period.End, notional * fixing * rule.Of(period));
            else return new(UnpricedReason.MissingFixing, $"its last_fixing is missing, the rate of the period from {period.Start:yyyy-MM-dd}");
        }
        return null;
    }

    /// <summary>All of them, equal ones merged, by payment date.</summary>
    public RateFlow[] Merged() => RateFlow.Merged(_flows);

    /// <summary>The same, with what was paid and fixed before the valuation date.</summary>
    public PassedFlows Passed() => new(Merged(), _paid, _firstPaid, [.. _resets.OrderBy(r => r.Fixes)]);

    private void Pay(DateOnly date, double amount)
    {
        _paid += amount;
        if (_firstPaid is null || date < _firstPaid) _firstPaid = date;
    }

    // Fixed at the curve of the period's own start, paid now or later.
    private void AddReset(AccrualPeriod period, RateCurve projection, double notional)
    {
        var growth = projection.ExponentAt(CurveTime.Between(period.Start, period.End)).Times(-1);
        _resets.Add(new(period.Start, growth, notional, period.End > valuation ? Discount(period.End) : null));
        Add(period.End, -notional);
    }

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
