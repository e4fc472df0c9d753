using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>Ages lookback options: the extreme of the closes inside the horizon differs from scenario to scenario.</summary>
internal sealed class ExtremeAgeing(InstrumentBinder binder, IPastLevels? past, double[] levels)
{
    /// <summary>What <paramref name="option"/>, issued by the end of <paramref name="dates"/>, turns into over them.</summary>
    public AgedInstrument Over(Lookback option, BoundOption today, HorizonDates dates)
    {
        var expires = option.Expiry <= dates.End;
        var (date, spot) = (expires ? option.Expiry : dates.End, today.Underlying.LevelOf(levels));
        // An option on the highest level looks up, whichever side it is on; without a strike a call buys at the lowest.
        var isHighest = (option.Right == OptionRight.Call) == option.Strike.HasValue;
        var reference = option with { Strike = spot, Right = isHighest ? OptionRight.Call : OptionRight.Put, Issue = date };
        if (binder.Bind(reference, date, out var bound) is { } fault) return new() { Refusal = fault.Clause };
        var (rest, looks, start) = ((BoundOption)bound!, dates.DaysFrom(option.Issue, date), Start(option, today.Underlying, dates.AsOf, isHighest));
        if (looks.Count == 0 && (start == 0 || double.IsInfinity(start))) start = spot; // a weekend's option sees today's close
        var unmoved = looks.Count == 0 ? start : isHighest ? Math.Max(start, spot) : Math.Min(start, spot);
        return new()
        {
            Path = new(today.Underlying, isHighest ? LookKind.Highest : LookKind.Lowest, 0, option.Monitoring == Monitoring.Continuous, option.Issue <= dates.AsOf, start, unmoved,
                looks, dates.DayOf(date), option.Multiplier, rest.Market, new ExtremeMemory(expires ? null : rest.FormulaAt(spot), spot, option.Strike, start, isHighest ? 1 : -1)),
            Event = expires ? InstrumentAgeing.Expires(option.Expiry) : null,
        };
    }

    // As the option is valued today: the extreme of the closes since its issue, today's included.
    private double Start(Lookback option, UnderlyingKey underlying, DateOnly asOf, bool isHighest)
    {
        var closes = past is null ? [] : past.Dates(option.Issue, asOf).Select(d => past.On(underlying, d, asOf)).Where(level => level > 0).ToList();
        return closes.Count == 0 ? (isHighest ? 0 : double.PositiveInfinity) : isHighest ? closes.Max() : closes.Min();
    }
}
