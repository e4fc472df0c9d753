namespace RiskWorker.Domain.Instruments;

/// <summary>Interest earned since the last coupon date and not yet paid: what the dirty value has over the clean one.</summary>
/// <remarks>
/// As of the date itself, without a settlement lag or an ex-coupon period; on a coupon date the coupon counts as paid and nothing
/// has accrued. Before the issue and from maturity on it is 0.
/// </remarks>
public static class AccruedInterest
{
    /// <summary>Accrued interest of one bond, before its multiplier.</summary>
    public static double Of(Bond bond, DateOnly date) =>
        Fraction(bond.Issue, bond.Maturity, AccrualRule.OfSecurity(bond.Leg.DayCount, bond.Leg.Frequency), date) * bond.Leg.Coupon * bond.Notional;

    /// <summary>Accrued interest of one floater, before its multiplier; NaN where a period runs and its fixing is unknown.</summary>
    public static double Of(Floater floater, DateOnly date)
    {
        var fraction = Fraction(floater.Issue, floater.Maturity, AccrualRule.OfSecurity(floater.Leg.DayCount, floater.Leg.Frequency), date);
        return fraction == 0 ? 0 : fraction * ((floater.Leg.LastFixing ?? double.NaN) + floater.Leg.Spread) * floater.Notional;
    }

    private static double Fraction(DateOnly issue, DateOnly maturity, AccrualRule rule, DateOnly date)
    {
        foreach (var period in PaymentSchedule.Of(issue, maturity, rule.Frequency))
        {
            if (period.Start <= date && date < period.End) return rule.Until(period, date);
        }
        return 0;
    }
}
