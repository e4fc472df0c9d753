using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>Gathers bound instruments into groups by underlying and flows by exponent, in the order of plans.</summary>
/// <param name="levels">All levels today.</param>
internal sealed class HoldingsBuilder(double[] levels)
{
    private readonly SortedDictionary<UnderlyingKey, GroupBuilder> _groups = [];
    private readonly SortedDictionary<LinearForm, SortedDictionary<int, double>> _amounts = [];

    /// <summary>The groups so far.</summary>
    public IReadOnlyList<UnderlyingGroup> Groups => [.. _groups.Select(g => g.Value.Build(g.Key, levels))];

    /// <summary>The flows so far.</summary>
    public IReadOnlyList<FlowBatch> Flows =>
        [.. _amounts.Select(a => new FlowBatch(a.Key, Exponential.Of(-a.Key.At(levels)), [.. a.Value.Select(v => new LinearHolding(v.Key, v.Value))]))];

    /// <summary>Adds what is held of an instrument in a cell.</summary>
    /// <param name="cell">The cell.</param>
    /// <param name="quantity">Units held.</param>
    /// <param name="bound">The instrument as of the date that it is valued at.</param>
    /// <param name="formula">The formula of an option that has one of its own, as a table where it is numerical; else null.</param>
    public void Add(int cell, double quantity, BoundInstrument bound, OptionFormula? formula)
    {
        var units = quantity * bound.Multiplier;
        if (bound is BoundFlows flows)
        {
            foreach (var flow in flows.Flows) Add(cell, units, flow);
            return;
        }
        if (KeyOf(bound) is not { } key) return;
        if (!_groups.TryGetValue(key, out var group)) _groups[key] = group = new();
        switch (bound)
        {
            case BoundForward forward:
                // At a flat rate the strike leg is a constant, so only the discounted underlying moves.
                group.AddLinear(cell, units * forward.Units);
                break;
            case BoundEuropean option:
                group.AddOption(option, new(cell, units, option.ValueWith(levels, option.Years)));
                break;
            case BoundOption option:
                group.AddFormula(option.Market, new(cell, units, ValueToday(option, formula!), formula!));
                break;
            default:
                group.AddLinear(cell, units);
                break;
        }
    }

    /// <summary>What so many units of an instrument are worth at today's levels, as <see cref="Add(int, double, BoundInstrument, OptionFormula?)"/> has it.</summary>
    public double WorthOf(double quantity, BoundInstrument bound, OptionFormula? formula) =>
        bound is BoundOption option ? quantity * bound.Multiplier * ValueToday(option, formula!) : quantity * bound.Value(levels);

    private double ValueToday(BoundOption option, OptionFormula formula) => formula.Value(option.Market.At(levels, 0, option.Underlying.LevelOf(levels)));

    /// <summary>Adds so many units of a discounted amount.</summary>
    public void Add(int cell, double units, in ExponentialFlow flow)
    {
        if (!_amounts.TryGetValue(flow.Exponent, out var byCell)) _amounts[flow.Exponent] = byCell = [];
        byCell[cell] = Math.FusedMultiplyAdd(units, flow.Amount, byCell.GetValueOrDefault(cell));
    }

    private static UnderlyingKey? KeyOf(BoundInstrument bound) => bound switch
    {
        BoundSpot s => s.Underlying,
        BoundFuture f => f.Underlying,
        BoundForward f => f.Underlying,
        BoundEuropean o => o.Underlying,
        BoundOption o => o.Underlying,
        _ => null,
    };
}
