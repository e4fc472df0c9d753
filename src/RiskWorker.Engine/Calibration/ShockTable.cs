using RiskWorker.Domain.Market;
using RiskWorker.Domain.Runs;
using RiskWorker.Numerics.Kernels;

namespace RiskWorker.Engine.Calibration;

/// <summary>
/// Daily shocks of every factor over all dates of the history, NaN where there is none. A lognormal factor's shock is the logarithm
/// of the quotient S_t / S_{t-1} (the quotient is rounded first), a normal one's the difference; only between consecutive business
/// days of the factor's own calendar that were both observed, and for a lognormal one both positive. Observations on closed days are
/// left out and counted.
/// </summary>
/// <remarks>
/// A factor with a proxy and a beta takes beta times the proxy's own shock on the days before its own first one.
/// Dates and factors are counted from 0 in ascending and in the given order.
/// </remarks>
public sealed class ShockTable
{
    private readonly double[][] _values;
    private readonly double[][] _shocks;
    private readonly OpenDays[] _days;
    private readonly int[] _firstOwn;
    private readonly int[] _ownCount;
    private readonly int[] _closed;

    private ShockTable(IReadOnlyList<Factor> factors, AdjustedHistory history, IReadOnlyList<Holiday> holidays)
    {
        Factors = factors;
        History = history;
        _values = new double[factors.Count][];
        _shocks = new double[factors.Count][];
        _days = new OpenDays[factors.Count];
        (_firstOwn, _ownCount, _closed) = (new int[factors.Count], new int[factors.Count], new int[factors.Count]);
        LayCalendars(holidays);
        for (var j = 0; j < factors.Count; j++)
        {
            _values[j] = OpenValues(j);
            _shocks[j] = OwnShocks(j);
            _ownCount[j] = _shocks[j].Count(double.IsFinite);
            var first = Array.FindIndex(_shocks[j], double.IsFinite);
            _firstOwn[j] = first < 0 ? Dates.Length : first;
        }
        FillFromProxies();
    }

    /// <summary>The factors, in the order of their numbers.</summary>
    public IReadOnlyList<Factor> Factors { get; }

    /// <summary>The adjusted observations behind the shocks.</summary>
    public AdjustedHistory History { get; }

    /// <summary>The dates, ascending.</summary>
    public ReadOnlySpan<DateOnly> Dates => History.Dates;

    /// <summary>The shocks of a snapshot's factors up to its date.</summary>
    public static ShockTable From(Snapshot snapshot) =>
        new(snapshot.Factors, new AdjustedHistory(snapshot.Observations, snapshot.Adjustments, snapshot.AsOf), snapshot.Holidays);

    /// <summary>Adjusted values of a factor on its open days, NaN on others and where nothing was observed.</summary>
    public ReadOnlySpan<double> Values(int factor) => _values[factor];

    /// <summary>Shocks of a factor, those from its proxy included.</summary>
    public ReadOnlySpan<double> Shocks(int factor) => _shocks[factor];

    /// <summary>Index of the date of the factor's own first shock; the number of dates where it has none. Shocks before it are the proxy's.</summary>
    public int FirstOwn(int factor) => _firstOwn[factor];

    /// <summary>Number of the factor's own shocks.</summary>
    public int OwnCount(int factor) => _ownCount[factor];

    /// <summary>Number of the factor's observations on days that its calendar closes, which are left out.</summary>
    public int ClosedDayObservations(int factor) => _closed[factor];

    /// <summary>Whether the factor's calendar is open on the date at <paramref name="t"/>.</summary>
    public bool IsOpen(int factor, int t) => _days[factor].IsOpen(t);

    /// <summary>Index of the factor's business day before the one at <paramref name="t"/>, or -1 where the table does not hold it.</summary>
    public int Previous(int factor, int t) => _days[factor].Previous(t);

    /// <summary>Index of the factor's last observation on an open day, or -1.</summary>
    public int LastObserved(int factor) => Array.FindLastIndex(_values[factor], double.IsFinite);

    private void LayCalendars(IReadOnlyList<Holiday> holidays)
    {
        var calendars = BusinessCalendar.ByName(holidays);
        var laid = new Dictionary<string, OpenDays>(StringComparer.Ordinal);
        for (var j = 0; j < Factors.Count; j++)
        {
            var name = Factors[j].Calendar ?? "";
            if (!laid.TryGetValue(name, out var days))
                laid[name] = days = new(calendars.GetValueOrDefault(name, BusinessCalendar.Weekdays), Dates);
            _days[j] = days;
        }
    }

    private double[] OpenValues(int factor)
    {
        var values = History.Values(Factors[factor].Name);
        for (var t = 0; t < values.Length; t++)
        {
            if (!double.IsFinite(values[t]) || _days[factor].IsOpen(t)) continue;
            values[t] = double.NaN;
            _closed[factor]++;
        }
        return values;
    }

    private double[] OwnShocks(int factor)
    {
        var (values, days) = (_values[factor], _days[factor]);
        var lognormal = Factors[factor].Shock == ShockKind.Lognormal;
        var shocks = new double[values.Length];
        for (var t = 0; t < values.Length; t++)
        {
            var before = days.Previous(t) is var p and >= 0 ? values[p] : double.NaN;
            if (!lognormal) shocks[t] = values[t] - before;
            else shocks[t] = values[t] > 0 && before > 0 ? values[t] / before : double.NaN;
        }
        if (lognormal) Logarithm.Of(shocks, shocks);
        return shocks;
    }

    private void FillFromProxies()
    {
        var number = Factors.Select((factor, j) => (factor.Name, j)).ToDictionary(f => f.Name, f => f.j, StringComparer.Ordinal);
        for (var j = 0; j < Factors.Count; j++)
        {
            if (Factors[j] is not { Proxy: { } name, Beta: { } beta } || !number.TryGetValue(name, out var proxy)) continue;
            for (var t = _firstOwn[proxy]; t < _firstOwn[j]; t++) _shocks[j][t] = beta * _shocks[proxy][t];
        }
    }
}
