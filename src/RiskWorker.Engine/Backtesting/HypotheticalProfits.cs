using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Backtesting;

/// <summary>
/// Profit of a close's positions, held unchanged, at the prices of a later close: without fees or new trades, priced as at the close
/// (MAR32, MAR99). The valuation date stays that of the first close unless the settings include time effects.
/// </summary>
public sealed class HypotheticalProfits
{
    private readonly Snapshot _snapshot;
    private readonly BookTree _tree;
    private readonly InstrumentBinder _binder;
    private readonly ClosingLevels _levels;

    /// <summary>Takes what values positions.</summary>
    public HypotheticalProfits(Snapshot snapshot, BookTree tree)
    {
        (_snapshot, _tree) = (snapshot, tree);
        _levels = new(snapshot);
        _binder = new(tree.ReportingCurrency, snapshot.Factors, _levels, snapshot.Settings.Simulation.Seed, snapshot.Settings.CurveInterpolation);
    }

    /// <summary>The profit from the newest earlier positions to the as-of date; null where there are none.</summary>
    public static HypotheticalProfit? Of(Snapshot snapshot, BookTree tree) =>
        snapshot.Previous is { } held ? new HypotheticalProfits(snapshot, tree).From(held, snapshot.AsOf).Profit : null;

    /// <summary>
    /// The profit of <paramref name="held"/> from its own date to <paramref name="to"/>, by node in the node's currency: V1/X1 - V0/X0.
    /// A split or roll in between makes none. An option that expires in between, with time effects, pays at the later prices.
    /// </summary>
    public HypotheticalOutcome From(DatedPositions held, DateOnly to)
    {
        var (before, after) = (_levels.At(held.Date), _levels.At(to, basis: held.Date));
        var units = new Dictionary<string, UnitValue?>(StringComparer.Ordinal);
        var (values, leftOut) = (new NodeValue[_tree.Books.Count], 0);
        foreach (var position in held.Positions)
        {
            if (!units.TryGetValue(position.Instrument, out var unit))
                units[position.Instrument] = unit = ValueOf(position.Instrument, held.Date, before, to, after);
            var node = _tree.IndexOf(position.Book);
            if (unit is null || node < 0) leftOut++;
            else values[node] = values[node].Plus(position.Quantity * unit.Value.Before, position.Quantity * unit.Value.After);
        }
        for (var node = values.Length - 1; node > 0; node--)
        {
            ref var parent = ref values[_tree.ParentOf(node)];
            parent = parent.Plus(values[node].Before, values[node].After);
        }
        return new(new(held.Date, to, Amounts(values, before, after)), leftOut);
    }

    private List<BookAmount> Amounts(NodeValue[] values, double[] before, double[] after)
    {
        var amounts = new List<BookAmount>(values.Length);
        for (var node = 0; node < values.Length; node++)
        {
            var book = _tree.Books[node];
            if (_binder.Currencies.IndexOf(book.Currency) is not (>= 0 and var currency)) continue;
            var profit = (values[node].After / _binder.Currencies.RateOf(currency, after)) - (values[node].Before / _binder.Currencies.RateOf(currency, before));
            if (double.IsFinite(profit)) amounts.Add(new(book.Name, profit));
        }
        return amounts;
    }

    /// <summary>Values of one unit held in the reporting currency; null where it cannot be valued at both closes.</summary>
    private UnitValue? ValueOf(string name, DateOnly from, double[] before, DateOnly to, double[] after)
    {
        if (!_snapshot.Instruments.TryGetValue(name, out var instrument) || _binder.Bind(instrument, from, out var bound) is not null) return null;
        var then = bound!;
        if (_snapshot.Settings.TimeEffectsIncluded && _binder.Bind(instrument, Earlier(to, bound!.LastDay), out then) is not null) return null;
        var (rateBefore, rateAfter) = (_binder.Currencies.RateOf(bound!.Currency, before), _binder.Currencies.RateOf(bound.Currency, after));
        var value = bound.Value(before) * rateBefore;
        // A future is worth nothing at either close: the change of its price is paid at the later one.
        var later = rateAfter * (then!.Value(after) + bound.Settled(before, after));
        return double.IsFinite(value) && double.IsFinite(later) ? new(value, later) : null;
    }

    private static DateOnly Earlier(DateOnly one, DateOnly other) => one < other ? one : other;

    private readonly record struct UnitValue(double Before, double After);

    private readonly record struct NodeValue(double Before, double After)
    {
        public NodeValue Plus(double before, double after) => new(Before + before, After + after);
    }
}

/// <summary>A hypothetical profit and what it lacks.</summary>
/// <param name="Profit">By node, depth first; a node whose currency has no price at one of the closes is left out.</param>
/// <param name="LeftOut">Lines that cannot be valued at both closes, or lie in no known book.</param>
public sealed record HypotheticalOutcome(HypotheticalProfit Profit, int LeftOut);
