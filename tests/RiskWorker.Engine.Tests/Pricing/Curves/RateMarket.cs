using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Tests.Pricing.Curves;

/// <summary>Two rate curves, a curve of spreads and a single spread, with levels that may be negative; and prices by another route: numbers, forward rates and day counts instead of forms.</summary>
internal sealed class RateMarket
{
    public static readonly DateOnly Today = new(2026, 11, 27);

    private static readonly double[] s_tenors = [0.5, 1, 3, 7, 20];

    public RateMarket(CurveInterpolation interpolation, double[] levels)
    {
        Levels = levels;
        Curves = new(Factors, interpolation);
        _interpolation = interpolation;
    }

    private readonly CurveInterpolation _interpolation;

    /// <summary>Five of the curve 'OIS', five of 'IBOR', two of the spreads 'BANK', and 'CREDIT'.</summary>
    public static Factor[] Factors { get; } =
    [
        .. s_tenors.Select(t => new Factor($"O{t}", FactorClass.Rate, ShockKind.Normal, "EUR", "OIS", t)),
        .. s_tenors.Select(t => new Factor($"I{t}", FactorClass.Rate, ShockKind.Normal, "EUR", "IBOR", t)),
        new("B2", FactorClass.Credit, ShockKind.Normal, "EUR", "BANK", 2), new("B8", FactorClass.Credit, ShockKind.Normal, "EUR", "BANK", 8),
        new("CREDIT", FactorClass.Credit, ShockKind.Lognormal),
    ];

    public static double[] Sloping { get; } = [0.021, 0.022, 0.024, 0.027, 0.03, 0.023, 0.0245, 0.027, 0.0295, 0.032, 0.006, 0.011, 0.008];

    public static double[] Negative { get; } = [-0.006, -0.0065, -0.005, -0.001, 0.002, -0.005, -0.0052, -0.004, 0.0005, 0.004, 0.004, 0.009, 0.005];

    public CurveSet Curves { get; }

    public double[] Levels { get; }

    public double ValueOf(Instrument instrument) => ValueOf(instrument, Today);

    public double ValueOf(Instrument instrument, DateOnly date) => RateFlows.DirtyValue(FlowsOf(instrument, date), Levels);

    public RateFlow[] FlowsOf(Instrument instrument, DateOnly date)
    {
        Assert.Null(RateFlows.Of(instrument, date, Curves, out var flows));
        return flows;
    }

    /// <summary>Discount factor of 'OIS' or 'IBOR' at <paramref name="date"/>, with 'BANK' or 'CREDIT' on top where named.</summary>
    public double Discount(string curve, DateOnly date, string? spread = null)
    {
        var years = (date.DayNumber - Today.DayNumber) / 365.0;
        var exponent = Exponent(s_tenors, Levels.AsSpan(curve == "OIS" ? 0 : 5, 5), years);
        exponent += spread switch { "BANK" => Exponent([2, 8], Levels.AsSpan(10, 2), years), "CREDIT" => Levels[12] * years, _ => 0 };
        return Math.Exp(-exponent);
    }

    /// <summary>Sum of the discounted coupons still to come, each with its forward rate found from the projection curve and multiplied by its day count again.</summary>
    public double DirectFloating(FloatLeg leg, DateOnly issue, DateOnly maturity, AccrualRule rule, string discount, string? spread = null)
    {
        var sum = 0.0;
        foreach (var period in PaymentSchedule.Of(issue, maturity, leg.Frequency).Where(p => p.End > Today))
        {
            var fraction = rule.Of(period);
            var rate = period.Start <= Today ? leg.LastFixing!.Value : ((Discount(leg.Projection.Curve!, period.Start) / Discount(leg.Projection.Curve!, period.End)) - 1) / fraction;
            sum += (rate + leg.Spread) * fraction * Discount(discount, period.End, spread);
        }
        return sum;
    }

    public double DirectFixed(FixedLeg leg, DateOnly issue, DateOnly maturity, AccrualRule rule, string discount, string? spread = null) =>
        PaymentSchedule.Of(issue, maturity, leg.Frequency).Where(p => p.End > Today).Sum(p => leg.Coupon * rule.Of(p) * Discount(discount, p.End, spread));

    private double Exponent(double[] tenors, ReadOnlySpan<double> zeros, double years)
    {
        if (years <= tenors[0]) return zeros[0] * years;
        if (years >= tenors[^1]) return zeros[^1] * years;
        var k = Array.FindLastIndex(tenors, t => t <= years);
        var w = (years - tenors[k]) / (tenors[k + 1] - tenors[k]);
        return _interpolation == CurveInterpolation.LinearZero
            ? years * (((1 - w) * zeros[k]) + (w * zeros[k + 1]))
            : ((1 - w) * zeros[k] * tenors[k]) + (w * zeros[k + 1] * tenors[k + 1]);
    }
}
