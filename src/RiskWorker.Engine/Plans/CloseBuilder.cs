using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>Gathers what happens at one close of a horizon. What is added returns its worth at unmoved levels.</summary>
/// <param name="day">The close, as business days after the as-of date.</param>
/// <param name="levels">All levels today.</param>
internal sealed class CloseBuilder(int day, double[] levels)
{
    private readonly HoldingsBuilder _holdings = new(levels);
    private readonly List<BarrierLook> _looks = [];
    private readonly SortedDictionary<UnderlyingKey, SortedDictionary<MarketTerms, List<BarrierItem>>> _barriers = [];

    /// <summary>Adds what is held of an instrument as of this close.</summary>
    public double Add(int cell, double quantity, BoundInstrument bound, OptionFormula? formula)
    {
        _holdings.Add(cell, quantity, bound, formula);
        return _holdings.WorthOf(quantity, bound, formula);
    }

    /// <summary>Adds an amount times e^(-<paramref name="exponent"/>).</summary>
    public double Add(int cell, double amount, LinearForm exponent)
    {
        _holdings.Add(cell, amount, new ExponentialFlow(1, exponent));
        return amount * Exponential.Of(-exponent.At(levels));
    }

    /// <summary>Adds a look at a barrier.</summary>
    public void Add(in BarrierLook look) => _looks.Add(look);

    /// <summary>Adds an option whose barrier has the number <paramref name="number"/>.</summary>
    public double Add(int cell, double quantity, WatchedBarrier barrier, int number)
    {
        if (!_barriers.TryGetValue(barrier.Underlying, out var byMarket)) _barriers[barrier.Underlying] = byMarket = [];
        if (!byMarket.TryGetValue(barrier.Market, out var items)) byMarket[barrier.Market] = items = [];
        var (units, unmoved) = (quantity * barrier.Multiplier, barrier.Untouched.Value(barrier.Market.At(levels, 0, barrier.Underlying.LevelOf(levels))));
        items.Add(new(cell, units, unmoved, number, barrier.Untouched, barrier.Crossed));
        return units * unmoved;
    }

    /// <summary>The close, with the rates fixed at it and the amounts that earlier fixings grew.</summary>
    public DatedHoldings Build(IReadOnlyList<RateFixing> fixings, IReadOnlyList<FixedBatch> grown) => new()
    {
        Day = day,
        Groups = _holdings.Groups,
        Flows = _holdings.Flows,
        Looks = [.. _looks.OrderBy(l => l.Underlying).ThenBy(l => l.Barrier)],
        Barriers = [.. _barriers.SelectMany(u => u.Value.Select(m => new BarrierBatch(u.Key, m.Key, [.. m.Value.OrderBy(i => i.Cell)])))],
        Fixings = fixings,
        Fixed = grown,
    };
}
