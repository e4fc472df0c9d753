using RiskWorker.Domain.Books;
using RiskWorker.Domain.Instruments;

namespace RiskWorker.Engine.Pricing;

/// <summary>A position row with its value, or why it has none.</summary>
/// <param name="Position">The row.</param>
/// <param name="Instrument">What it holds; null where the name is unknown.</param>
/// <param name="Bound">The instrument with its names resolved; meaningless where <paramref name="Unpriced"/> is set.</param>
/// <param name="Value">Value of the whole row in the instrument's currency; 0 where unpriced.</param>
/// <param name="ValueRoot">The same in the reporting currency.</param>
/// <param name="Exposure">Quantity times unit exposure in the reporting currency (a future's price counts, its value is 0).</param>
/// <param name="Unpriced">Why it is outside the figures; null where it is priced.</param>
public readonly record struct LineValue(Position Position, Instrument? Instrument, BoundInstrument Bound, double Value, double ValueRoot, double Exposure, Unpriced? Unpriced);

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
        for (var i = 0; i < lines.Length; i++) lines[i] = Value(positions[i], instruments, binder, levels, date);
        return lines;
    }

    private static LineValue Value(in Position position, IReadOnlyDictionary<string, Instrument> instruments, InstrumentBinder binder, ReadOnlySpan<double> levels, DateOnly date)
    {
        if (!instruments.TryGetValue(position.Instrument, out var instrument))
            return new(position, null, default, 0, 0, 0, new(UnpricedReason.UnknownInstrument, "it is not in instruments.csv"));
        if (binder.Bind(instrument, out var bound) is { } fault) return new(position, instrument, default, 0, 0, 0, fault);
        if (bound.Expiry < date) return new(position, instrument, default, 0, 0, 0, new(UnpricedReason.Expired, $"it expired on {bound.Expiry:yyyy-MM-dd}"));
        var rate = binder.Currencies.RateOf(bound.Currency, levels);
        var value = position.Quantity * Valuer.ValueOf(bound, levels, date);
        var exposure = position.Quantity * Valuer.ExposureOf(bound, levels, date) * rate;
        if (!double.IsFinite(exposure) || !double.IsFinite(value * rate))
            return new(position, instrument, default, 0, 0, 0, new(UnpricedReason.NoLevel, "a factor that it needs has no price"));
        return new(position, instrument, bound, value, value * rate, exposure, null);
    }
}
