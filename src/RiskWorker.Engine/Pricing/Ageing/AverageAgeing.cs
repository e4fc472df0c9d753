using RiskWorker.Domain.Instruments;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>Ages options on an average of fixings, some of which fall inside the horizon: what is fixed there differs from scenario to scenario.</summary>
internal sealed class AverageAgeing(InstrumentBinder binder, IPastLevels? past, double[] levels)
{
    /// <summary>What <paramref name="option"/>, not a continuous one, turns into over <paramref name="dates"/>.</summary>
    public AgedInstrument Over(Asian option, BoundOption today, HorizonDates dates)
    {
        var expires = option.Expiry <= dates.End;
        var (date, spot, fixings) = (expires ? option.Expiry : dates.End, today.Underlying.LevelOf(levels), option.Fixings.Fixings);
        // A fixing that sees today's close is known as little as one that has been made is open.
        Fixing[] inside = [.. fixings.Where(f => dates.Hold(f.Date) && dates.DayOf(f.Date) > 0)];
        double[] known = [.. fixings.Where(f => f.Date <= dates.AsOf || (dates.Hold(f.Date) && dates.DayOf(f.Date) == 0)).Select(f => LevelOf(f, today.Underlying, dates, spot))];
        Fixing[] toCome = [.. fixings.Where(f => f.Date > dates.End)];
        var isGeometric = option.Average == AverageKind.Geometric;
        var bare = option with { Fixings = FixingSchedule.Of([.. fixings.Select((f, i) => f.Date > dates.End ? f : f with { Value = i < known.Length ? known[i] : spot })]) };
        if (toCome.Length > 0 && !isGeometric) bare = option with { Strike = spot, Fixings = FixingSchedule.Of(toCome) };
        if (binder.Bind(bare, date, out var bound) is { } fault) return new() { Refusal = fault.Clause };
        var rest = (BoundOption)bound!;
        return new()
        {
            Path = new(today.Underlying, isGeometric ? LookKind.ReturnSum : LookKind.Sum, 0, false, true, 0, isGeometric ? 0 : inside.Length * spot,
                [.. inside.Select(f => dates.DayOf(f.Date))], dates.DayOf(date), option.Multiplier, rest.Market, FormulaOf(option, rest, spot, known, inside.Length, toCome, date)),
            Event = expires ? InstrumentAgeing.Expires(option.Expiry) : inside.Length > 0 ? $"is fixed on {inside[0].Date:yyyy-MM-dd}" : null,
        };
    }

    private static PathMemory FormulaOf(Asian option, BoundOption rest, double spot, double[] known, int inside, Fixing[] toCome, DateOnly date)
    {
        var (isGeometric, count, sign) = (option.Average == AverageKind.Geometric, option.Fixings.Fixings.Count, option.Right == OptionRight.Call ? 1 : -1);
        if (toCome.Length == 0)
            return new KnownAverageMemory(isGeometric, isGeometric ? known.Sum(Logarithm.Of) + (inside * Logarithm.Of(spot)) : known.Sum(), count, option.Strike, sign);
        if (isGeometric) return new GeometricMemory(rest.FormulaAt(spot), toCome.Length);
        var years = CurveTime.Between(date, option.Expiry);
        return new ArithmeticMemory(rest.FormulaAt(spot), spot, [.. toCome.Select(f => CurveTime.Between(date, f.Date) / years)], count, (count * option.Strike) - known.Sum(), sign > 0);
    }

    // What was needed and missing has kept the option from being priced today.
    private double LevelOf(in Fixing fixing, UnderlyingKey underlying, HorizonDates dates, double spot) =>
        fixing.Date > dates.AsOf ? spot : fixing.Value ?? past?.On(underlying, fixing.Date, dates.AsOf) ?? double.NaN;
}
