using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing;

/// <summary>A position row with its value, or why it has none.</summary>
/// <param name="Position">The row.</param>
/// <param name="Instrument">What it holds; null where the name is unknown.</param>
/// <param name="Bound">The instrument with its names resolved; null where <paramref name="Unpriced"/> is set.</param>
/// <param name="Value">Value of the whole row in the instrument's currency; 0 where unpriced.</param>
/// <param name="ValueRoot">The same in the reporting currency.</param>
/// <param name="Exposure">Quantity times unit exposure in the reporting currency (a future's price counts, its value is 0).</param>
/// <param name="Unpriced">Why it is outside the figures; null where it is priced.</param>
public readonly record struct LineValue(Position Position, Instrument? Instrument, BoundInstrument? Bound, double Value, double ValueRoot, double Exposure, Unpriced? Unpriced);

/// <summary>Values a list of positions at one date.</summary>
public static class LineValuation
{
    /// <summary>One <see cref="LineValue"/> for each of <paramref name="positions"/>, in their order.</summary>
    /// <param name="positions">The rows.</param>
    /// <param name="instruments">Instruments by name.</param>
    /// <param name="binder">Resolves names.</param>
    /// <param name="levels">Level of every factor; NaN where there is none.</param>
    /// <param name="date">Valuation date.</param>
    public static LineValue[] Of(IReadOnlyList<Position> positions, IReadOnlyDictionary<string, Instrument> instruments, InstrumentBinder binder, ReadOnlySpan<double> levels, DateOnly date)
    {
        var lines = new LineValue[positions.Count];
        var units = new Dictionary<string, UnitValue>(StringComparer.Ordinal);
        for (var i = 0; i < lines.Length; i++)
        {
            var position = positions[i];
            if (!units.TryGetValue(position.Instrument, out var unit)) units[position.Instrument] = unit = UnitOf(position.Instrument, instruments, binder, levels, date);
            lines[i] = unit.Unpriced is { } reason
                ? new(position, unit.Instrument, null, 0, 0, 0, reason)
                : new(position, unit.Instrument, unit.Bound, position.Quantity * unit.Value, position.Quantity * unit.Value * unit.Rate, position.Quantity * unit.Exposure * unit.Rate, null);
        }
        return lines;
    }

    private sealed record UnitValue(Instrument? Instrument, BoundInstrument? Bound, double Value, double Exposure, double Rate, Unpriced? Unpriced);

    private static UnitValue UnitOf(string name, IReadOnlyDictionary<string, Instrument> instruments, InstrumentBinder binder, ReadOnlySpan<double> levels, DateOnly date)
    {
        if (!instruments.TryGetValue(name, out var instrument)) return new(null, null, 0, 0, 0, new(UnpricedReason.UnknownInstrument, "it is not in instruments.csv"));
        if (binder.Bind(instrument, date, out var bound) is { } fault) return new(instrument, null, 0, 0, 0, fault);
        var (value, exposure, rate) = (bound!.Value(levels), bound.Exposure(levels), binder.Currencies.RateOf(bound.Currency, levels));
        return double.IsFinite(exposure * rate) && double.IsFinite(value * rate)
            ? new(instrument, bound, value, exposure, rate, null)
            : new(instrument, null, 0, 0, 0, new(UnpricedReason.NoLevel, "a factor that it needs has no price"));
    }
}
