using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;
using RiskWorker.Engine.Pricing;
using RiskWorker.Engine.Pricing.Ageing;

namespace RiskWorker.Engine.Plans;

/// <summary>Compiles valued lines into a <see cref="RevaluationPlan"/>. Lines of one node and instrument add up; the order of rows does not matter.</summary>
public sealed class PlanCompiler
{
    private readonly BookTree _tree;
    private readonly CalibratedModel _model;
    private readonly CurrencyTable _currencies;
    private readonly IReadOnlyList<Horizon> _horizons;

    /// <summary>Takes what the plan rests on.</summary>
    /// <param name="tree">The books.</param>
    /// <param name="model">How the factors move.</param>
    /// <param name="currencies">The currencies known.</param>
    /// <param name="horizons">Horizons, in any order.</param>
    public PlanCompiler(BookTree tree, CalibratedModel model, CurrencyTable currencies, IEnumerable<Horizon> horizons)
    {
        (_tree, _model, _currencies) = (tree, model, currencies);
        _horizons = [.. horizons.Distinct().Order()];
    }

    /// <summary>The plan of the priced ones among <paramref name="lines"/>.</summary>
    /// <param name="seed">Seed of the draws.</param>
    /// <param name="lines">The lines.</param>
    /// <param name="threads">Threads for tables of prices; the plan does not depend on how many.</param>
    /// <param name="ageing">What the instruments held turn into by each horizon; null leaves the valuation date where it is.</param>
    /// <param name="cancellation">Stops between tables.</param>
    public RevaluationPlan Compile(ulong seed, IReadOnlyList<LineValue> lines, int threads = 1, BookAgeing? ageing = null, CancellationToken cancellation = default)
    {
        if (ageing is not null && !_model.Law.HasPaths) throw new InvalidOperationException($"{_model.Law.GetType().Name} has no moves inside a horizon, so no book can age under it.");
        var holdings = Holdings(lines);
        var moves = FactorMoves.Of(_model);
        var options = holdings.Where(h => h.Bound is BoundOption).DistinctBy(h => h.Instrument).Select(h => (h.Instrument, (BoundOption)h.Bound)).ToList();
        var formulas = PriceTables.Build(options, moves, _model.Law, _model.Levels, _horizons, threads, cancellation);
        var currencies = Currencies(holdings);
        var cells = Cells(holdings, currencies);
        var (held, builder) = (InCells(holdings, cells, currencies), new HoldingsBuilder(_model.Levels));
        foreach (var holding in held) builder.Add(holding.Cell, holding.Quantity, holding.Bound, formulas.GetValueOrDefault(holding.Instrument));
        var nodes = Nodes(cells, currencies);
        var plan = new RevaluationPlan
        {
            Seed = seed,
            Moves = moves,
            Law = _model.Law,
            Horizons = _horizons,
            Currencies = currencies,
            Groups = builder.Groups,
            Flows = builder.Flows,
            Aged = ageing is null ? [] : [.. _horizons.Select(h => new AgedCompiler(_model, moves, h, ageing, formulas).Compile(held, threads, cancellation))],
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

    private List<CellHolding> InCells(List<Holding> holdings, List<PlanCell> cells, List<PlanCurrency> currencies)
    {
        var cellOf = cells.Index().ToDictionary(c => (c.Item.Node, c.Item.Currency), c => c.Index);
        return [.. holdings.Select(h => new CellHolding(cellOf[(h.Node, PlaceOf(h.Bound.Currency, currencies))], h.Instrument, h.Bound, h.Quantity, h.Value))];
    }
}
