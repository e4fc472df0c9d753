using System.Globalization;

namespace RiskWorker.Domain.Instruments;

/// <summary>Reads digitals, barriers, Asian options and lookbacks, the order of dates among their terms included.</summary>
internal static class ExoticReader
{
    private const string Day = "yyyy-MM-dd";

    private static readonly Dictionary<string, BarrierKind> s_barrierKinds = new(StringComparer.Ordinal)
    {
        ["down-in"] = BarrierKind.DownIn,
        ["down-out"] = BarrierKind.DownOut,
        ["up-in"] = BarrierKind.UpIn,
        ["up-out"] = BarrierKind.UpOut,
    };

    /// <summary>Reads a <see cref="Digital"/>.</summary>
    public static Digital Digital(TermReader terms, InstrumentRow row)
    {
        var (underlying, strike, expiry, right) = (terms.Underlying(), terms.Positive("strike"), terms.Date("expiry"), terms.Choice<OptionRight>("right"));
        European(terms);
        return new(underlying, strike, expiry, right, terms.Volatility(), terms.Rate("curve"), terms.Rate("carry"), terms.Choice<DigitalPayoff>("payoff"), Notional(terms))
        { Name = row.Name, Currency = row.Currency };
    }

    /// <summary>Reads a <see cref="SingleBarrier"/>.</summary>
    public static SingleBarrier Barrier(TermReader terms, InstrumentRow row)
    {
        var (underlying, strike, expiry, right) = (terms.Underlying(), terms.Positive("strike"), terms.Date("expiry"), terms.Choice<OptionRight>("right"));
        European(terms);
        var (volatility, curve, carry) = (terms.Volatility(), terms.Rate("curve"), terms.Rate("carry"));
        var (level, kind, rebate, monitoring) = (terms.Positive("barrier"), Kind(terms), Rebate(terms), terms.Choice<Monitoring>("monitoring"));
        var issue = NoLaterThan(terms, "issue", terms.Date("issue"), expiry);
        DateOnly? knocked = terms.OptionalText("knocked") is null ? null : Between(terms, "knocked", terms.Date("knocked"), issue, expiry);
        return new(underlying, strike, expiry, right, volatility, curve, carry, level, kind, rebate, monitoring, issue, knocked)
        { Name = row.Name, Currency = row.Currency };
    }

    /// <summary>Reads an <see cref="Asian"/>.</summary>
    public static Asian Asian(TermReader terms, InstrumentRow row)
    {
        var (underlying, strike, expiry, right) = (terms.Underlying(), terms.Positive("strike"), terms.Date("expiry"), terms.Choice<OptionRight>("right"));
        European(terms);
        var (volatility, curve, carry, average) = (terms.Volatility(), terms.Rate("curve"), terms.Rate("carry"), terms.Choice<AverageKind>("average"));
        var isContinuous = terms.OptionalText("fixings") == "continuous";
        DateOnly? issue = !isContinuous && terms.OptionalText("issue") is null ? null : NoLaterThan(terms, "issue", terms.Date("issue"), expiry);
        return new(underlying, strike, expiry, right, volatility, curve, carry, average, Fixings(terms, issue, expiry), issue)
        { Name = row.Name, Currency = row.Currency };
    }

    /// <summary>Reads a <see cref="Lookback"/>.</summary>
    public static Lookback Lookback(TermReader terms, InstrumentRow row)
    {
        var underlying = terms.Underlying();
        double? strike = terms.OptionalText("strike") is null ? null : terms.Positive("strike");
        var (expiry, right) = (terms.Date("expiry"), terms.Choice<OptionRight>("right"));
        European(terms);
        return new(underlying, strike, expiry, right, terms.Volatility(), terms.Rate("curve"), terms.Rate("carry"),
            terms.Choice<Monitoring>("monitoring"), NoLaterThan(terms, "issue", terms.Date("issue"), expiry))
        { Name = row.Name, Currency = row.Currency };
    }

    private static void European(TermReader terms)
    {
        if (terms.OptionalText("style") is { } style && style != "european")
            terms.Faults.Add(new("style", style, "european or nothing: this kind is exercised at expiry only"));
    }

    private static double? Notional(TermReader terms)
    {
        if (terms.OptionalText("payoff") != "asset") return terms.Positive("notional");
        if (terms.OptionalText("notional") is { } text) terms.Faults.Add(new("notional", text, "nothing, since payoff is asset"));
        return null;
    }

    private static BarrierKind Kind(TermReader terms)
    {
        var text = terms.OptionalText("barrier_kind") ?? "";
        if (!s_barrierKinds.TryGetValue(text, out var kind)) terms.Faults.Add(new("barrier_kind", text, "one of " + string.Join(", ", s_barrierKinds.Keys)));
        return kind;
    }

    private static double Rebate(TermReader terms)
    {
        if (terms.OptionalText("rebate") is not { } text) return 0;
        if (Number(text, out var rebate) && rebate >= 0) return rebate;
        terms.Faults.Add(new("rebate", text, "a number from 0 on"));
        return 0;
    }

    private static FixingSchedule Fixings(TermReader terms, DateOnly? issue, DateOnly expiry)
    {
        var text = terms.OptionalText("fixings");
        if (text == "continuous") return FixingSchedule.Continuous;
        var faults = terms.Faults.Count;
        var fixings = new List<Fixing>();
        foreach (var part in (text ?? "").Split(';', StringSplitOptions.TrimEntries))
        {
            if (FixingOf(part) is not { } fixing)
            {
                terms.Faults.Add(new("fixings", part, "dates as yyyy-MM-dd joined by ';', a past one may be date=value with a number above 0, or continuous"));
                continue;
            }
            if (fixings.Count > 0 && fixing.Date <= fixings[^1].Date) terms.Faults.Add(new("fixings", part, $"a date after {Text(fixings[^1].Date)}, the fixing before it"));
            else if (IsKnown(expiry) && fixing.Date > expiry) terms.Faults.Add(new("fixings", part, $"a date no later than the expiry {Text(expiry)}"));
            else if (issue is { } first && IsKnown(first) && fixing.Date < first) terms.Faults.Add(new("fixings", part, $"a date no earlier than the issue {Text(first)}"));
            fixings.Add(fixing);
        }
        return terms.Faults.Count == faults ? FixingSchedule.Of(fixings) : FixingSchedule.Continuous;
    }

    private static Fixing? FixingOf(string part)
    {
        var split = part.IndexOf('=', StringComparison.Ordinal);
        var date = split < 0 ? part : part[..split];
        if (!DateOnly.TryParseExact(date, Day, CultureInfo.InvariantCulture, DateTimeStyles.None, out var day)) return null;
        if (split < 0) return new(day, null);
        return Number(part[(split + 1)..], out var level) && level > 0 ? new(day, level) : null;
    }

    private static DateOnly NoLaterThan(TermReader terms, string term, DateOnly date, DateOnly expiry)
    {
        if (!IsKnown(date) || !IsKnown(expiry) || date <= expiry) return date;
        terms.Faults.Add(new(term, Text(date), $"a date no later than the expiry {Text(expiry)}"));
        return default;
    }

    private static DateOnly Between(TermReader terms, string term, DateOnly date, DateOnly issue, DateOnly expiry)
    {
        if (!IsKnown(date) || !IsKnown(issue) || date >= issue) return NoLaterThan(terms, term, date, expiry);
        terms.Faults.Add(new(term, Text(date), $"a date no earlier than the issue {Text(issue)}"));
        return default;
    }

    // A faulty date reads as the first of all; its own fault says enough.
    private static bool IsKnown(DateOnly date) => date != default;

    private static string Text(DateOnly date) => date.ToString(Day, CultureInfo.InvariantCulture);

    private static bool Number(string text, out double value) =>
        double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);
}
