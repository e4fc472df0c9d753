using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>What every instrument of a book turns into by each horizon of a run.</summary>
public sealed class BookAgeing
{
    private readonly IReadOnlyDictionary<(string Instrument, int Days), AgedInstrument> _aged;

    /// <summary>Takes what each instrument turns into by so many business days.</summary>
    public BookAgeing(IReadOnlyDictionary<(string Instrument, int Days), AgedInstrument> aged) => _aged = aged;

    /// <summary>Ages the priced ones among <paramref name="lines"/>.</summary>
    /// <param name="lines">The lines.</param>
    /// <param name="ageing">Ages an instrument.</param>
    /// <param name="asOf">The date of the positions.</param>
    /// <param name="horizons">The horizons.</param>
    public static BookAgeing Of(IReadOnlyList<LineValue> lines, InstrumentAgeing ageing, DateOnly asOf, IEnumerable<Horizon> horizons)
    {
        var aged = new Dictionary<(string, int), AgedInstrument>();
        var held = lines.Where(l => l.Unpriced is null).DistinctBy(l => l.Position.Instrument, StringComparer.Ordinal).ToList();
        foreach (var dates in horizons.Distinct().Select(h => new HorizonDates(asOf, h.Days)))
        {
            foreach (var line in held) aged[(line.Position.Instrument, dates.Days)] = ageing.Over(line.Instrument!, line.Bound!, dates);
        }
        return new(aged);
    }

    /// <summary>What <paramref name="instrument"/> turns into by <paramref name="horizon"/>.</summary>
    public AgedInstrument Of(string instrument, Horizon horizon) => _aged[(instrument, horizon.Days)];
}
