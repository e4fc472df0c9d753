using System.Globalization;

namespace RiskWorker.Domain.Instruments;

/// <summary>Reads the linear rate products; faults go to the reader of terms.</summary>
internal static class RateProductReader
{
    // Beyond it a percentage was typed for a decimal far sooner than anybody paid 200% a year.
    private const double HighestRate = 2;
    private const double LargestNotional = 1e15;

    private const string Decimal = "a decimal between -2 and 2 (0.05 is 5%)";

    public static Bond Bond(InstrumentRow row, TermReader terms)
    {
        var leg = Fixed(terms, mayHaveNoCoupon: true);
        var (issue, maturity) = Life(terms);
        return new(leg, issue, maturity, Curve(terms, "curve"), Notional(terms, Instruments.Bond.DefaultNotional), Spread(terms))
        { Name = row.Name, Currency = row.Currency };
    }

    public static Floater Floater(InstrumentRow row, TermReader terms)
    {
        var leg = Floating(terms);
        var (issue, maturity) = Life(terms);
        return new(leg, issue, maturity, Curve(terms, "curve"), Notional(terms, Instruments.Bond.DefaultNotional), Spread(terms))
        { Name = row.Name, Currency = row.Currency };
    }

    public static Swap Swap(InstrumentRow row, TermReader terms)
    {
        var receive = terms.Choice<ReceivedLeg>("receive");
        var (@fixed, floating) = (Fixed(terms, mayHaveNoCoupon: false), Floating(terms));
        var (issue, maturity) = Life(terms);
        return new(receive, @fixed, floating, issue, maturity, Curve(terms, "curve"), Notional(terms, null))
        { Name = row.Name, Currency = row.Currency };
    }

    private static FixedLeg Fixed(TermReader terms, bool mayHaveNoCoupon)
    {
        var coupon = Rate(terms, "coupon", isNeeded: true) ?? 0;
        var frequency = Frequency(terms, "frequency", mayHaveNoCoupon);
        if (frequency == 0 && coupon != 0) Fault(terms, "frequency", "1, 2, 4 or 12, since coupon is not 0");
        return new(coupon, frequency ?? 0, DayCount(terms, "day_count"));
    }

    private static FloatLeg Floating(TermReader terms) => new(
        Curve(terms, "projection"), Frequency(terms, "float_frequency", mayBeZero: false) ?? 0, DayCount(terms, "float_day_count"),
        Rate(terms, "float_spread", isNeeded: false) ?? 0, Rate(terms, "last_fixing", isNeeded: false));

    private static (DateOnly Issue, DateOnly Maturity) Life(TermReader terms)
    {
        var before = terms.Faults.Count;
        var (issue, maturity) = (terms.Date("issue"), terms.Date("maturity"));
        if (terms.Faults.Count > before) return (issue, maturity);
        if (issue < PaymentSchedule.EarliestIssue) Fault(terms, "issue", $"a date from {PaymentSchedule.EarliestIssue:yyyy-MM-dd} on");
        if (maturity <= issue || maturity.Year - issue.Year > PaymentSchedule.MostYears)
            Fault(terms, "maturity", string.Create(CultureInfo.InvariantCulture, $"a date after issue ({issue:yyyy-MM-dd}), at most {PaymentSchedule.MostYears} years later"));
        return (issue, maturity);
    }

    private static RateTerm Curve(TermReader terms, string term)
    {
        if (terms.Rate(term) is { } rate) return Plausible(terms, term, rate);
        Fault(terms, term, "a curve, or a rate as a decimal");
        return default;
    }

    private static RateTerm? Spread(TermReader terms) => terms.Rate("spread") is { } spread ? Plausible(terms, "spread", spread) : null;

    private static RateTerm Plausible(TermReader terms, string term, RateTerm rate)
    {
        if (rate.Curve is null && Math.Abs(rate.Flat) > HighestRate) Fault(terms, term, $"{Decimal}, or a name");
        return rate;
    }

    private static double? Rate(TermReader terms, string term, bool isNeeded)
    {
        if (terms.OptionalText(term) is not { } text)
        {
            if (isNeeded) Fault(terms, term, Decimal);
            return null;
        }
        if (TermReader.Number(text, out var rate) && Math.Abs(rate) <= HighestRate) return rate;
        Fault(terms, term, Decimal);
        return null;
    }

    private static double Notional(TermReader terms, double? otherwise)
    {
        var text = terms.OptionalText("notional");
        if (text is null && otherwise is { } usual) return usual;
        if (text is not null && TermReader.Number(text, out var notional) && notional != 0 && Math.Abs(notional) <= LargestNotional) return notional;
        Fault(terms, "notional", "a number other than 0, at most 1e15 in size");
        return 0;
    }

    private static int? Frequency(TermReader terms, string term, bool mayBeZero)
    {
        int? frequency = terms.OptionalText(term) switch
        {
            "0" when mayBeZero => 0,
            "1" => 1,
            "2" => 2,
            "4" => 4,
            "12" => 12,
            _ => null,
        };
        if (frequency is null) Fault(terms, term, mayBeZero ? "0 (no coupons), 1, 2, 4 or 12" : "1, 2, 4 or 12");
        return frequency;
    }

    private static DayCount DayCount(TermReader terms, string term)
    {
        if (terms.OptionalText(term) is { } text && DayCounts.BySpelling.TryGetValue(text, out var dayCount)) return dayCount;
        Fault(terms, term, "one of " + string.Join(", ", DayCounts.BySpelling.Keys));
        return default;
    }

    private static void Fault(TermReader terms, string term, string expected) => terms.Faults.Add(new(term, terms.OptionalText(term) ?? "", expected));
}
