using RiskWorker.Domain.Books;
using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Pricing;

namespace RiskWorker.Engine.Backtesting;

/// <summary>Actual profit by node and date: the node's own row, else the sum of its children's where all are present.</summary>
public sealed class ActualProfits
{
    private readonly BookTree _tree;
    private readonly int[][] _children;
    private readonly bool[] _hasSeries;
    private readonly Dictionary<(int Node, DateOnly Date), double> _rows = [];
    private readonly CurrencyTable _currencies;
    private readonly ClosingLevels _levels;
    private readonly Dictionary<DateOnly, double[]> _known = [];

    /// <summary>Reads the rows of <paramref name="snapshot"/>; those of unknown books are left out.</summary>
    public ActualProfits(Snapshot snapshot, BookTree tree)
    {
        _tree = tree;
        _children = [.. Enumerable.Range(0, tree.Books.Count).Select(n => tree.ChildrenOf(n).ToArray())];
        _hasSeries = new bool[tree.Books.Count];
        _currencies = new(tree.ReportingCurrency, snapshot.Factors);
        _levels = new(snapshot);
        foreach (var row in snapshot.ProfitAndLoss)
        {
            var node = tree.IndexOf(row.Book);
            if (node < 0 || row.Actual is not { } actual) continue;
            _rows[(node, row.Date)] = actual;
            _hasSeries[node] = true;
        }
        for (var node = _hasSeries.Length - 1; node >= 0; node--)
            _hasSeries[node] |= _children[node].Length > 0 && _children[node].All(c => _hasSeries[c]);
    }

    /// <summary>Whether the node has any row of its own, or all its children have a series.</summary>
    public bool HasSeries(int node) => _hasSeries[node];

    /// <summary>Profit of <paramref name="date"/> in the node's currency, a child's converted at that date's prices; null where it is missing.</summary>
    public double? Of(int node, DateOnly date)
    {
        if (_rows.TryGetValue((node, date), out var own)) return own;
        if (_children[node].Length == 0) return null;
        var sum = 0.0;
        foreach (var child in _children[node])
        {
            if (Of(child, date) is not { } profit) return null;
            sum += profit * Conversion(child, node, date);
        }
        return double.IsFinite(sum) ? sum : null;
    }

    private double Conversion(int from, int to, DateOnly date)
    {
        var (one, other) = (_tree.Books[from].Currency, _tree.Books[to].Currency);
        return one == other ? 1 : RateOf(one, date) / RateOf(other, date);
    }

    private double RateOf(string currency, DateOnly date)
    {
        if (!_known.TryGetValue(date, out var levels)) _known[date] = levels = _levels.At(date);
        return _currencies.IndexOf(currency) is >= 0 and var index ? _currencies.RateOf(index, levels) : double.NaN;
    }
}
