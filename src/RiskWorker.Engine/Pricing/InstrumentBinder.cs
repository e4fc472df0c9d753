using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;

namespace RiskWorker.Engine.Pricing;

/// <summary>Resolves an instrument's names to places in the factor list once, or says why it cannot be priced.</summary>
public sealed class InstrumentBinder
{
    private readonly IReadOnlyList<Factor> _factors;
    private readonly Dictionary<string, int> _index = new(StringComparer.Ordinal);

    /// <summary>Takes the factors whose places the bound instruments will hold.</summary>
    public InstrumentBinder(string reportingCurrency, IReadOnlyList<Factor> factors)
    {
        _factors = factors;
        Currencies = new(reportingCurrency, factors);
        for (var j = 0; j < factors.Count; j++) _index[factors[j].Name] = j;
    }

    /// <summary>The currencies known.</summary>
    public CurrencyTable Currencies { get; }

    /// <summary>Binds <paramref name="instrument"/>. Exactly one of <paramref name="bound"/> and the returned reason holds.</summary>
    /// <returns>Null when bound, else why not.</returns>
    public Unpriced? Bind(Instrument instrument, out BoundInstrument bound)
    {
        Unpriced? fault = null;
        var currency = CurrencyOf(instrument.Currency, ref fault);
        bound = instrument switch
        {
            Cash => new(PayoffShape.Cash, currency, UnderlyingKey.Of(-1), instrument.Multiplier, 0, DateOnly.MaxValue, 0, 0, false, 0, -1),
            Spot s => Linear(PayoffShape.Spot, s.Factor, s, currency, ref fault),
            Future f => Linear(PayoffShape.Future, f.Factor, f, currency, ref fault),
            Forward f => new(PayoffShape.Forward, currency, UnderlyingOf(f.Underlying, f, currency, ref fault), f.Multiplier, f.Strike, f.Expiry,
                FlatRate(f.Curve, "curve", ref fault), FlatRate(f.Carry, "carry", ref fault), false, 0, -1),
            Option { Style: ExerciseStyle.European } o => EuropeanOption(o, currency, ref fault),
            Option => Unbound(UnpricedReason.NotModelled, "American exercise is not priced in this version", ref fault),
            _ => Unbound(UnpricedReason.NotModelled, $"the kind '{instrument.Kind}' is not priced in this version", ref fault),
        };
        return fault;
    }

    private BoundInstrument Linear(PayoffShape shape, string factor, Instrument instrument, int currency, ref Unpriced? fault) =>
        new(shape, currency, UnderlyingOf(new(factor, null), instrument, currency, ref fault), instrument.Multiplier, 0, DateOnly.MaxValue, 0, 0, false, 0, -1);

    private BoundInstrument EuropeanOption(Option o, int currency, ref Unpriced? fault)
    {
        var underlying = UnderlyingOf(o.Underlying, o, currency, ref fault);
        var volatilityFactor = o.Volatility.Factor is { } name ? FactorOf(name, ref fault) : -1;
        if (fault is null && (MayTurnNegative(underlying.Factor) || MayTurnNegative(underlying.Quote)))
            fault = new(UnpricedReason.NotModelled, $"its underlying '{o.Underlying}' has normal shocks and may turn negative, where the log-normal formula has no value");
        if (fault is null && MayTurnNegative(volatilityFactor))
            fault = new(UnpricedReason.NotModelled, $"its volatility factor '{o.Volatility.Factor}' has normal shocks and may turn negative");
        return new(PayoffShape.EuropeanOption, currency, underlying, o.Multiplier, o.Strike, o.Expiry,
            FlatRate(o.Curve, "curve", ref fault), FlatRate(o.Carry, "carry", ref fault), o.Right == OptionRight.Call, o.Volatility.Flat ?? double.NaN, volatilityFactor);
    }

    private bool MayTurnNegative(int factor) => factor >= 0 && _factors[factor].Shock == ShockKind.Normal;

    private UnderlyingKey UnderlyingOf(Underlying underlying, Instrument instrument, int currency, ref Unpriced? fault)
    {
        if (underlying.BaseCurrency is { } baseCurrency)
        {
            var quoted = CurrencyOf(baseCurrency, ref fault);
            if (quoted == currency) fault ??= new(UnpricedReason.CurrencyMismatch, $"its base currency '{baseCurrency}' is its own currency");
            return fault is null ? new(true, Currencies.FactorOf(quoted), Currencies.FactorOf(currency)) : default;
        }
        var place = FactorOf(underlying.Factor!, ref fault);
        if (place < 0) return default;
        // An fx factor is quoted in the reporting currency: its own currency is what it prices.
        var factor = _factors[place];
        var quote = factor.Class == FactorClass.Fx ? Currencies.Reporting : factor.Currency;
        if (quote is not null && quote != instrument.Currency)
            fault ??= new(UnpricedReason.CurrencyMismatch, $"its currency is {instrument.Currency} but its factor '{factor.Name}' is quoted in {quote}");
        return UnderlyingKey.Of(place);
    }

    private int FactorOf(string name, ref Unpriced? fault)
    {
        if (_index.TryGetValue(name, out var place)) return place;
        fault ??= new(UnpricedReason.UnknownFactor, $"its factor '{name}' is not in factors.csv");
        return -1;
    }

    private int CurrencyOf(string currency, ref Unpriced? fault)
    {
        var place = Currencies.IndexOf(currency);
        if (place < 0) fault ??= new(UnpricedReason.UnknownCurrency, $"no fx factor prices {currency}");
        return place;
    }

    private static double FlatRate(RateTerm? term, string name, ref Unpriced? fault)
    {
        if (term is not { } rate) return 0;
        if (rate.Curve is not null) fault ??= new(UnpricedReason.NotModelled, $"its {name} names the curve '{rate.Curve}', and curves are not priced in this version");
        return rate.Flat;
    }

    private static BoundInstrument Unbound(UnpricedReason reason, string clause, ref Unpriced? fault)
    {
        fault ??= new(reason, clause);
        return default;
    }
}
