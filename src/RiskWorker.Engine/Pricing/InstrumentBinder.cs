using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Pricing;

/// <summary>Resolves an instrument's names to places in the factor list as of a date, or says why it cannot be priced.</summary>
public sealed class InstrumentBinder
{
    private readonly IReadOnlyList<Factor> _factors;
    private readonly Dictionary<string, int> _index = new(StringComparer.Ordinal);
    private readonly OptionBinder _options;

    /// <summary>Takes the factors whose places the bound instruments will hold.</summary>
    /// <param name="reportingCurrency">The root's currency.</param>
    /// <param name="factors">All factors.</param>
    /// <param name="past">Closes of the past; null where there are none.</param>
    /// <param name="seed">Seed of prices that are simulated.</param>
    /// <param name="interpolation">How curves run between their tenors.</param>
    public InstrumentBinder(string reportingCurrency, IReadOnlyList<Factor> factors, IPastLevels? past = null, ulong seed = 1, CurveInterpolation interpolation = CurveInterpolation.LinearZero)
    {
        _factors = factors;
        Currencies = new(reportingCurrency, factors);
        Curves = new(factors, interpolation);
        for (var j = 0; j < factors.Count; j++) _index[factors[j].Name] = j;
        _options = new(this, past, seed);
    }

    /// <summary>The currencies known.</summary>
    public CurrencyTable Currencies { get; }

    /// <summary>The curves known.</summary>
    public CurveSet Curves { get; }

    /// <summary>Binds <paramref name="instrument"/> as of the close of <paramref name="date"/>. Exactly one of <paramref name="bound"/> and the returned reason is there.</summary>
    /// <returns>Null when bound, else why not.</returns>
    public Unpriced? Bind(Instrument instrument, DateOnly date, out BoundInstrument? bound)
    {
        Unpriced? fault = null;
        var currency = CurrencyOf(instrument.Currency, ref fault);
        bound = instrument switch
        {
            Cash => new BoundCash(currency, instrument.Multiplier),
            Spot s => new BoundSpot(currency, s.Multiplier, UnderlyingOf(new(s.Factor, null), s, currency, ref fault)),
            Future f => new BoundFuture(currency, f.Multiplier, UnderlyingOf(new(f.Factor, null), f, currency, ref fault)),
            Bond b => Flows(b, null, b.Maturity, date, currency, ref fault),
            Floater f => Flows(f, null, f.Maturity, date, currency, ref fault),
            Swap s => Flows(s, s.Notional, s.Maturity, date, currency, ref fault),
            _ => _options.Bind(instrument, currency, date, ref fault),
        };
        if (fault is not null) bound = null;
        return fault;
    }

    /// <summary>The underlying's place, or a reason in <paramref name="fault"/>.</summary>
    internal UnderlyingKey UnderlyingOf(Underlying underlying, Instrument instrument, int currency, ref Unpriced? fault)
    {
        if (underlying.BaseCurrency is { } baseCurrency)
        {
            var quoted = CurrencyOf(baseCurrency, ref fault);
            if (quoted == currency) fault ??= new(UnpricedReason.CurrencyMismatch, $"its base currency '{baseCurrency}' is its own currency");
            return fault is null ? new(true, Currencies.FactorOf(quoted), Currencies.FactorOf(currency)) : default;
        }
        if (!_index.TryGetValue(underlying.Factor!, out var place))
        {
            fault ??= new(UnpricedReason.UnknownFactor, $"its factor '{underlying.Factor}' is not in factors.csv");
            return default;
        }
        // An fx factor is quoted in the reporting currency: its own currency is what it prices.
        var factor = _factors[place];
        var quote = factor.Class == FactorClass.Fx ? Currencies.Reporting : factor.Currency;
        if (quote is not null && quote != instrument.Currency)
            fault ??= new(UnpricedReason.CurrencyMismatch, $"its currency is {instrument.Currency} but its factor '{factor.Name}' is quoted in {quote}");
        return UnderlyingKey.Of(place);
    }

    /// <summary>Whether scenarios may turn the factor negative; false for the place -1.</summary>
    internal bool MayTurnNegative(int factor) => factor >= 0 && _factors[factor].Shock == ShockKind.Normal;

    /// <summary>The place of the factor <paramref name="name"/>, if there is one.</summary>
    internal bool TryFactor(string name, out int place) => _index.TryGetValue(name, out place) || (place = -1) >= 0;

    /// <summary>Name of a factor.</summary>
    internal string NameOf(int factor) => _factors[factor].Name;

    private BoundFlows? Flows(Instrument instrument, double? notional, DateOnly maturity, DateOnly date, int currency, ref Unpriced? fault)
    {
        if (fault is not null) return null;
        fault = RateFlows.Of(instrument, date, Curves, out var flows);
        return fault is null ? new(currency, instrument.Multiplier, ExponentialFlow.Merged(flows.Select(f => f.Flow))) { LastDay = maturity, Notional = notional * instrument.Multiplier } : null;
    }

    private int CurrencyOf(string currency, ref Unpriced? fault)
    {
        var place = Currencies.IndexOf(currency);
        if (place < 0) fault ??= new(UnpricedReason.UnknownCurrency, $"no fx factor prices {currency}");
        return place;
    }
}
