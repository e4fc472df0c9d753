using RiskWorker.Domain.Runs;

namespace RiskWorker.Engine.Pricing.Ageing;

/// <summary>What every instrument of a book turns into by a horizon: found when it is first asked for, on one thread.</summary>
public sealed class BookAgeing
{
    private readonly Dictionary<string, LineValue> _held = new(StringComparer.Ordinal);
    private readonly Dictionary<(string Instrument, int Days), AgedInstrument> _aged = [];
    private readonly InstrumentAgeing? _ageing;
    private readonly DateOnly _asOf;

    /// <summary>Takes what each instrument turns into by so many business days.</summary>
    public BookAgeing(IReadOnlyDictionary<(string Instrument, int Days), AgedInstrument> aged) => _aged = new(aged);

    /// <summary>Takes the priced ones among <paramref name="lines"/>.</summary>
    /// <param name="lines">The lines.</param>
    /// <param name="ageing">Ages an instrument.</param>
    /// <param name="asOf">The date of the positions.</param>
    public BookAgeing(IReadOnlyList<LineValue> lines, InstrumentAgeing ageing, DateOnly asOf)
    {
        (_ageing, _asOf) = (ageing, asOf);
        foreach (var line in lines)
        {
            if (line.Unpriced is null) _held.TryAdd(line.Position.Instrument, line);
        }
    }

    /// <summary>What <paramref name="instrument"/> turns into by <paramref name="horizon"/>.</summary>
    /// <exception cref="KeyNotFoundException">It is not among those given.</exception>
    public AgedInstrument Of(string instrument, Horizon horizon)
    {
        if (_aged.TryGetValue((instrument, horizon.Days), out var aged)) return aged;
        var line = _held[instrument];
        return _aged[(instrument, horizon.Days)] = _ageing!.Over(line.Instrument!, line.Bound!, new(_asOf, horizon.Days));
    }
}
