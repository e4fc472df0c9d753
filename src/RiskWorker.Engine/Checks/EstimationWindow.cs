using RiskWorker.Domain.Runs;
using RiskWorker.Engine.Calibration;

namespace RiskWorker.Engine.Checks;

/// <summary>The days that the calibration will use, found without failing where it cannot.</summary>
internal sealed class EstimationWindow
{
    private readonly ShockTable _table;
    private readonly bool[] _kept;
    private readonly List<int> _dropped = [];

    /// <summary>
    /// Finds them by the rule of <see cref="ShockWindow"/>, but for factors whose history is too short: they stop the run on their own,
    /// and would leave no day to look at the others on.
    /// </summary>
    public EstimationWindow(Snapshot snapshot, ShockTable table)
    {
        var (length, dates) = (snapshot.Settings.Model.Window, table.Dates.Length);
        int[] counted = [.. Enumerable.Range(0, table.Factors.Count).Where(j => !HistoryLength.IsBlocking(snapshot, table, j))];
        var (missing, observed) = Coverage(table, counted);
        Factors = counted;
        _table = table;
        _kept = new bool[dates];
        var (oldest, nominal, days) = (dates, 0, 0);
        for (var t = dates - 1; t >= 0 && Kept < length; t--)
        {
            if (!observed[t]) continue;
            if (++days == length) nominal = t;
            _kept[t] = missing[t] == 0;
            if (_kept[t]) (oldest, Kept) = (t, Kept + 1);
            else _dropped.Add(t);
        }
        _dropped.RemoveAll(t => t < oldest);
        FirstRow = Kept == length ? oldest : Math.Min(oldest, nominal);
    }

    /// <summary>The factors that it was found over.</summary>
    public IReadOnlyList<int> Factors { get; }

    /// <summary>Index of the date from which prices are looked at: the oldest complete day, or the window's length back if that is older.</summary>
    public int FirstRow { get; }

    /// <summary>Complete days, at most the window.</summary>
    public int Kept { get; }

    /// <summary>Days after the oldest complete one that are observed and not complete.</summary>
    public int Dropped => _dropped.Count;

    /// <summary>Whether the date at <paramref name="t"/> is one of the complete days.</summary>
    public bool IsKept(int t) => _kept[t];

    /// <summary>The factors without a shock on dropped days, with how many; most first, then by name.</summary>
    public IEnumerable<(string Factor, int Days)> DropCauses() =>
        Factors.Select(j => (Factor: _table.Factors[j].Name, Days: _dropped.Count(t => double.IsNaN(_table.Shocks(j)[t]))))
            .Where(c => c.Days > 0).OrderByDescending(c => c.Days).ThenBy(c => c.Factor, StringComparer.Ordinal);

    private static (int[] Missing, bool[] Observed) Coverage(ShockTable table, int[] counted)
    {
        var (missing, observed) = (new int[table.Dates.Length], new bool[table.Dates.Length]);
        foreach (var j in counted)
        {
            var shocks = table.Shocks(j);
            var values = table.Values(j);
            for (var t = 0; t < missing.Length; t++)
            {
                if (double.IsNaN(shocks[t])) missing[t]++;
                if (!double.IsNaN(values[t])) observed[t] = true;
            }
        }
        return (missing, observed);
    }
}
