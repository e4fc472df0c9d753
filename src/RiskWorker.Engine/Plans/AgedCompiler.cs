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
    private readonly Dictionary<string, (int Number, PathMemory Formula)> _paths = new(StringComparer.Ordinal);
    private readonly List<PathStart> _starts = [];
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
        TabulatePaths(holdings, threads, cancellation);
        foreach (var holding in holdings)
        {
            var aged = _ageing.Of(holding.Instrument, _horizon);
            if (aged.Refusal is null) Earn(holding.Cell, Age(holding, aged, formulas.GetValueOrDefault(holding.Instrument)) - holding.Value);
            else CloseAt(_horizon.Days).Add(holding.Cell, holding.Quantity, holding.Bound, _today.GetValueOrDefault(holding.Instrument));
        }
        return new([.. _certain.Select(c => new LinearHolding(c.Key, c.Value))], _starts, _fixings.Count,
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
        if (aged.Path is { } path) worth += CloseAt(path.Day).Add(cell, quantity, path, _paths[holding.Instrument].Number, _paths[holding.Instrument].Formula);
        return worth;
    }

    // Every instrument's path is looked at once, whoever holds it.
    private void TabulatePaths(IReadOnlyList<CellHolding> holdings, int threads, CancellationToken cancellation)
    {
        List<(string Instrument, WatchedPath Path)> paths = [.. holdings.Select(h => h.Instrument).Distinct(StringComparer.Ordinal)
            .Select(i => (i, _ageing.Of(i, _horizon))).Where(a => a.Item2 is { Refusal: null, Path: not null }).Select(a => (a.i, a.Item2.Path!))];
        var (ranges, formulas) = (new MarketRanges(_moves, _model.Law, _levels, [_horizon]), new PathMemory[paths.Count]);
        Parallel.For(0, formulas.Length, new ParallelOptions { MaxDegreeOfParallelism = threads, CancellationToken = cancellation }, i =>
            formulas[i] = paths[i].Path.Formula.Tabulated(ranges.Of(paths[i].Path.Underlying, paths[i].Path.Market)));
        for (var i = 0; i < paths.Count; i++)
        {
            var path = paths[i].Path;
            _paths[paths[i].Instrument] = (i, formulas[i]);
            _starts.Add(new(path.Start, path.IsUnderWay ? 0 : double.NaN));
            foreach (var day in path.Looks) CloseAt(day).Add(new PathLook(i, path.Underlying, path.Kind, path.Barrier, path.Underlying.LevelOf(_levels), path.IsContinuous));
        }
    }

    private void Earn(int cell, double profit) => _certain[cell] = _certain.GetValueOrDefault(cell) + profit;

    private CloseBuilder CloseAt(int day)
    {
        if (!_closes.TryGetValue(day, out var close)) _closes[day] = close = new(day, _levels);
        return close;
    }
}
