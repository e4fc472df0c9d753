using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Plans;

/// <summary>Gathers what is held of one underlying, in the order of the plan: by cell, then instrument.</summary>
internal sealed class GroupBuilder
{
    private readonly SortedDictionary<int, double> _units = [];
    private readonly SortedDictionary<int, List<(BoundEuropean Bound, OptionItem Item)>> _options = [];
    private readonly SortedDictionary<MarketTerms, List<FormulaItem>> _formulas = [];

    /// <summary>Adds units of the underlying.</summary>
    public void AddLinear(int cell, double units) => _units[cell] = _units.GetValueOrDefault(cell) + units;

    /// <summary>Adds a plain option.</summary>
    public void AddOption(BoundEuropean bound, OptionItem item)
    {
        if (!_options.TryGetValue(bound.VolatilityFactor, out var batch)) _options[bound.VolatilityFactor] = batch = [];
        batch.Add((bound, item));
    }

    /// <summary>Adds any other option.</summary>
    public void AddFormula(MarketTerms market, FormulaItem item)
    {
        if (!_formulas.TryGetValue(market, out var batch)) _formulas[market] = batch = [];
        batch.Add(item);
    }

    /// <summary>The group.</summary>
    /// <param name="key">The underlying.</param>
    /// <param name="levels">All levels today.</param>
    public UnderlyingGroup Build(UnderlyingKey key, double[] levels) => new(key, key.LevelOf(levels),
        [.. _units.Select(u => new LinearHolding(u.Key, u.Value))],
        [.. _options.Select(o => Batch(o.Key, [.. o.Value.OrderBy(i => i.Item.Cell)], levels))],
        [.. _formulas.Select(f => new FormulaBatch(f.Key, [.. f.Value.OrderBy(i => i.Cell)]))]);

    private static OptionBatch Batch(int volatilityFactor, List<(BoundEuropean Bound, OptionItem Item)> options, double[] levels) =>
        new(volatilityFactor, [.. options.Select(o => o.Item)], [.. options.Select(o => o.Bound.Terms(levels, o.Bound.Years))]);
}
