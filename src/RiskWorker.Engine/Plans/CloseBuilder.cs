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
    private readonly List<PathLook> _looks = [];
    private readonly SortedDictionary<UnderlyingKey, SortedDictionary<MarketTerms, List<PathItem>>> _paths = [];

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

    /// <summary>Adds a look at a path.</summary>
    public void Add(in PathLook look) => _looks.Add(look);

    /// <summary>Adds an option on a path, whose number is <paramref name="number"/>; <paramref name="formula"/> is its formula, as a table where it is numerical.</summary>
    public double Add(int cell, double quantity, WatchedPath path, int number, PathMemory formula)
    {
        if (!_paths.TryGetValue(path.Underlying, out var byMarket)) _paths[path.Underlying] = byMarket = [];
        if (!byMarket.TryGetValue(path.Market, out var items)) byMarket[path.Market] = items = [];
        var (units, unmoved) = (quantity * path.Multiplier, formula.Value(path.Market.At(levels, 0, path.Underlying.LevelOf(levels)), path.Unmoved));
        items.Add(new(cell, units, unmoved, number, formula));
        return units * unmoved;
    }

    /// <summary>The close, with the rates fixed at it and the amounts that earlier fixings grew.</summary>
    public DatedHoldings Build(IReadOnlyList<RateFixing> fixings, IReadOnlyList<FixedBatch> grown) => new()
    {
        Day = day,
        Groups = _holdings.Groups,
        Flows = _holdings.Flows,
        Looks = [.. _looks.OrderBy(l => l.Underlying).ThenBy(l => l.Path)],
        Paths = [.. _paths.SelectMany(u => u.Value.Select(m => new PathBatch(u.Key, m.Key, [.. m.Value.OrderBy(i => i.Cell)])))],
        Fixings = fixings,
        Fixed = grown,
    };
}
