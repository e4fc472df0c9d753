using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing;

/// <summary>Binds forwards and options: to the plain formula at flat rates where that will do, else to a formula over the market up to expiry.</summary>
internal sealed class OptionBinder(InstrumentBinder binder, IPastLevels? past, ulong seed)
{
    // Looks at a barrier that is observed daily come once a business day.
    private const double YearsBetweenLooks = 1.0 / 252;

    /// <summary>Binds <paramref name="instrument"/> as of <paramref name="date"/>, or sets <paramref name="fault"/>.</summary>
    public BoundInstrument? Bind(Instrument instrument, int currency, DateOnly date, ref Unpriced? fault) => instrument switch
    {
        Forward f => Forward(f, currency, date, ref fault),
        Option { Style: ExerciseStyle.European } o => Plain(o, currency, date, ref fault),
        Option o => Other(o, new(o.Underlying, o.Strike, o.Expiry, o.Right, o.Volatility, o.Curve, o.Carry), currency, date, ref fault,
            (_, years, _) => Always(new AmericanFormula(o.Strike, years, o.Right == OptionRight.Call))),
        Digital d => Other(d, new(d.Underlying, d.Strike, d.Expiry, d.Right, d.Volatility, d.Curve, d.Carry), currency, date, ref fault, (_, _, _) => spot =>
            new DigitalFormula(d.Notional is { } cash ? DigitalOptionTerms.CashOrNothing(spot, d.Strike, cash, d.Right == OptionRight.Call) : DigitalOptionTerms.AssetOrNothing(spot, d.Strike, d.Right == OptionRight.Call))),
        SingleBarrier b => Barrier(b, currency, date, ref fault),
        Asian a => Asian(a, currency, date, ref fault),
        Lookback l => Lookback(l, currency, date, ref fault),
        UnmodelledInstrument { Fault: { } clause } => Unbound(new(UnpricedReason.NotModelled, clause), ref fault),
        _ => Unbound(new(UnpricedReason.NotModelled, $"the kind '{instrument.Kind}' is not priced in this version"), ref fault),
    };

    private readonly record struct SharedTerms(Underlying Underlying, double Strike, DateOnly Expiry, OptionRight Right, VolatilityTerm Volatility, RateTerm? Curve, RateTerm? Carry);

    private delegate Func<double, OptionFormula>? FormulaOf(UnderlyingKey underlying, double years, Note note);

    /// <summary>Where a formula leaves a fault, or what a crossed barrier has made of it.</summary>
    private sealed class Note
    {
        public Unpriced? Fault { get; set; }

        public string? CrossedBarrier { get; set; }
    }

    private BoundInstrument? Forward(Forward f, int currency, DateOnly date, ref Unpriced? fault)
    {
        var underlying = binder.UnderlyingOf(f.Underlying, f, currency, ref fault);
        if (Expired(f.Expiry, date, ref fault)) return null;
        var years = CurveTime.Between(date, f.Expiry);
        if (f.Curve?.Curve is null && f.Carry?.Curve is null)
            return new BoundForward(currency, f.Multiplier, underlying, f.Strike, years, f.Curve?.Flat ?? 0, f.Carry?.Flat ?? 0) { LastDay = f.Expiry };
        var (discount, carry) = Rates(f.Curve, f.Carry, f, years, ref fault);
        return new BoundOption(currency, f.Multiplier, underlying, new(discount, carry, VolatilityCurve.Flat(0).VarianceAt(0)), Always(new ForwardFormula(f.Strike))) { LastDay = f.Expiry };
    }

    private BoundInstrument? Plain(Option o, int currency, DateOnly date, ref Unpriced? fault)
    {
        var isFlat = o.Curve?.Curve is null && o.Carry?.Curve is null;
        var factor = -1;
        if (o.Volatility.Factor is { } name && !binder.TryFactor(name, out factor)) isFlat = false;
        if (!isFlat)
        {
            return Other(o, new(o.Underlying, o.Strike, o.Expiry, o.Right, o.Volatility, o.Curve, o.Carry), currency, date, ref fault,
                (_, _, _) => spot => new PlainFormula(new(spot, o.Strike, o.Right == OptionRight.Call)));
        }
        var underlying = UnderlyingOf(o.Underlying, o, currency, ref fault);
        CheckVolatility(factor, ref fault);
        if (Expired(o.Expiry, date, ref fault)) return null;
        return new BoundEuropean(currency, o.Multiplier, underlying, o.Strike, CurveTime.Between(date, o.Expiry), o.Curve?.Flat ?? 0, o.Carry?.Flat ?? 0,
            o.Right == OptionRight.Call, o.Volatility.Flat ?? double.NaN, factor)
        { LastDay = o.Expiry };
    }

    private BoundOption? Barrier(SingleBarrier b, int currency, DateOnly date, ref Unpriced? fault)
    {
        var (isUp, isIn, isCall) = (b.BarrierKind is BarrierKind.UpIn or BarrierKind.UpOut, b.BarrierKind is BarrierKind.DownIn or BarrierKind.UpIn, b.Right == OptionRight.Call);
        return Other(b, new(b.Underlying, b.Strike, b.Expiry, b.Right, b.Volatility, b.Curve, b.Carry), currency, date, ref fault, (underlying, years, note) =>
        {
            var knocked = b.Knocked is { } given && given <= date ? b.Knocked : FirstTouch(underlying, b, isUp, date);
            if (knocked is { } day)
            {
                note.CrossedBarrier = $"its barrier {b.Barrier:R} was crossed on {day:yyyy-MM-dd}, so it {(isIn ? "is a plain option now" : "is worth nothing any more")}";
                return isIn ? spot => new PlainFormula(new(spot, b.Strike, isCall)) : Always(new SettledFormula(0));
            }
            return spot => new BarrierFormula(new(spot, b.Strike, b.Barrier, isCall, isUp, isIn, b.Rebate, years, b.Monitoring == Monitoring.Daily ? YearsBetweenLooks : 0));
        });
    }

    // A touch at today's close is the formula's business: it pays the rebate of a knock-out now.
    private DateOnly? FirstTouch(UnderlyingKey underlying, SingleBarrier b, bool isUp, DateOnly date)
    {
        if (past is null) return null;
        foreach (var day in past.Dates(b.Issue, date.AddDays(-1)))
        {
            var level = past.On(underlying, day, date);
            if (isUp ? level >= b.Barrier : level <= b.Barrier) return day;
        }
        return null;
    }

    private BoundOption? Asian(Asian a, int currency, DateOnly date, ref Unpriced? fault) =>
        Other(a, new(a.Underlying, a.Strike, a.Expiry, a.Right, a.Volatility, a.Curve, a.Carry), currency, date, ref fault, (underlying, years, note) =>
        {
            if (PastFixings(a, underlying, date, note) is not { } fixings) return null;
            if (a.Average == AverageKind.Arithmetic)
            {
                if (a.Fixings.IsContinuous && a.Issue > date) note.Fault = new(UnpricedReason.NotModelled, $"its continuous arithmetic average starts only on {a.Issue:yyyy-MM-dd}");
                return Always(PathContracts.Arithmetic(seed, a, date, fixings));
            }
            var isCall = a.Right == OptionRight.Call;
            if (a.Fixings.IsContinuous)
            {
                var start = CurveTime.Between(date, a.Issue!.Value);
                return spot => new GeometricAsianFormula(GeometricAsianTerms.Continuous(spot, a.Strike, years, start, start < 0 ? GeometricMean(fixings) : spot, isCall));
            }
            double[] toCome = [.. a.Fixings.Fixings.Where(f => f.Date > date).Select(f => CurveTime.Between(date, f.Date))];
            return spot => new GeometricAsianFormula(GeometricAsianTerms.Discrete(spot, a.Strike, years, toCome, fixings, isCall));
        });

    private static double GeometricMean(List<double> levels) => Exponential.Of(levels.Sum(Logarithm.Of) / levels.Count);

    /// <summary>Levels of the fixings so far, today's close among them; null with a fault where one is missing.</summary>
    private List<double>? PastFixings(Asian a, UnderlyingKey underlying, DateOnly date, Note note)
    {
        if (a.Fixings.IsContinuous) return a.Issue < date ? ClosesSince(a.Issue!.Value, underlying, date, note) : [];
        var levels = new List<double>();
        foreach (var fixing in a.Fixings.Fixings.TakeWhile(f => f.Date <= date))
        {
            var level = fixing.Value ?? past?.On(underlying, fixing.Date, date) ?? double.NaN;
            if (!(level > 0))
            {
                note.Fault = new(UnpricedReason.MissingFixing, $"its fixing of {fixing.Date:yyyy-MM-dd} is missing: give it as {fixing.Date:yyyy-MM-dd}=VALUE in fixings, or an observation on that date");
                return null;
            }
            levels.Add(level);
        }
        return levels;
    }

    private BoundOption? Lookback(Lookback l, int currency, DateOnly date, ref Unpriced? fault)
    {
        // An option on the highest level looks up, whichever side it is on; without a strike a call buys at the lowest.
        var isHighest = (l.Right == OptionRight.Call) == l.Strike.HasValue;
        var days = Weekdays(date, l.Expiry);
        return Other(l, new(l.Underlying, l.Strike ?? 0, l.Expiry, l.Right, l.Volatility, l.Curve, l.Carry), currency, date, ref fault, (underlying, _, note) =>
        {
            if ((l.Issue < date ? ClosesSince(l.Issue, underlying, date, note) : [.. Closes(underlying, l.Issue, date)]) is not { } closes) return null;
            double? extreme = closes.Count == 0 ? null : isHighest ? closes.Max() : closes.Min();
            return Always(PathContracts.Lookback(seed, l, date, extreme, days));
        });
    }

    private static List<DateOnly> Weekdays(DateOnly after, DateOnly last)
    {
        var days = new List<DateOnly>();
        for (var day = after.AddDays(1); day <= last; day = day.AddDays(1))
        {
            if (day.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday) || day == last) days.Add(day);
        }
        return days;
    }

    /// <summary>All closes since an issue in the past; null with a fault where there is none.</summary>
    private List<double>? ClosesSince(DateOnly issue, UnderlyingKey underlying, DateOnly date, Note note)
    {
        List<double> closes = [.. Closes(underlying, issue, date)];
        if (closes.Count > 0) return closes;
        note.Fault = new(UnpricedReason.MissingFixing, $"it looks back to its issue on {issue:yyyy-MM-dd}, and its underlying has not been observed since");
        return null;
    }

    private IEnumerable<double> Closes(UnderlyingKey underlying, DateOnly from, DateOnly to) =>
        past is null ? [] : past.Dates(from, to).Select(d => past.On(underlying, d, to)).Where(level => level > 0);

    private BoundOption? Other(Instrument instrument, SharedTerms terms, int currency, DateOnly date, ref Unpriced? fault, FormulaOf formulaOf)
    {
        var underlying = UnderlyingOf(terms.Underlying, instrument, currency, ref fault);
        if (Expired(terms.Expiry, date, ref fault)) return null;
        var years = CurveTime.Between(date, terms.Expiry);
        var (discount, carry) = Rates(terms.Curve, terms.Carry, instrument, years, ref fault);
        fault ??= binder.Curves.Volatilities(terms.Volatility, out _);
        if (fault is not null) return null;
        binder.Curves.Volatilities(terms.Volatility, out var volatility);
        var variance = volatility.VarianceAt(years);
        foreach (var (factor, _) in variance.Terms) CheckVolatility(factor, ref fault);
        if (fault is not null) return null;
        var note = new Note();
        var formulaAt = formulaOf(underlying, years, note);
        fault = note.Fault;
        return fault is null ? new BoundOption(currency, instrument.Multiplier, underlying, new(discount, carry, variance), formulaAt!) { LastDay = terms.Expiry, CrossedBarrier = note.CrossedBarrier } : null;
    }

    private (LinearForm Discount, LinearForm Carry) Rates(RateTerm? curve, RateTerm? carry, Instrument instrument, double years, ref Unpriced? fault)
    {
        var (discounting, yielding) = (LinearForm.Zero, LinearForm.Zero);
        fault ??= binder.Curves.ExponentOf(curve ?? RateTerm.Of(0), "curve", instrument.Currency, years, out discounting);
        // The yield of a foreign currency lies on a curve of that currency, whichever it is.
        fault ??= binder.Curves.ExponentOf(carry ?? RateTerm.Of(0), "carry", null, years, out yielding);
        return (discounting, yielding);
    }

    private UnderlyingKey UnderlyingOf(Underlying underlying, Instrument instrument, int currency, ref Unpriced? fault)
    {
        var key = binder.UnderlyingOf(underlying, instrument, currency, ref fault);
        if (fault is null && (binder.MayTurnNegative(key.Factor) || binder.MayTurnNegative(key.Quote)))
            fault = new(UnpricedReason.NotModelled, $"its underlying '{underlying}' has normal shocks and may turn negative, where the log-normal formula has no value");
        return key;
    }

    private void CheckVolatility(int factor, ref Unpriced? fault)
    {
        if (fault is null && binder.MayTurnNegative(factor))
            fault = new(UnpricedReason.NotModelled, $"its volatility factor '{binder.NameOf(factor)}' has normal shocks and may turn negative");
    }

    private static bool Expired(DateOnly expiry, DateOnly date, ref Unpriced? fault)
    {
        if (expiry < date) fault ??= new(UnpricedReason.Expired, $"it expired on {expiry:yyyy-MM-dd}");
        return fault is not null;
    }

    private static Func<double, OptionFormula> Always(OptionFormula formula) => _ => formula;

    private static BoundInstrument? Unbound(Unpriced reason, ref Unpriced? fault)
    {
        fault ??= reason;
        return null;
    }
}
