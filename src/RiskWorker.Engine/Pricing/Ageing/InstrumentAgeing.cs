using RiskWorker.Domain.Instruments;
using RiskWorker.Domain.Market;
using RiskWorker.Engine.Pricing.Curves;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>
/// Moves an instrument's valuation date to the end of a horizon: what is alive then is bound as of that date, what expires, pays or is fixed
/// on the way is told apart. What cannot be aged says so and keeps the valuation date of today.
/// </summary>
public sealed class InstrumentAgeing
{
    private readonly InstrumentBinder _binder;
    private readonly BarrierAgeing _barriers;
    private readonly AverageAgeing _averages;
    private readonly ExtremeAgeing _extremes;

    /// <summary>Takes what binds instruments at later dates.</summary>
    /// <param name="reportingCurrency">The root's currency.</param>
    /// <param name="factors">All factors.</param>
    /// <param name="levels">Their levels today.</param>
    /// <param name="asOf">The date of these levels.</param>
    /// <param name="past">Closes of the past; null where there are none.</param>
    /// <param name="seed">Seed of prices that are simulated.</param>
    /// <param name="interpolation">How curves run between their tenors.</param>
    public InstrumentAgeing(
        string reportingCurrency, IReadOnlyList<Factor> factors, double[] levels, DateOnly asOf, IPastLevels? past = null, ulong seed = 1, CurveInterpolation interpolation = CurveInterpolation.LinearZero)
    {
        past = past is null ? null : new KnownCloses(past, asOf);
        _binder = new(reportingCurrency, factors, past, seed, interpolation);
        (_barriers, _averages, _extremes) = (new(_binder, levels), new(_binder, past, levels), new(_binder, past, levels));
    }

    /// <summary>What <paramref name="instrument"/>, bound today as <paramref name="today"/>, turns into over <paramref name="dates"/>.</summary>
    public AgedInstrument Over(Instrument instrument, BoundInstrument today, HorizonDates dates) => instrument switch
    {
        Cash or Spot or Future => new() { Rest = today },
        Bond or Floater or Swap => Flows(instrument, (BoundFlows)today, dates),
        Option { Style: ExerciseStyle.American } o when o.Expiry < dates.End => Settled(o with { Style = ExerciseStyle.European }, o.Expiry, dates),
        SingleBarrier b when today.CrossedBarrier is null && b.Issue <= dates.End => _barriers.Over(b with { Knocked = null }, (BoundOption)today, dates),
        Asian { Fixings.IsContinuous: true } a when a.Issue < dates.End && a.Expiry > dates.AsOf => new() { Refusal = "its continuous average runs inside the horizon" },
        Asian a when a.Fixings.Fixings.Any(f => dates.Hold(f.Date)) => _averages.Over(a, (BoundOption)today, dates),
        Lookback l when l.Issue <= dates.End => _extremes.Over(l, (BoundOption)today, dates),
        _ => today.LastDay < dates.End ? Settled(instrument, today.LastDay, dates) : Alive(instrument, today, dates),
    };

    /// <summary>The clause of an instrument that expires on <paramref name="date"/>.</summary>
    internal static string Expires(DateOnly date) => $"expires on {date:yyyy-MM-dd}";

    private AgedInstrument Alive(Instrument instrument, BoundInstrument today, HorizonDates dates) =>
        _binder.Bind(instrument, dates.End, out var rest) is { } fault ? new() { Refusal = fault.Clause } : new() { Rest = rest, Event = today.LastDay == dates.End ? Expires(today.LastDay) : null };

    private AgedInstrument Settled(Instrument instrument, DateOnly expiry, HorizonDates dates) =>
        _binder.Bind(instrument, expiry, out var paid) is { } fault ? new() { Refusal = fault.Clause } : new() { Settlements = [new(dates.DayOf(expiry), paid!)], Event = Expires(expiry) };

    private AgedInstrument Flows(Instrument instrument, BoundFlows today, HorizonDates dates)
    {
        if (RateFlows.Between(instrument, dates.AsOf, dates.End, _binder.Curves, out var flows) is { } fault) return new() { Refusal = fault.Clause };
        var multiplier = instrument.Multiplier;
        return new()
        {
            Rest = new BoundFlows(today.Currency, multiplier, ExponentialFlow.Merged(flows.Alive.Select(f => f.Flow))) { LastDay = today.LastDay, Notional = today.Notional },
            Cash = multiplier * flows.Paid,
            Resets = [.. flows.Resets.Select(r => new RateReset(dates.DayOf(r.Fixes), r.Growth, multiplier * r.Amount, r.Discount))],
            Event = flows.FirstPaid is { } paid ? $"pays on {paid:yyyy-MM-dd}" : flows.Resets.Count > 0 ? $"is fixed on {flows.Resets[0].Fixes:yyyy-MM-dd}" : null,
        };
    }
}
