using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Engine.Pricing.Options;

namespace RiskWorker.Engine.Plans;

/// <summary>Compiles what the holdings of a plan turn into by one horizon.</summary>
internal sealed class AgedCompiler
{
    private readonly double[] _levels;
    private readonly FactorMoves _moves;
    private readonly CalibratedModel _model;
    private readonly Horizon _horizon;
    private readonly BookAgeing _ageing;
    private readonly Dictionary<string, OptionFormula> _today;
    private readonly SortedDictionary<int, CloseBuilder> _closes = [];
    private readonly SortedDictionary<int, double> _certain = [];
    private readonly Dictionary<string, int> _barriers = new(StringComparer.Ordinal);
    private readonly FixingBuilder _fixings;

    /// <summary>Takes what the plan rests on.</summary>
    /// <param name="model">The model.</param>
    /// <param name="moves">How its factors move.</param>
    /// <param name="horizon">The horizon.</param>
    /// <param name="ageing">What the instruments turn into.</param>
    /// <param name="today">Formulas of options by instrument, for those that keep the valuation date of today.</param>
    public AgedCompiler(CalibratedModel model, FactorMoves moves, Horizon horizon, BookAgeing ageing, Dictionary<string, OptionFormula> today)
    {
        (_levels, _model, _moves, _horizon, _ageing, _today) = (model.Levels, model, moves, horizon, ageing, today);
        _fixings = new(_levels);
        CloseAt(horizon.Days); // the horizon's own close is always there
    }

    /// <summary>The aged holdings; as those of today, holdings that follow in the same order give the same bits.</summary>
    public AgedHoldings Compile(IReadOnlyList<CellHolding> holdings, int threads, CancellationToken cancellation)
    {
        var formulas = Tables(holdings, threads, cancellation);
        foreach (var holding in holdings)
        {
            var aged = _ageing.Of(holding.Instrument, _horizon);
            if (aged.Refusal is null) Earn(holding.Cell, Age(holding, aged, formulas.GetValueOrDefault(holding.Instrument)) - holding.Value);
            else CloseAt(_horizon.Days).Add(holding.Cell, holding.Quantity, holding.Bound, _today.GetValueOrDefault(holding.Instrument));
        }
        return new([.. _certain.Select(c => new LinearHolding(c.Key, c.Value))], _barriers.Count, _fixings.Count,
            [.. _closes.Select(c => c.Value.Build(_fixings.FixedOn(c.Key), c.Key == _horizon.Days ? _fixings.Fixed : []))]);
    }

    private Dictionary<string, OptionFormula> Tables(IReadOnlyList<CellHolding> holdings, int threads, CancellationToken cancellation) => PriceTables.Build(
        [.. holdings.Select(h => h.Instrument).Distinct(StringComparer.Ordinal).Select(i => (i, _ageing.Of(i, _horizon).Rest as BoundOption)).Where(r => r.Item2 is not null).Select(r => (r.i, r.Item2!))],
        _moves, _model.Law, _levels, [_horizon], threads, cancellation);

    // Returns what it all comes to at unmoved levels.
    private double Age(in CellHolding holding, AgedInstrument aged, OptionFormula? formula)
    {
        var (cell, quantity) = (holding.Cell, holding.Quantity);
        var worth = quantity * aged.Cash;
        if (aged.Rest is { } rest) worth += CloseAt(_horizon.Days).Add(cell, quantity, rest, formula);
        foreach (var (day, bound) in aged.Settlements)
            worth += day == 0 ? quantity * bound.Value(_levels) : CloseAt(day).Add(cell, quantity, bound, (bound as BoundOption)?.FormulaAt(((BoundOption)bound).Underlying.LevelOf(_levels)));
        foreach (var reset in aged.Resets)
        {
            if (reset.Discount is null && reset.Day > 0) worth += CloseAt(reset.Day).Add(cell, quantity * reset.Amount, reset.Growth);
            else if (reset.Day > 0) CloseAt(reset.Day);
            if (reset.Discount is not null || reset.Day == 0) worth += _fixings.Add(cell, quantity, reset, CloseAt(_horizon.Days));
        }
        if (aged.Barrier is { } barrier) worth += Watch(holding, barrier);
        return worth;
    }

    private double Watch(in CellHolding holding, WatchedBarrier barrier)
    {
        if (!_barriers.TryGetValue(holding.Instrument, out var number))
        {
            _barriers[holding.Instrument] = number = _barriers.Count;
            var level = BarrierSpacing.Seen(barrier, _moves);
            for (var day = barrier.FirstDay; day <= barrier.Day; day++) CloseAt(day).Add(new BarrierLook(number, barrier.Underlying, level, barrier.IsUp));
        }
        return CloseAt(barrier.Day).Add(holding.Cell, holding.Quantity, barrier, number);
    }

    private void Earn(int cell, double profit) => _certain[cell] = _certain.GetValueOrDefault(cell) + profit;

    private CloseBuilder CloseAt(int day)
    {
        if (!_closes.TryGetValue(day, out var close)) _closes[day] = close = new(day, _levels);
        return close;
    }
}
