using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Pricing.Options;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>Ages options with a barrier: whether it is crossed inside the horizon is looked up scenario by scenario.</summary>
internal sealed class BarrierAgeing(InstrumentBinder binder, double[] levels)
{
    /// <summary>What <paramref name="option"/>, still alive at the close before <paramref name="dates"/> begin, turns into.</summary>
    public AgedInstrument Over(SingleBarrier option, BoundOption today, HorizonDates dates)
    {
        var (isUp, isIn) = (option.BarrierKind is BarrierKind.UpIn or BarrierKind.UpOut, option.BarrierKind is BarrierKind.DownIn or BarrierKind.UpIn);
        var expires = option.Expiry <= dates.End;
        var (date, spot) = (expires ? option.Expiry : dates.End, today.Underlying.LevelOf(levels));
        var clause = expires ? InstrumentAgeing.Expires(option.Expiry) : null;
        if (Bind(option with { BarrierKind = BarrierKind.DownIn, Issue = date, Knocked = date }, date, out var plain) is { } fault) return fault;
        if (option.Issue <= dates.AsOf && (isUp ? spot >= option.Barrier : spot <= option.Barrier)) return Touched(option, plain!, isIn, dates, clause);
        if (Bind(option with { Issue = date, Knocked = null }, date, out var untouched) is { } other) return other;

        if (dates.DayOf(date) == 0) return isIn ? new() { Cash = option.Multiplier * option.Rebate, Event = clause } : new() { Settlements = [new(0, plain!)], Event = clause };

        var (payoff, rebate) = (plain!.FormulaAt(spot), new SettledFormula(option.Rebate));
        // At expiry nothing but the payoff or the rebate is left.
        var (alive, crossed) = isIn ? (expires ? rebate : untouched!.FormulaAt(spot), payoff) : (expires ? payoff : untouched!.FormulaAt(spot), (OptionFormula)rebate);
        return new()
        {
            Path = new(today.Underlying, isUp ? LookKind.CrossedUp : LookKind.CrossedDown, option.Barrier, option.Monitoring == Monitoring.Continuous, option.Issue <= dates.AsOf, 0, 0,
                dates.DaysFrom(option.Issue, date), dates.DayOf(date), option.Multiplier, plain.Market, new CrossingMemory(alive, crossed)),
            Event = clause,
        };
    }

    // Today's close lies on the barrier or beyond: a knock-out pays its rebate now, a knock-in is plain from now on.
    private static AgedInstrument Touched(SingleBarrier option, BoundOption plain, bool isIn, HorizonDates dates, string? clause)
    {
        if (!isIn) return new() { Cash = option.Multiplier * option.Rebate, Event = clause };
        return clause is null ? new() { Rest = plain } : new() { Settlements = [new(dates.DayOf(option.Expiry), plain)], Event = clause };
    }

    private AgedInstrument? Bind(SingleBarrier option, DateOnly date, out BoundOption? bound)
    {
        var fault = binder.Bind(option, date, out var found);
        bound = found as BoundOption;
        return fault is null ? null : new() { Refusal = fault.Clause };
    }
}
