using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Curves;
using RiskWorker.Engine.Pricing.Options;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Plans;

/// <summary>Compiles valued lines into a <see cref="RevaluationPlan"/>. Lines of one node and instrument add up; the order of rows does not matter.</summary>
public sealed class PlanCompiler
{
    private readonly BookTree _tree;
    private readonly CalibratedModel _model;
    private readonly CurrencyTable _currencies;
    private readonly IReadOnlyList<Horizon> _horizons;

    // Without ageing the valuation date stays; with it, an option's remaining life shrinks by horizon.
    private readonly Func<BoundEuropean, int, double>? _remainingYears;

    /// <summary>Takes what the plan rests on.</summary>
    /// <param name="tree">The books.</param>
    /// <param name="model">How the factors move.</param>
    /// <param name="currencies">The currencies known.</param>
    /// <param name="horizons">Horizons, in any order.</param>
    /// <param name="remainingYears">Life in years that is left to a plain option after so many business days, 0 being today; null leaves the valuation date where it is.</param>
    public PlanCompiler(BookTree tree, CalibratedModel model, CurrencyTable currencies, IEnumerable<Horizon> horizons, Func<BoundEuropean, int, double>? remainingYears = null)
    {
        (_tree, _model, _currencies) = (tree, model, currencies);
        _horizons = [.. horizons.Distinct().Order()];
        _remainingYears = remainingYears;
    }

    /// <summary>The plan of the priced ones among <paramref name="lines"/>.</summary>
    /// <param name="seed">Seed of the draws.</param>
    /// <param name="lines">The lines.</param>
    /// <param name="threads">Threads for tables of prices; the plan does not depend on how many.</param>
    /// <param name="cancellation">Stops between tables.</param>
    public RevaluationPlan Compile(ulong seed, IReadOnlyList<LineValue> lines, int threads = 1, CancellationToken cancellation = default)
    {
        var holdings = Holdings(lines);
        var moves = FactorMoves.Of(_model);
        var options = holdings.Where(h => h.Bound is BoundOption).DistinctBy(h => h.Instrument).Select(h => (h.Instrument, (BoundOption)h.Bound)).ToList();
        var formulas = PriceTables.Build(options, moves, _model.Law, _model.Levels, _horizons, threads, cancellation);
        var currencies = Currencies(holdings);
        var cells = Cells(holdings, currencies);
        var nodes = Nodes(cells, currencies);
        var plan = new RevaluationPlan
        {
            Seed = seed,
            Moves = moves,
            Law = _model.Law,
            Horizons = _horizons,
            Currencies = currencies,
            Groups = Groups(holdings, cells, currencies, formulas),
            Flows = Flows(holdings, cells, currencies),
            Cells = cells,
            Nodes = nodes,
            Rows = Rows(nodes),
            Hash = "",
        };
        return plan with { Hash = PlanHash.Of(plan) };
    }

    private readonly record struct Holding(int Node, string Instrument, BoundInstrument Bound, double Quantity, double Value);

    private List<Holding> Holdings(IReadOnlyList<LineValue> lines)
    {
        var holdings = new List<Holding>(lines.Count);
        foreach (var line in lines)
        {
            if (line.Unpriced is not null) continue;
            var node = _tree.IndexOf(line.Position.Book);
            if (node >= 0) holdings.Add(new(node, line.Position.Instrument, line.Bound!, line.Position.Quantity, line.Value));
        }
        holdings.Sort((a, b) =>
        {
            var order = a.Node.CompareTo(b.Node);
            if (order == 0) order = string.CompareOrdinal(a.Instrument, b.Instrument);
            return order != 0 ? order : a.Quantity.CompareTo(b.Quantity);
        });
        var merged = new List<Holding>(holdings.Count);
        foreach (var next in holdings)
        {
            if (merged.Count > 0 && merged[^1] is var last && last.Node == next.Node && last.Instrument == next.Instrument)
                merged[^1] = last with { Quantity = last.Quantity + next.Quantity, Value = last.Value + next.Value };
            else
                merged.Add(next);
        }
        return merged;
    }

    private List<PlanCurrency> Currencies(List<Holding> holdings)
    {
        var used = new SortedSet<int> { 0 };
        foreach (var holding in holdings) used.Add(holding.Bound.Currency);
        foreach (var book in _tree.Books) used.Add(_currencies.IndexOf(book.Currency));
        return [.. used.Select(i => new PlanCurrency(CodeOf(i), _currencies.FactorOf(i), _currencies.RateOf(i, _model.Levels)))];
    }

    private string CodeOf(int currency) => _currencies.FactorOf(currency) is var factor && factor < 0 ? _currencies.Reporting : _model.Factors[factor].Currency!;

    private List<PlanCell> Cells(List<Holding> holdings, List<PlanCurrency> currencies)
    {
        var values = new SortedDictionary<(int Node, int Currency), double>();
        foreach (var holding in holdings)
        {
            var key = (holding.Node, PlaceOf(holding.Bound.Currency, currencies));
            values[key] = values.GetValueOrDefault(key) + holding.Value;
        }
        return [.. values.Select(v => new PlanCell(v.Key.Node, v.Key.Currency, v.Value))];
    }

    private int PlaceOf(int currency, List<PlanCurrency> currencies) => currencies.FindIndex(c => c.Factor == _currencies.FactorOf(currency));

    private List<PlanNode> Nodes(List<PlanCell> cells, List<PlanCurrency> currencies)
    {
        var values = new double[_tree.Books.Count];
        foreach (var cell in cells) values[cell.Node] += cell.Value * currencies[cell.Currency].Rate;
        for (var node = values.Length - 1; node > 0; node--) values[_tree.ParentOf(node)] += values[node];
        return [.. _tree.Books.Select((book, node) => new PlanNode(book.Name, _tree.ParentOf(node), PlaceOf(_currencies.IndexOf(book.Currency), currencies), values[node]))];
    }

    private List<PlanRow> Rows(List<PlanNode> nodes)
    {
        var rows = new List<PlanRow>();
        for (var node = 0; node < nodes.Count; node++)
        {
            for (var horizon = 0; horizon < _horizons.Count; horizon++)
            {
                rows.Add(new(node, horizon, false));
                if (nodes[node].Currency != 0) rows.Add(new(node, horizon, true));
            }
        }
        return rows;
    }

    private List<UnderlyingGroup> Groups(List<Holding> holdings, List<PlanCell> cells, List<PlanCurrency> currencies, Dictionary<string, OptionFormula> formulas)
    {
        var cellOf = PlacesOf(cells);
        var groups = new SortedDictionary<UnderlyingKey, GroupBuilder>();
        foreach (var holding in holdings)
        {
            if (KeyOf(holding.Bound) is not { } key) continue;
            if (!groups.TryGetValue(key, out var group)) groups[key] = group = new();
            Add(group, cellOf[(holding.Node, PlaceOf(holding.Bound.Currency, currencies))], holding, formulas);
        }
        return [.. groups.Select(g => g.Value.Build(g.Key, g.Key.LevelOf(_model.Levels), TermsByHorizon))];
    }

    private static Dictionary<(int Node, int Currency), int> PlacesOf(List<PlanCell> cells) => cells.Index().ToDictionary(c => (c.Item.Node, c.Item.Currency), c => c.Index);

    private static UnderlyingKey? KeyOf(BoundInstrument bound) => bound switch
    {
        BoundSpot s => s.Underlying,
        BoundFuture f => f.Underlying,
        BoundForward f => f.Underlying,
        BoundEuropean o => o.Underlying,
        BoundOption o => o.Underlying,
        _ => null,
    };

    private void Add(GroupBuilder group, int cell, in Holding holding, Dictionary<string, OptionFormula> formulas)
    {
        var units = holding.Quantity * holding.Bound.Multiplier;
        switch (holding.Bound)
        {
            case BoundForward forward:
                // At a flat rate the strike leg is a constant, so only the discounted underlying moves.
                group.AddLinear(cell, units * forward.Units);
                break;
            case BoundEuropean option:
                group.AddOption(option, new(cell, units, option.ValueWith(_model.Levels, Years(option, 0))));
                break;
            case BoundOption option:
                var formula = formulas[holding.Instrument];
                group.AddFormula(option.Market, new(cell, units, formula.Value(option.Market.At(_model.Levels, 0, option.Underlying.LevelOf(_model.Levels))), formula));
                break;
            default:
                group.AddLinear(cell, units);
                break;
        }
    }

    private List<FlowBatch> Flows(List<Holding> holdings, List<PlanCell> cells, List<PlanCurrency> currencies)
    {
        var cellOf = PlacesOf(cells);
        var amounts = new SortedDictionary<LinearForm, SortedDictionary<int, double>>();
        foreach (var holding in holdings)
        {
            if (holding.Bound is not BoundFlows bound) continue;
            var (cell, units) = (cellOf[(holding.Node, PlaceOf(bound.Currency, currencies))], holding.Quantity * bound.Multiplier);
            foreach (var flow in bound.Flows)
            {
                if (!amounts.TryGetValue(flow.Exponent, out var byCell)) amounts[flow.Exponent] = byCell = [];
                byCell[cell] = Math.FusedMultiplyAdd(units, flow.Amount, byCell.GetValueOrDefault(cell));
            }
        }
        return [.. amounts.Select(a => new FlowBatch(a.Key, Exponential.Of(-a.Key.At(_model.Levels)), [.. a.Value.Select(v => new LinearHolding(v.Key, v.Value))]))];
    }

    private double Years(BoundEuropean bound, int days) => _remainingYears is null ? bound.Years : _remainingYears(bound, days);

    private EuropeanOptionTerms[][] TermsByHorizon(List<BoundEuropean> options)
    {
        EuropeanOptionTerms[] After(int days) => [.. options.Select(o => o.Terms(_model.Levels, Years(o, days)))];
        return _remainingYears is null ? [.. Enumerable.Repeat(After(0), _horizons.Count)] : [.. _horizons.Select(h => After(h.Days))];
    }
}
